import { expect, test } from 'vitest';
import { marked, mistakes, modelOf, scenarioText } from './scenario-texts.js';

const contract = 'contract: { decision dates: [1], payoff: 1, discount: 0 }';
const withDrivers = (drivers: string) => scenarioText({ drivers: `drivers:\n${drivers}`, contract });

test('starts may differ by member, as a list or through `number`', () => {
  const model = modelOf(
    withDrivers(
      '  a: { count: 2, start: [1, rate], law: normal, volatility: 1 }\n  b: { count: 3, start: 10 * number, law: lognormal, growth of mean: 0, volatility: number / 10 }',
    ),
  );
  expect(model.families.map(({ start }) => start.map(({ text }) => text))).toEqual([['1', 'rate'], ['10 * number']]);
  expect(model.families[0]!.parameters.drift).toMatchObject({ text: '0', line: null, column: null });
});

test('a count may be a formula of constants', () => {
  const constants = 'constants: { n: 2 }';
  const drivers = 'drivers:\n  a: { count: n + 1, start: 1, law: normal, volatility: 1 }';
  const model = modelOf(
    scenarioText({ constants, drivers, contract: 'contract: { decision dates: [1], payoff: "a[3]", discount: 0 }' }),
  );
  expect(model.families[0]).toMatchObject({ count: 3, isFamily: true });
});

test('a family of one is still a family', () => {
  const drivers = 'drivers:\n  a: { count: 1, start: 1, law: normal, volatility: 1 }';
  const { text, expected } = marked(
    scenarioText({ drivers, contract: 'contract: { decision dates: [1], payoff: «a», discount: 0 }' }),
    'bare-family',
  );
  expect(mistakes(text)).toEqual(expected);
});

test.each([
  ['  a: { start: «0», law: lognormal, growth of mean: 0, volatility: 1 }', 'value-out-of-range'],
  ['  a: { start: «-1», law: lognormal, growth of mean: 0, volatility: 1 }', 'value-out-of-range'],
  ['  a: { start: 1, law: lognormal, growth of mean: 0, volatility: «-0.1» }', 'value-out-of-range'],
  ['  a: { start: 1, law: normal, volatility: «1 - 2» }', 'value-out-of-range'],
  ['  a: { count: 3, start: «2 - number», law: lognormal, growth of mean: 0, volatility: 1 }', 'value-out-of-range'],
  ['  a: { count: «0», start: 1, law: normal, volatility: 1 }', 'value-out-of-range'],
  ['  a: { count: «1.5», start: 1, law: normal, volatility: 1 }', 'value-out-of-range'],
  ['  a: { start: «1/0», law: normal, volatility: 1 }', 'not-finite-value'],
  ['  a: { count: 2, start: «1/(number - 2)», law: normal, volatility: 1 }', 'not-finite-value'],
  ['  «a»: { start: 1, law: lognormal, volatility: 1 }', 'missing-key'],
  ['  «a»: { law: normal, volatility: 1 }', 'missing-key'],
  ['  a: { start: 1, law: «lognorml», volatility: 1 }', 'unknown-law'],
  ['  a: { start: 1, law: «constructor», volatility: 1 }', 'unknown-law'],
  ['  a: { start: 1, law: normal, volatility: 1, «growth of mean»: 0 }', 'key-of-another-law'],
  ['  a: { start: 1, law: normal, volatility: 1, «speed»: 0 }', 'key-of-another-law'],
  ['  a: { count: 3, start: «[»1, 2], law: normal, volatility: 1 }', 'start-count'],
  ['  a: { start: «[»1, 2], law: normal, volatility: 1 }', 'start-count'],
  ['  a: { count: 2, start: [1, «nowhere»], law: normal, volatility: 1 }', 'unknown-name'],
  ['  a: { start: 1, law: normal, volatility: «t» }', 'name-not-usable-here'],
  ['  a: { start: 1, law: normal, volatility: 1 + «a» }', 'name-not-usable-here'],
  ['  «a b»: { start: 1, law: normal, volatility: 1 }', 'bad-name'],
  ['  «number»: { start: 1, law: normal, volatility: 1 }', 'reserved-name'],
])('%s', (drivers, code) => {
  const { text, expected } = marked(withDrivers(drivers), code);
  expect(mistakes(text)).toEqual(expected);
});

test('too many drivers are refused before any matrix is made', () => {
  const { text, expected } = marked(
    scenarioText({ drivers: 'drivers:\n  a: { count: «1001», start: 1, law: normal, volatility: 1 }', contract }),
    'too-many-drivers',
  );
  expect(mistakes(text)).toEqual(expected);
  expect(mistakes(text.replace('1001', '1e12'))).toEqual(expected);
});

test('a formula that would be computed too often is refused', () => {
  const long = `1${' + number'.repeat(300)}`;
  expect(mistakes(withDrivers(`  a: { count: 1000, start: ${long}, law: normal, volatility: 1 }`))).toEqual([
    `expression-too-long 3:28+${long.length}`,
  ]);
});
