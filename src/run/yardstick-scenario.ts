/** The yardstick's problem: a right on the best of five independent lots, with nineteen columns written out. */
export const yardstickScenario = `
title: Yardstick on five lots
seed: yardstick
constants: { rate: 0.05, upkeep: 0.10 }
drivers:
  lot: { count: 5, start: 100, law: lognormal, growth of mean: rate - upkeep, volatility: 0.2 }
contract:
  decided by: holder
  decision dates: { count: 9, last: 3, today: no }
  payoff: max(0, largest(lot) - 100)
  at expiry: lapse
  discount: rate
method:
  basis:

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
