import { expect, test } from 'vitest';
import { readScenario } from '#built/scenario/read-scenario.js';
import { mistakes, modelOf, scenarioText } from './scenario-texts.js';

const full = `title: Right to sell the best of five grain lots
as of: 2027-03-01
money: crowns
clock: years
seed: barn door

constants:
  rate: 0.05
  upkeep: 0.10
  spread: { value: 0.20, plausible: 0.02, measured under: pricing }

drivers:
  lot:
    count: 5
    start: 100
    law: lognormal
    growth of mean: rate - upkeep
    volatility: spread
    observed: yes

correlation:
  - { among: lot, value: 0.25 }

contract:
  decided by: holder
  decision dates: { count: 9, last: 3, today: no }
  payoff: max(0, largest(lot) - 100)
  at expiry: lapse
  discount: rate

method:
  basis: auto
  bracket width: { relative: 0.1% }
`;

test('a full scenario is read as it is written', () => {
  const model = modelOf(full);
  expect(model).toMatchObject({
    title: 'Right to sell the best of five grain lots',
    money: 'crowns',
    clock: 'years',
    asOf: '2027-03-01',
    seed: 'barn door',
    constants: [
      { name: 'rate', value: 0.05, plausible: null, measuredUnder: null, line: 8 },
      { name: 'upkeep', value: 0.1, line: 9 },
      { name: 'spread', value: 0.2, plausible: 0.02, measuredUnder: 'pricing', line: 10 },
    ],
    families: [{ name: 'lot', isFamily: true, count: 5, law: 'lognormal', observed: true, line: 13 }],
    contract: { decidedBy: 'holder', atExpiry: { kind: 'lapse' } },
    method: { basis: 'auto', bracketWidth: { relative: 0.001 }, fitPathCount: null, upper: 'one-step' },
  });
  expect(model.correlation.map((row) => row.join(' '))).toEqual([
    '1 0.25 0.25 0.25 0.25',
    '0.25 1 0.25 0.25 0.25',
    '0.25 0.25 1 0.25 0.25',
    '0.25 0.25 0.25 1 0.25',
    '0.25 0.25 0.25 0.25 1',
  ]);
  expect(model.contract.decisionDates).toHaveLength(9);
  expect(model.contract.decisionDates.at(-1)).toBe(3);
  expect(model.contract.payoff).toMatchObject({ text: 'max(0, largest(lot) - 100)', line: 27, column: 11 });
  expect(model.families[0]!.parameters['growth of mean']).toMatchObject({
    text: 'rate - upkeep',
    line: 17,
    column: 21,
  });
});

test('every setting is echoed with its origin', () => {
  const text = scenarioText({ before: 'seed: 42' });
  const { scenario } = readScenario(text, { width: '2%', with: { rate: '0.01 * 3' } });
  const echo = scenario!.settings.map(({ name, value, origin }) => [
    name,
    value,
    origin.kind === 'line' ? origin.line : origin.kind,
  ]);
  expect(echo).toEqual([
    ['title', 'untitled', 'default'],
    ['money', 'units of money', 'default'],
    ['clock', 'years', 'default'],
    ['seed', '42', 1],
    ['constants.rate', '0.01 * 3 = 0.03', 'command line'],
    ['drivers.lot.count', '3', 4],
    ['drivers.lot.law', 'lognormal', 4],
    ['drivers.lot.start', '100', 4],
    ['drivers.lot.growth of mean', 'rate = 0.03', 4],
    ['drivers.lot.volatility', '0.2', 4],
    ['drivers.lot.observed', 'yes', 'default'],
    ['drivers.fuel.law', 'normal', 5],
    ['drivers.fuel.start', '10', 5],
    ['drivers.fuel.drift', '0', 'default'],
    ['drivers.fuel.volatility', '2', 5],
    ['drivers.fuel.observed', 'yes', 'default'],
    ['correlation.pairs not stated', '0', 'default'],
    ['contract.decided by', 'holder', 'default'],
    ['contract.decision dates.count', '4', 7],
    ['contract.decision dates.last', '2', 7],
    ['contract.decision dates.today', 'no', 'default'],
    ['contract.payoff', 'max(0, largest(lot) - fuel)', 8],
    ['contract.at expiry', 'lapse', 'default'],
    ['contract.discount', 'rate = 0.03', 9],
    ['method.basis', 'auto', 'default'],
    ['method.bracket width', '2% of the value', 'command line'],
    ['method.upper', 'one-step', 'default'],
  ]);
});

test('the default seed is the same for every scenario', () => {
  const seeds = [modelOf(scenarioText()), modelOf(scenarioText({ before: 'title: another' }))].map(({ seed }) => seed);
  expect(seeds).toEqual(['barn door', 'barn door']);
});

test('the checked model is plain data that survives being written and read', () => {
  const model = modelOf(full);
  expect(JSON.parse(JSON.stringify(model))).toEqual(model);
  expect(structuredClone(model)).toEqual(model);
});

test('mistakes of one phase are given together and in file order', () => {
  const text = scenarioText({ drivers: 'drivers:\n  fuel: { start: strat, law: normal, volatility: -2 }' });
  expect(mistakes(text)).toEqual(['unknown-name 3:18+5', 'value-out-of-range 3:50+2', 'unknown-name 6:26+3']);
});

test.each([
  ['as of: 2027-02-29', 'bad-date 1:8+10'],
  ['as of: 2100-02-29', 'bad-date 1:8+10'],
  ['as of: March', 'bad-date 1:8+5'],
  ['title: ""', 'wrong-type 1:8+2'],
  ['title:', 'wrong-type 1:1+5'],
  ['title: [a]', 'wrong-type 1:1+5'],
  ['seed: ""', 'wrong-type 1:7+2'],
])('%s', (before, expected) => {
  expect(mistakes(scenarioText({ before }))).toEqual([expected]);
});

test.each(['as of: 2028-02-29', 'as of: 2000-02-29', 'title: 7', 'seed: 0.5', 'seed: yes', "title: 'a: b'"])(
  '%s is fine',
  (before) => {
    expect(mistakes(scenarioText({ before }))).toEqual([]);
  },
);
