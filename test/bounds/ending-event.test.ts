import { expect, test } from 'vitest';
import { runNestedPaths } from '#built/bounds/nested-paths.js';
import type { Moments } from '#built/numeric/moments.js';
import { fitted } from '../fitted.js';
import { limit, standardisedError } from '../statistics.js';
import { type KnockOut, knockOutByQuadrature, knockOutText } from './knock-out.js';

const call: KnockOut = {
  start: 100,
  growth: 0.05,
  volatility: 0.3,
  rate: 0.05,
  dateCount: 10,
  last: 1,
  payoff: (price) => Math.max(0, price - 100),
  level: 140,
  side: 'above',
  pays: 0,
};
const put: KnockOut = {
  ...call,
  growth: 0.02,
  payoff: (price) => Math.max(0, 110 - price),
  level: 85,
  side: 'below',
  pays: 6,
};

const cases = [
  { name: 'call that ends at 140', right: call, payoff: 'max(0, price - 100)' },
  { name: 'put that ends at 85 and pays 6', right: put, payoff: 'max(0, 110 - price)' },
] as const;

/** Independent quadrature with its error from doubling the grid: the rule is of second order. */
function exactOf(right: KnockOut): number {
  const [coarse, fine] = [knockOutByQuadrature(right, 800), knockOutByQuadrature(right, 1600)];
  expect(Math.abs(fine - coarse)).toBeLessThan(2e-4 * fine);
  return fine;
}

const errorOf = ({ squares, count }: Moments) => Math.sqrt(squares / (count - 1) / count);

function bracketOf(lower: Moments, upper: Moments) {
  const low = lower.mean - limit * errorOf(lower);
  const high = upper.mean + limit * errorOf(upper);
  return { low, high, width: high - low };
}

test.each(cases)('$name: every bracket holds the independent quadrature and is narrow', async ({ right, payoff }) => {
  const exact = exactOf(right);
  const whole = await fitted(knockOutText(right, payoff), 16_384);
  const { lower, upper, regressed, exerciseCounts, endedCounts, neverCount } = whole.outer('outer', 8192, 64);
  const bracket = bracketOf(lower, upper);
  expect(bracket.low).toBeLessThan(exact);
  expect(bracket.high).toBeGreaterThan(exact);
  expect(bracket.width).toBeLessThan(0.01 * exact);
  expect(standardisedError(regressed, exact)).toBeGreaterThan(-limit);
  const total = (counts: readonly number[]) => counts.reduce((sum, count) => sum + count, 0);
  expect(total(endedCounts)).toBeGreaterThan(0);
  expect(total(exerciseCounts) + total(endedCounts) + neverCount).toBe(8192);

  const nested = runNestedPaths(
    whole.block,
    whole.nested,
    whole.rule,
    { round: 1, pathCount: 2048, innerPathCount: 64 },
    { firstBlock: 0, blockCount: 4 },
  );
  const nestedBracket = bracketOf(lower, nested.upper);
  expect(nestedBracket.high).toBeGreaterThan(exact);
  expect(nestedBracket.width).toBeLessThan(0.02 * exact);
  const difference = nested.continuationToday.mean - lower.mean;
  const error = Math.hypot(errorOf(nested.continuationToday), errorOf(lower));
  expect(Math.abs(difference) / error).toBeLessThan(limit);

  // Control: without the event, and with another amount paid, the value lies far outside.
  const neverEnds = { ...right, level: right.side === 'above' ? 100_000 : 0.001 };
  for (const other of [knockOutByQuadrature(neverEnds, 1600), exactOf({ ...right, pays: right.pays + 40 })]) {
    expect(other < bracket.low || other > bracket.high).toBe(true);
  }
});

test('control: the bracket of the same right without the event lies above', async () => {
  const { payoff } = cases[0];
  const { lower, upper } = (await fitted(knockOutText(call, payoff, { event: null }), 8192)).outer('outer', 2048, 16);
  expect(bracketOf(lower, upper).low).toBeGreaterThan(exactOf(call));
});

test('both interpreters give the same bits for a right that may end', async () => {
  const text = knockOutText(put, 'max(0, 110 - price)');
  const fast = await fitted(text, 2048);
  const plain = await fitted(text, 2048, null);
  expect([...fast.rule.continuation]).toEqual([...plain.rule.continuation]);
  expect([...fast.rule.integrands]).toEqual([...plain.rule.integrands]);
  expect(fast.outer('outer', 600, 4)).toEqual(plain.outer('outer', 600, 4));
});

test('where every path ends at the first date, no state is left to regress on, and the last fit says so', async () => {
  const { fits, rule } = await fitted(knockOutText(put, '1', { event: 'price > 0' }), 2048);
  expect(fits[0]!.kept).toHaveLength(1);
  for (const { kept, continuationMean } of fits.slice(1)) {
    expect(kept).toHaveLength(0);
    expect(continuationMean).toBe(0);
  }
  expect(rule.continuation.every(Number.isFinite)).toBe(true);
});
