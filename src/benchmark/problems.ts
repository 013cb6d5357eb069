import { buildPrograms, type Programs, withoutMartingale } from '../rule/programs.js';
import { readScenario } from '../scenario/read.js';

/** Eighteen columns of the ranks of five lots, written out; the constant is always there. */
const rankColumns = `
    - largest(lot) / 100
    - largest(lot, 2) / 100
    - largest(lot, 3) / 100
    - largest(lot, 4) / 100
    - smallest(lot) / 100
    - (largest(lot) / 100) ^ 2
    - (largest(lot, 2) / 100) ^ 2
    - (largest(lot, 3) / 100) ^ 2
    - largest(lot) / 100 * (largest(lot, 2) / 100)
    - largest(lot) / 100 * (largest(lot, 3) / 100)
    - largest(lot, 2) / 100 * (largest(lot, 3) / 100)
    - (largest(lot) / 100) ^ 3
    - (largest(lot, 2) / 100) ^ 3
    - (largest(lot) / 100) ^ 2 * (largest(lot, 2) / 100)
    - largest(lot) / 100 * (largest(lot, 2) / 100) * (largest(lot, 3) / 100) * (largest(lot, 4) / 100) * (smallest(lot) / 100)
    - max(0, largest(lot) / 100 - 1)
    - max(0, largest(lot) / 100 - 1) ^ 2
    - largest(lot) / 100 * (largest(lot, 2) / 100) ^ 2
`;

/** The yardstick's problem: the best of five lots, nine dates, nineteen columns, no martingale. */
export function yardstickPrograms(): Programs {
  return withoutMartingale(lotsPrograms(5, 9, `basis:${rankColumns}`));
}

/** The right on the best of some independent lots over three years. */
export function lotsPrograms(lotCount: number, dateCount: number, method = 'basis: auto'): Programs {
  const { scenario, messages } = readScenario(
    `
constants: { rate: 0.05, upkeep: 0.10 }
drivers:
  lot: { count: ${lotCount}, start: 100, law: lognormal, growth of mean: rate - upkeep, volatility: 0.2 }
contract:
  decided by: holder
  decision dates: { count: ${dateCount}, last: 3, today: no }
  payoff: max(0, largest(lot) - 100)
  at expiry: lapse
  discount: rate
method:
  ${method}
`,
    {},
  );
  if (scenario === null) throw new Error(`the benchmark's scenario has mistakes: ${JSON.stringify(messages)}`);
  return buildPrograms(scenario.model);
}
