import { describe, expect, test } from 'vitest';
import { readScenario } from '#built/scenario/read-scenario.js';
import { marked, mistakes, scenarioText } from './scenario-texts.js';

const rest = scenarioText();

test.each([
  ['a second document', `${rest}«---»\na: 1\n`, 'several-documents'],
  ['an anchor', `seed: &s «a»\n${rest}`, 'yaml-alias'],
  ['an alias', `seed: «*s»\n${rest}`, 'yaml-alias'],
  ['a tag', `seed: !!str «a»\n${rest}`, 'yaml-tag'],
  ['an unknown tag', `seed: !thing «a»\n${rest}`, 'yaml-tag'],
  ['a directive', `«%YAML 1.1»\n---\n${rest}`, 'yaml-directive'],
  ['a key twice', `seed: a\n«seed»: b\n${rest}`, 'duplicate-key'],
  ['a number as key', `«1»: b\n${rest}`, 'key-not-text'],
  ['true as key', `«true»: b\n${rest}`, 'key-not-text'],
  ['a list as key', `«[a]»: b\n${rest}`, 'key-not-text'],
  ['__proto__ as key', `«__proto__»: b\n${rest}`, 'reserved-name'],
  ['__proto__ as a quoted key', `constants: { «"__proto__"»: 1 }\n`, 'reserved-name'],
  ['a list at the top', '«[1, 2]»', 'wrong-type'],
  ['a single value at the top', '«abc»', 'wrong-type'],
])('%s is a mistake at its place', (_name, text, ...codes) => {
  const { text: bare, expected } = marked(text, ...codes);
  expect(mistakes(bare)).toEqual(expected);
});

test.each([
  ['', 1],
  ['\n\n', 2],
  ['# only a comment\n', 3],
  ['---\n', 4],
  ['null', 5],
  ['\uFEFF', 6],
])('%j is empty (%i)', (text) => {
  expect(mistakes(text)).toEqual(['scenario-empty']);
});

test.each([
  ['an open bracket', 'contract: [1, 2\n', 'BAD_INDENT'],
  ['an open quote', 'title: "abc\n', 'MISSING_CHAR'],
  ['a tab as indentation', 'contract:\n\tpayoff: 1\n', 'TAB_AS_INDENT'],
  ['a second colon', 'title: a: b\n', 'BLOCK_AS_IMPLICIT_KEY'],
  ['bad indentation', 'contract:\n    payoff: 1\n  discount: 2\n', 'BAD_INDENT'],
  ['a reserved first character', 'title: @a\n', 'BAD_SCALAR_START'],
  ['an unknown escape', 'title: "\\q"\n', 'BAD_DQ_ESCAPE'],
])('%s is told as broken YAML with line and column', (_name, text, reader) => {
  const { messages } = readScenario(text);
  expect(messages.map(({ code }) => new Set([code]))).toContainEqual(new Set(['not-yaml']));
  const message = messages.find(({ evidence }) => evidence.reader === reader);
  expect(message).toMatchObject({ code: 'not-yaml', severity: 'mistake' });
  expect(message!.place!.line).toBeGreaterThanOrEqual(1);
  expect(message!.what).not.toMatch(/flow|implicit|scalar/i);
});

test.each([
  ['a quote without an end', `title: «"»abc\n${rest}`],
  [
    'a quote that ends at a later one',
    `${scenarioText({ before: "title:\n    «'»abc" }).replaceAll('\n  ', '\n    ')}`,
  ],
  ['tabs', rest.replace('  lot', '«\t»lot').replaceAll(/^ {2}/gm, '\t')],
  ['line ends of a carriage return', `title: a«\r»${rest.replaceAll('\n', '\r')}`],
  ['a NUL', `title: a«\0»b\n${rest}`],
  ['an escape', `title: a\n# «\u001b»[2J\n${rest}`],
  ['a no-break space behind a colon', rest.replace('discount: ', 'discount:«\u00A0»')],
])('%s is one mistake where it begins', (_name, text) => {
  const { text: bare, expected } = marked(text, 'not-yaml');
  expect(mistakes(bare)).toEqual(expected);
});

test('a member of a family inside brackets needs quotes, and the message says so', () => {
  const text = scenarioText({ correlation: 'correlation: [{ between: [lot[2], fuel], value: 0 }]' });
  const { messages } = readScenario(text);
  expect(messages[0]).toMatchObject({ code: 'not-yaml', place: { line: 5 } });
  expect(messages[0]!.mend).toContain('"lot[2]"');
});

describe('limits that are kept before parsing', () => {
  const most = 2000;
  test.each([
    ['opening brackets', '['.repeat(100_000), 'scenario-too-deep 1:31+1'],
    ['opening braces', '{'.repeat(100_000), 'scenario-too-deep 1:31+1'],
    ['dashes in one line', '- '.repeat(100_000), 'scenario-too-deep 1:61+1'],
    ['question marks in one line', '? '.repeat(100_000), 'scenario-too-deep 1:61+1'],
    ['brackets and braces', '[{'.repeat(50_000), 'scenario-too-deep 1:31+1'],
    [
      'indentation',
      Array.from({ length: 1000 }, (_, k) => `${' '.repeat(k)}a:\n`).join(''),
      'scenario-too-deep 31:31+1',
    ],
    ['more than a million characters', `title: ${'a'.repeat(1_000_000)}`, 'scenario-too-large'],
    ['too many pieces', '[1,'.concat('1,'.repeat(200_000)), 'scenario-too-large'],
  ])('%s', (_name, text, expected) => {
    const begin = performance.now();
    expect(mistakes(text)).toEqual([expected]);
    expect(performance.now() - begin).toBeLessThan(most);
  });

  test('thirty levels are allowed, thirty-one are not', () => {
    const nested = (depth: number) => `what if: ${'['.repeat(depth - 1)}${']'.repeat(depth - 1)}\n`;
    expect(mistakes(nested(30))).not.toContainEqual(expect.stringContaining('scenario-too-deep'));
    expect(mistakes(nested(31))).toEqual([expect.stringContaining('scenario-too-deep')]);
  });
});

test('a text with a mistake in every character ends after two hundred', () => {
  const found = mistakes(`[${','.repeat(5000)}`);
  expect(found).toHaveLength(201);
  expect(found.at(-1)).toBe('too-many-mistakes');
});

test('Windows line ends give the same places as others', () => {
  const text = scenarioText({ method: 'method: { basis: outo }' });
  expect(mistakes(text.replaceAll('\n', '\r\n'))).toEqual(mistakes(text));
  expect(readScenario(text.replaceAll('\n', '\r\n')).messages[0]!.sourceLine).toBe('method: { basis: outo }');
});

test('yes and no are texts in YAML 1.2 and are understood beside true and false', () => {
  for (const word of ['yes', 'true', '"yes"']) {
    const drivers = `drivers: { fuel: { start: 1, law: normal, volatility: 1, observed: ${word} } }`;
    const contract = 'contract: { decision dates: [1], payoff: fuel, discount: 0 }';
    expect(mistakes(scenarioText({ drivers, contract }))).toEqual([]);
  }
});
