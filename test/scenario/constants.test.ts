import { expect, test } from 'vitest';
import { readScenario } from '#built/scenario/read-scenario.js';
import { marked, mistakes, modelOf, scenarioText } from './scenario-texts.js';

const withConstants = (constants: string) => scenarioText({ constants: `constants:\n  rate: 0.05\n${constants}` });
const valuesOf = (constants: string, overrides = {}) =>
  Object.fromEntries(modelOf(withConstants(constants), overrides).constants.map(({ name, value }) => [name, value]));

test('constants may be stated through one another in any order', () => {
  expect(valuesOf('  a: b * 2\n  b: { value: c + 1 }\n  c: 0x10\n  d: -c\n  e: +5')).toEqual({
    rate: 0.05,
    a: 34,
    b: 17,
    c: 16,
    d: -16,
    e: 5,
  });
});

test('names of the host language are names like any other', () => {
  expect(valuesOf('  constructor: 3\n  toString: constructor + 1\n  process: 5')).toMatchObject({
    constructor: 3,
    toString: 4,
    process: 5,
  });
});

test.each([
  ['  a: «b»', 'unknown-name'],
  ['  a: 1 + «constructor»', 'unknown-name'],
  ['  a: 1 + «__proto__»', 'unknown-name'],
  ['  a: «process»', 'unknown-name'],
  ['  a: «toString»(1)', 'unknown-function'],
  ['  a: «t»', 'name-not-usable-here'],
  ['  a: «number»', 'name-not-usable-here'],
  ['  a: 2 * «fuel»', 'name-not-usable-here'],
  ['  a: largest(«lot»)', 'name-not-usable-here'],
  ['  a: «1 < 2»', 'number-expected'],
  ['  a: «1/0»', 'not-finite-value'],
  ['  a: «log(-1)»', 'not-finite-value'],
  ['  a: 2 + «1e999»', 'not-finite-value'],
  ['  «a»: a + 1', 'constant-cycle'],
  ['  «a»: b\n  b: c\n  c: a\n  d: a', 'constant-cycle'],
  ['  «my rate»: 1', 'bad-name'],
  ['  «2b»: 1', 'bad-name'],
  ['  «größe»: 1', 'bad-name'],
  ['  «max»: 1', 'reserved-name'],
  ['  «t»: 1', 'reserved-name'],
  ['  «lapse»: 1', 'reserved-name'],
  ['  «a»: { plausible: 1 }', 'missing-key'],
  ['  a: { value: 1, plausible: «-1» }', 'value-out-of-range'],
  ['  a: "1 + «b»"', 'unknown-name'],
])('%s', (constants, code) => {
  const { text, expected } = marked(withConstants(constants), code);
  expect(mistakes(text)).toEqual(expected);
});

test('a circle is told with its members in their order', () => {
  const { messages } = readScenario(withConstants('  a: b\n  b: c + rate\n  c: a\n  x: y\n  y: x'));
  expect(messages.map(({ code, evidence }) => [code, evidence.cycle])).toEqual([
    ['constant-cycle', ['a', 'b', 'c']],
    ['constant-cycle', ['x', 'y']],
  ]);
});

test('what uses a wrong constant raises no second mistake', () => {
  const { text, expected } = marked(
    withConstants('  a: «nowhere»\n  b: a + 1\n  c: { value: 1, plausible: b }'),
    'unknown-name',
  );
  expect(mistakes(text)).toEqual(expected);
});

test('a constant and a driver cannot share a name', () => {
  const { text, expected } = marked(
    scenarioText({
      constants: 'constants: { rate: 0, fuel: 1 }',
      drivers: 'drivers:\n  «fuel»: { start: 1, law: normal, volatility: 1 }',
      contract: 'contract: { decision dates: [1], payoff: 1, discount: 0 }',
    }),
    'name-used-twice',
  );
  expect(mistakes(text)).toEqual(expected);
});

test('a hundred thousand characters of constants in a chain are computed without recursion', () => {
  const chain = Array.from({ length: 8000 }, (_, k) => `  c${k}: c${k + 1} + 1`).join('\n');
  expect(valuesOf(`${chain}\n  c8000: 0`).c0).toBe(8000);
});

test('a mistake in a folded or escaped text is placed at its beginning', () => {
  const { text, expected } = marked(withConstants('  a: «>»\n    1 +\n    nowhere'), 'unknown-name');
  expect(mistakes(text)).toEqual(expected);
  const escaped = marked(withConstants('  a: «"1 \\x2b nowhere"»'), 'unknown-name');
  expect(mistakes(escaped.text)).toEqual(escaped.expected);
});

test('an override replaces the value before anything is computed', () => {
  expect(valuesOf('  a: rate * 2', { with: { rate: '0.1' } })).toEqual({ rate: 0.1, a: 0.2 });
  expect(valuesOf('  a: 3', { with: { rate: 'a + 1' } })).toEqual({ rate: 4, a: 3 });
});

test.each([
  ['an unknown name', { rat: '1' }, ['unknown-name'], 'rate'],
  ['a driver', { fuel: '1' }, ['unknown-name'], ''],
  ['a host name', { constructor: '1' }, ['unknown-name'], ''],
  ['a broken formula', { rate: '1 +' }, ['expression-syntax'], ''],
  ['two wrong names', { rate: 'a1 + b1' }, ['unknown-name', 'unknown-name'], ''],
  ['a division by zero', { rate: '1 / 0' }, ['not-finite-value'], ''],
])('an override with %s has no place in the file', (_name, replacements, codes, near) => {
  const { messages } = readScenario(scenarioText(), { with: replacements as Record<string, string> });
  expect(messages.map(({ code, place }) => [code, place])).toEqual(codes.map((code) => [code, null]));
  expect(messages[0]!.mend).toContain(near);
});
