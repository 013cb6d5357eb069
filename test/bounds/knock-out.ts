/** A right on one lognormal driver that ends when the driver is at or beyond a level on a decision date. */
export interface KnockOut {
  readonly start: number;
  readonly growth: number;
  readonly volatility: number;
  readonly rate: number;
  readonly dateCount: number;
  readonly last: number;
  readonly payoff: (price: number) => number;
  readonly level: number;
  /** Ends at or above the level, or at or below it. */
  readonly side: 'above' | 'below';
  readonly pays: number;
}

/**
 * Independent quadrature: backward induction on an even grid of log prices from the level to eight spreads of the whole
 * time away, by the trapezoidal rule. The grid ends at the level, so the jump there costs no accuracy; what leaves the
 * grid on that side has probability 1 less that of the rest.
 */
export function knockOutByQuadrature(right: KnockOut, intervalCount: number): number {
  const { start, growth, volatility, rate, dateCount, last, payoff, level, side, pays } = right;
  const step = last / dateCount;
  const spread = volatility * Math.sqrt(step);
  const drift = (growth - volatility ** 2 / 2) * step;
  const away = side === 'above' ? -1 : 1;
  const reach = 8 * volatility * Math.sqrt(last) + Math.abs(Math.log(start / level));
  const h = reach / intervalCount;
  const points = Array.from({ length: intervalCount + 1 }, (_, k) => Math.log(level) + away * k * h);
  const weightOf = (k: number) => (k === 0 || k === intervalCount ? h / 2 : h);
  const density = (distance: number) => Math.exp(-((distance / spread) ** 2) / 2) / (spread * Math.sqrt(2 * Math.PI));
  const mean = (values: readonly number[], densityAt: (k: number) => number) => {
    let [sum, mass] = [0, 0];
    for (let k = 0; k <= intervalCount; k++) {
      const weight = weightOf(k) * densityAt(k);
      sum += weight * values[k]!;
      mass += weight;
    }
    return Math.exp(-rate * step) * (sum + (1 - mass) * pays);
  };
  // The density depends on the difference of two grid points alone.
  const byDifference = Array.from({ length: 2 * intervalCount + 1 }, (_, d) =>
    density(away * (d - intervalCount) * h - drift),
  );
  let values = points.map((point) => payoff(Math.exp(point)));
  for (let date = dateCount - 1; date >= 1; date--) {
    const later = values;
    values = points.map((point, j) =>
      Math.max(
        payoff(Math.exp(point)),
        mean(later, (k) => byDifference[k - j + intervalCount]!),
      ),
    );
  }
  return mean(values, (k) => density(points[k]! - Math.log(start) - drift));
}

/** The scenario of such a right. */
export function knockOutText(right: KnockOut, payoff: string, change: KnockOutChange = {}): string {
  const { start, growth, volatility, rate, dateCount, last, level, side, pays } = right;
  const event = change.event ?? `price ${side === 'above' ? '>=' : '<='} ${level}`;
  return [
    'seed: oak',
    'drivers:',
    `  price: { start: ${start}, law: lognormal, growth of mean: ${growth}, volatility: ${volatility} }`,
    'contract:',
    `  decided by: ${change.decidedBy ?? 'holder'}`,
    `  decision dates: { count: ${dateCount}, last: ${last} }`,
    `  payoff: ${payoff}`,
    ...(change.event === null ? [] : [`  ends when: { event: "${event}", watched: decision dates, pays: ${pays} }`]),
    `  at expiry: ${change.atExpiry ?? 'lapse'}`,
    `  discount: ${rate}`,
    ...(change.method ?? []),
    '',
  ].join('\n');
}

/** What a test changes in it; a null event takes the clause out. */
export interface KnockOutChange {
  readonly event?: string | null;
  readonly decidedBy?: 'holder' | 'issuer';
  readonly atExpiry?: string;
  readonly method?: readonly string[];
}
