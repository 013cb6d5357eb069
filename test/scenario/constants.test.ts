import { expect, test } from 'vitest';
import { readScenario } from '#built/scenario/read-scenario.js';
import { marked, mistakes, modelOf, scenarioText } from './scenario-texts.js';

const withConstants = (constants: string) => scenarioText({ constants: `constants:\n  rate: 0.05\n${constants}` });
const valuesOf = (constants: string, overrides = {}) =>
  Object.fromEntries(modelOf(withConstants(constants), overrides).constants.map(({ name, value }) => [name, value]));

test('constants may be stated through one another in any order', () => {
  expect(valuesOf('  a: b * 2\n  b: { value: c + 1 }\n  c: 16.\n  d: -c\n  e: +5')).toEqual({
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

test('constants in a long chain are computed without recursion', () => {
  const chain = Array.from({ length: 1990 }, (_, k) => `  c${k}: c${k + 1} + 1`).join('\n');
  expect(valuesOf(`${chain}\n  c1990: 0`).c0).toBe(1990);
});

test('more than two thousand constants are refused at the first beyond', () => {
  const many = (count: number) => Array.from({ length: count }, (_, k) => `  c${k}: 1`).join('\n');
  expect(mistakes(withConstants(many(1999)))).toEqual([]);
  const text = withConstants(many(2000));
  const line = text.split('\n').findIndex((one) => one.includes('c1999')) + 1;
  expect(mistakes(text)).toEqual([`too-many-constants ${line}:3+5`]);
});

test.each([
  ['0x10', '16'],
  ['-0x10', 'decimal'],
  ['0o17', '15'],
])('%s is refused, with its decimal', (number, mend) => {
  const { text, expected } = marked(
    withConstants(`  a: «${number}»`),
    number.startsWith('-') ? 'expression-syntax' : 'wrong-type',
  );
  expect(mistakes(text).map((found) => found.split(' ')[0])).toEqual(expected.map((found) => found.split(' ')[0]));
  expect(readScenario(text).messages[0]!.mend).toContain(mend);
});

test('an override that names no constant lists ten at most', () => {
  const mendOf = (count: number) => {
    const many = Array.from({ length: count }, (_, k) => `  c${k}: 1`).join('\n');
    return readScenario(withConstants(many), { with: { nowhere: '1' } }).messages[0]!.mend;
  };
  expect(mendOf(2)).toBe('Name a constant of the scenario: `rate`, `c0` or `c1`.');
  expect(mendOf(20)).toContain('`c8` or one of 11 more.');
});

test('an override without a finite value is named', () => {
  const [message] = readScenario(withConstants('  a: 1'), { with: { a: '1/0' } }).messages;
  expect(message).toMatchObject({ code: 'not-finite-value', place: null, evidence: { override: '--with' } });
  expect(message!.what).toBe('The override `a = 1/0`: the expression gives no finite number.');
});

test('a constant named like a family is told once', () => {
  const text = scenarioText({
    constants: 'constants: { rate: 0, lot: 3, b: lot * 2 }',
    contract: 'contract: { decision dates: [1], payoff: "largest(lot) + lot[2] + b + lot", discount: rate }',
    correlation: 'correlation: [{ among: lot, value: 0.2 }]',
  });
  expect(mistakes(text)).toEqual(['name-used-twice 3:3+3']);
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
