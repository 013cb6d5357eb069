/** What a test changes in the standard right on several lots. */
export interface LotsChange {
  readonly count?: number;
  readonly start?: number | string;
  readonly dates?: string;
  readonly decidedBy?: 'holder' | 'issuer';
  readonly payoff?: string;
  readonly atExpiry?: string;
  readonly correlation?: number;
  readonly volatility?: string;
  readonly seed?: string;
  readonly method?: readonly string[];
  readonly drivers?: readonly string[];
}

/** The best-of right of Andersen & Broadie (2004) and others: strike 100, r = .05, yield .10, sigma = .2, T = 3. */
export function lots(change: LotsChange = {}): string {
  const { count = 2, start = 100, dates = '{ count: 9, last: 3 }', decidedBy = 'holder', correlation = 0 } = change;
  return [
    'title: Right on some lots',
    `seed: ${change.seed ?? 'oak'}`,
    'drivers:',
    '  lot:',
    `    count: ${count}`,
    `    start: ${start}`,
    '    law: lognormal',
    '    growth of mean: -0.05',
    `    volatility: ${change.volatility ?? '0.2'}`,
    ...(change.drivers ?? []),
    ...(count > 1 ? ['correlation:', `  - { among: lot, value: ${correlation} }`] : []),
    'contract:',
    `  decided by: ${decidedBy}`,
    `  decision dates: ${dates}`,
    `  payoff: ${change.payoff ?? 'max(0, largest(lot) - 100)'}`,
    `  at expiry: ${change.atExpiry ?? 'lapse'}`,
    '  discount: 0.05',
    ...(change.method === undefined ? [] : ['method:', ...change.method.map((line) => `  ${line}`)]),
    '',
  ].join('\n');
}
