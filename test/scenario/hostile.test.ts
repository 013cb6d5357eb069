import fc from 'fast-check';
import { expect, test } from 'vitest';
import { renderMessages } from '#built/messages/render.js';
import { readScenario } from '#built/scenario/read-scenario.js';
import { scenarioText } from './scenario-texts.js';

const whole = `${scenarioText({
  before: 'title: Hay\nas of: 2027-03-01\nseed: barn door',
  constants:
    'constants:\n  rate: 0.05\n  a: { value: rate * 2, plausible: 0.02, measured under: history }\n  b: >\n    1 +\n    a',
  correlation: 'correlation:\n  - { among: lot, value: 0.25 }\n  - { of: [fuel, "lot[1]"], matrix: [[1, 0], [0, 1]] }',
  method:
    'method:\n  basis: [fuel, "largest(lot, 2)"]\n  counts: { fit: 100 }\n  upper: { method: andersen-broadie, outer: 5, inner: 6 }',
})}`;

const pieces = [
  ...[
    '[',
    ']',
    '{',
    '}',
    ':',
    ': ',
    ',',
    '- ',
    '? ',
    '\n',
    '\n  ',
    '\t',
    '#',
    '"',
    "'",
    '|',
    '>',
    '&a ',
    '*a',
    '!!str ',
    '%',
    '---\n',
    '...\n',
    '\\',
    '@',
    '`',
  ],
  ...[
    '__proto__',
    'constructor',
    'toString',
    '.inf',
    '.nan',
    '1e999',
    '-',
    'null',
    'true',
    '0x7',
    '\u0000',
    '\u202E',
    '\uD800',
    '\uFEFF',
    '\r',
    '🌾',
  ],
  ...[
    'lot',
    'fuel',
    'rate',
    't',
    'number',
    'max(',
    'largest(lot',
    'not ',
    ' and ',
    '^',
    '<',
    '==',
    '((((((',
    'if(',
    ')',
    'lot[',
    '2027-01-01',
    '1/0',
    '-1',
  ],
  ...[
    'count: 3',
    'today: yes',
    'observed: no',
    'law: ',
    'rights: {}',
    'value: 1',
    'among: lot',
    'matrix: [[1]]',
    '[[[[[[',
  ],
];

const change = fc.record({
  at: fc.double({ min: 0, max: 1, noNaN: true }),
  remove: fc.oneof(fc.constant(0), fc.integer({ min: 0, max: 12 }), fc.integer({ min: 0, max: 200 })),
  insert: fc.oneof(fc.constant(''), fc.constantFrom(...pieces), fc.string({ unit: 'binary', maxLength: 4 })),
  copyFrom: fc.option(fc.double({ min: 0, max: 1, noNaN: true }), { nil: null }),
});

function changed(text: string, changes: readonly (typeof change extends fc.Arbitrary<infer T> ? T : never)[]): string {
  return changes.reduce((before, { at, remove, insert, copyFrom }) => {
    const start = Math.floor(at * before.length);
    const from = copyFrom === null ? null : Math.floor(copyFrom * before.length);
    const inserted = from === null ? insert : before.slice(from, from + 40);
    return before.slice(0, start) + inserted + before.slice(start + remove);
  }, text);
}

test('the text that is changed is right to begin with', () => {
  expect(readScenario(whole).messages).toEqual([]);
});

test('whatever is done to a scenario, it ends with messages or a scenario', () => {
  const property = fc.property(fc.array(change, { minLength: 1, maxLength: 6 }), (changes) => {
    const text = changed(whole, changes);
    const { scenario, messages } = readScenario(text);
    expect(scenario === null).toBe(messages.length > 0);
    const lines = text.split('\n');
    for (const { place, sourceLine, what, why, mend } of messages) {
      for (const words of [what, why, mend]) expect(words.length).toBeGreaterThan(5);
      if (place === null) continue;
      expect(sourceLine).toBe(lines[place.line - 1]!.replace(/\r$/, ''));
      expect(place.column).toBeGreaterThanOrEqual(1);
      expect(place.column).toBeLessThanOrEqual(sourceLine!.length + 2);
      expect(place.length).toBeGreaterThanOrEqual(1);
    }
    // No character that steers a terminal survives, whatever the text was.
    expect(renderMessages(messages)).not.toMatch(/[\p{Cf}\p{Cs}]|(?!\n)\p{Cc}/u);
  });
  fc.assert(property, { numRuns: 2000, seed: 20270301 });
});

test('random characters are no scenario and do no harm', () => {
  fc.assert(
    fc.property(fc.string({ unit: 'binary', maxLength: 300 }), (text) => {
      expect(readScenario(text).scenario).toBeNull();
    }),
    { numRuns: 1000, seed: 7 },
  );
});

const many = (count: number, line: (k: number) => string) => Array.from({ length: count }, (_, k) => line(k)).join('');
const drivers = 'drivers: { p: { start: 1, law: normal, volatility: 1 } }\n';
const contract = 'contract: { decision dates: [1], payoff: p, discount: 0 }\n';
const family = 'drivers: { p: { count: 1000, start: 1, law: normal, volatility: 1 } }\n';

test.each([
  ['unknown keys', many(20_000, (k) => `k${k}: 1\n`)],
  ['keys in one driver', `drivers: { p: { law: normal, ${many(20_000, (k) => `x${k}: 1, `)}} }\n${contract}`],
  ['unknown names', `constants:\n${many(20_000, (k) => `  c${k}: d${k}\n`)}${drivers}${contract}`],
  ['constants in one line', `constants: { ${many(20_000, (k) => `c${k}: ${k}, `)} }\n${drivers}${contract}`],
  ['drivers without a law', `drivers:\n${many(9000, (k) => `  d${k}: { lw: normal }\n`)}${contract}`],
  ['tabs', many(60_000, () => '\ta: 1\n')],
  ['quotes in lines', many(60_000, () => '  "a: 1\n')],
  [
    'formulas with a word cut off',
    `constants:\n${many(90, (k) => `  c${k}: ${'a'.repeat(9000)} b\n`)}${drivers}${contract}`,
  ],
  [
    'formulas with a long gap',
    `constants:\n${many(90, (k) => `  c${k}: "a${' '.repeat(9000)}b"\n`)}${drivers}${contract}`,
  ],
  ['circles', `constants:\n${many(10_000, (k) => `  a${k}: b${k}\n  b${k}: a${k}\n`)}${drivers}${contract}`],
  [
    'formulas with a mistake in each name',
    `constants:\n${many(90, (k) => `  c${k}: max(${'zq,'.repeat(3000)}1)\n`)}${drivers}${contract}`,
  ],
  ['long formulas', `constants:\n${many(90, (k) => `  c${k}: max(${'1,'.repeat(4990)}1)\n`)}${drivers}${contract}`],
  ['brackets without end', `constants: { a: "${'('.repeat(9000)}" }\n${drivers}${contract}`],
  ['signs without end', `constants: { a: "${'-'.repeat(9000)}1" }\n${drivers}${contract}`],
  ['a thousand correlated drivers', `${family}correlation: [{ among: p, value: 0.5 }]\n${contract}`],
  ['a thousand drivers that contradict', `${family}correlation: [{ among: p, value: -0.5 }]\n${contract}`],
  [
    'one statement ten thousand times',
    `${family}correlation:\n${many(10_000, () => '  - { among: p, value: 0 }\n')}${contract}`,
  ],
  ['a hundred thousand dates', drivers + contract.replace('[1]', '{ count: 100000, last: 1 }')],
  ['wrong items', `${drivers}${contract.replace('[1]', `[${'{ a: 1 }, '.repeat(15_000)}]`)}`],
  ['aliases', many(40_000, () => '- *a\n')],
  ['documents', many(60_000, () => '---\n')],
  ['directives', many(60_000, () => '%a\n')],
  ['closing brackets', ']'.repeat(190_000)],
  ['quotes', '"'.repeat(190_000)],
  ['commas', `[${','.repeat(190_000)}`],
  ['anchors', '&a '.repeat(60_000)],
  ['a long line', `title: ${'x '.repeat(400_000)}\n${drivers}${contract}`],
])('%s end soon', (_name, text) => {
  const begin = performance.now();
  const { messages } = readScenario(text);
  // Two seconds on an idle machine; the tests run beside others.
  expect(performance.now() - begin).toBeLessThan(6000);
  expect(messages.length).toBeLessThanOrEqual(201);
});
