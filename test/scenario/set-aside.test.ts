import { expect, test } from 'vitest';
import { readScenario } from '#built/scenario/read.js';

const codesOf = (text: string, overrides = {}) =>
  readScenario(text, overrides).messages.map(({ code, place }) => `${place?.line} ${code}`);

const drivers = ['drivers:', '  lot: { start: 100, law: lognormal, growth of mean: 0, volatility: 0.2 }'];
const contract = [
  'contract:',
  '  decided by: holder',
  '  decision dates: [1]',
  '  payoff: lot + wrong',
  '  discount: 0',
];

test('a misspelt key hides no mistake of meaning', () => {
  const text = ['titel: Wheat', ...drivers, ...contract].join('\n');
  expect(codesOf(text)).toEqual(['1 unknown-key', '7 unknown-name']);
});

test('a misspelt key is read as its near one, so that it is not missing as well', () => {
  const text = [drivers[0], drivers[1]!.replace('volatility: 0.2', 'volatilty: -1'), ...contract].join('\n');
  expect(codesOf(text)).toEqual(['2 unknown-key', '2 value-out-of-range', '6 unknown-name']);
});

test('nothing is said of what uses a driver or constant that was set aside', () => {
  const text = [
    'constants:',
    '  a: [1]',
    'drivers:',
    '  lot: { start: 100, law: lognormal, growth of mean: a, volatility: 0.2 }',
    '  oat: { start: 100, law: [] }',
    'correlation:',
    '  - { between: [lot, oat], value: 2 * a }',
    ...contract.map((line) => line.replace('lot + wrong', 'lot + oat + a + wrong')),
  ].join('\n');
  expect(codesOf(text)).toEqual(['2 wrong-type', '5 wrong-type', '11 unknown-name']);
});

test('an override of a constant that was set aside adds nothing', () => {
  const text = ['constants:', '  a: [1]', ...drivers, ...contract.map((line) => line.replace(' + wrong', ''))].join(
    '\n',
  );
  expect(codesOf(text, { with: { a: '2' } })).toEqual(['2 wrong-type']);
});

test('what is set aside is never valued', () => {
  const text = ['titel: Wheat', ...drivers, ...contract.map((line) => line.replace(' + wrong', ''))].join('\n');
  const { scenario, messages } = readScenario(text, {});
  expect(scenario).toBeNull();
  expect(messages).toHaveLength(1);
});

test('a fault of the method silences nothing about drivers and correlation', () => {
  const text = [
    ...drivers,
    'correlation:',
    '  - { between: [lot, oat], value: 0.1 }',
    ...contract.map((line) => line.replace(' + wrong', '')),
    'method:',
    '  basis: { lot: 1 }',
  ].join('\n');
  expect(codesOf(text)).toEqual(['4 unknown-name', '11 wrong-type']);
});
