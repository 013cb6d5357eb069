import { expect, test } from 'vitest';
import { readScenario } from '#built/scenario/read-scenario.js';
import { marked, mistakes, scenarioText } from './scenario-texts.js';

const contract = 'contract:\n  decision dates: [1]\n  payoff: fuel\n  discount: 0\n  at expiry: lapse\n';
const inContract = (clause: string) => scenarioText({ contract: `${contract}  ${clause}` });
const inDriver = (keys: string) =>
  scenarioText({
    drivers: `drivers:\n  fuel: { start: 1, law: normal, volatility: 1 }\n  odd: { start: 1, ${keys} }`,
    contract,
  });

test.each([
  scenarioText({ before: '«calendar»: { day count: actual/365, holidays: [2027-12-25] }' }),
  scenarioText({
    constants: 'constants:\n  rate: 0.05\n  sigma: { «table»: [[0, 0.2], [1, 0.3]], between points: linear }',
  }),
  inDriver('law: normal, volatility: 1, «observed»: no'),
  inDriver('law: normal, volatility: 1, «jumps»: { per clock unit: 2, size: normal, mean: 0, deviation: 0.1 }'),
  inDriver(
    'law: normal, volatility: 1, «regimes»: { names: [calm, wild], rates: [[-1, 1], [2, -2]], start: calm, parameters: { wild: { volatility: 3 } } }',
  ),
  inDriver('law: normal, volatility: 1, «matched to»: [[0, 100], [1, 104]], between points: linear'),
  inDriver('«law»: mean-reverting, speed: 1, level: 2, volatility: 3'),
  inDriver('«law»: mean-reverting logarithm, speed: 1, level: 2, volatility: 3'),
  inDriver('«law»: square-root, speed: 1, level: 2, volatility: 3'),
  inDriver(
    '«law»: stochastic variance, growth of mean: 0, variance: { start: 0.04, speed: 1, level: 0.04, volatility: 0.3, correlation: -0.5 }',
  ),
  inDriver('«law»: finite chain, states: [0, 1], transitions: [[1, 0], [0, 1]]'),
  inDriver(
    '«law»: two-factor commodity, growth of mean: 0, volatility: 1, convenience yield: { start: 0, speed: 1, level: 0, volatility: 1, correlation: 0.5 }',
  ),
  inDriver('«law»: fractional, Hurst exponent: 0.3, volatility: 1'),
  inDriver('«law»: own change, change: { drift: -odd, diffusion: 1 }, scheme: Milstein'),
  inDriver('«law»: own recursion, next: previous + noise, shocks: { noise: { law: Student, degrees of freedom: 4 } }'),
  inDriver('«law»: running sum, of: fuel'),
  inDriver('«law»: running average, of: fuel, sampled: steps'),
  inDriver('«law»: running maximum, of: fuel'),
  inDriver('«law»: running minimum, of: fuel'),
  inDriver('«law»: last values, of: fuel, keep: 3'),
  inDriver('«law»: time since, event: fuel > 2'),
  scenarioText({ correlation: 'correlation: [{ among: lot, «factor»: 0.5 }]' }),
  scenarioText({ correlation: 'correlation: [{ among: lot, «blocks»: [] }]' }),
  scenarioText({ contract: contract.replace('  payoff', '  «decided by»: both\n  payoff') }),
  scenarioText({ contract: contract.replace('[1]', '[1, «2027-06-01»]') }),
  scenarioText({
    contract: contract.replace('decision dates: [1]', 'decision dates: { count: 3, «last»: 2028-03-01 }'),
  }),
  scenarioText({ contract: contract.replace('payoff: fuel', '«payoff»: { holder: fuel, issuer: 2 }') }),
  scenarioText({ contract: contract.replace('payoff: fuel', '«payoff»: [{ from: 0, to: 1, pays: fuel }]') }),
  scenarioText({ contract: contract.replace('discount: 0', '«discount»: { zero rates: [[1, 0.02]] }') }),
  inContract('«windows»: [{ from: 0.5, to: 1 }]'),
  inContract('«blackout»: [{ from: 0.5, to: 1 }]'),
  inContract('«notice»: 0.1'),
  inContract('«while held»: { receive: fuel, when: arrears }'),
  inContract('ends when: { event: fuel > 3, «watched»: steps, pays: 0 }'),
  inContract('«ends when»: [{ event: fuel > 3, watched: decision dates }]'),
  inContract('«rights»: { count: 3, wait: 0.25, at least: 1, unused: lapse }'),
  inContract('«modes»: { idle: { receive: 0, may become: { running: 5 } }, running: { receive: fuel } }'),
  inContract('«starting mode»: idle'),
  inContract('«if both act on one date»: 3'),
  inContract(
    '«stored quantity»: { start: 0, least: 0, most: 10, levels: 11, inject at most: 1, withdraw at most: 2, loss: 0.01 }',
  ),
  scenarioText({ method: 'method: { «steps between dates»: 4 }' }),
  `${scenarioText()}«what if»: { wilder: { spread: 0.3 } }\n`,
])('%s', (text) => {
  const { text: bare, expected } = marked(text, 'not-built-yet');
  expect(mistakes(bare)).toEqual(expected);
  const { messages } = readScenario(bare);
  expect(messages[0]!.what).toMatch(/understood, but not built yet/);
  expect(messages[0]!.mend.length).toBeGreaterThan(20);
});

test('a clause to come does not hide other mistakes of the same phase', () => {
  const { text, expected } = marked(
    inContract('«notice»: 0.1').replace('payoff: fuel', 'payoff: «feul»'),
    'unknown-name',
    'not-built-yet',
  );
  expect(mistakes(text)).toEqual(expected);
});

test('a payoff cannot use what nobody observes', () => {
  const drivers = 'drivers:\n  fuel: { start: 1, law: normal, volatility: 1, «observed»: no }';
  const { text, expected } = marked(
    scenarioText({ drivers, contract: contract.replace('payoff: fuel', 'payoff: «fuel» + 1') }),
    'not-built-yet',
    'unobserved-driver',
  );
  expect(mistakes(text)).toEqual(expected);
});
