import { expect, test } from 'vitest';
import { runNestedPaths } from '#built/bounds/nested-paths.js';
import type { OuterPurpose } from '#built/bounds/outer-paths.js';
import type { Moments } from '#built/numeric/moments.js';
import { fitted } from '../fitted.js';
import { lots } from '../scenario-texts.js';
import { limit, standardisedError } from '../statistics.js';

/** Two lots, start 100: independent quadrature, error at most 0.0001. */
const exact = 13.9018;

const oneSided = (moments: Moments) => standardisedError(moments, exact);

test('two lots: the lower bound does not lie above the exact value, nor any upper bound below it, and all are near', async () => {
  const whole = await fitted(lots(), 32_768);
  const { lower, upper, regressed, gap, plain } = whole.outer('outer', 4096, 64);
  expect(oneSided(lower)).toBeLessThan(limit);
  expect(oneSided(upper)).toBeGreaterThan(-limit);
  expect(oneSided(regressed)).toBeGreaterThan(-limit);
  expect(lower.mean).toBeGreaterThan(exact * 0.995);
  expect(upper.mean).toBeLessThan(exact * 1.008);
  expect(regressed.mean).toBeLessThan(exact * 1.04);
  expect(gap.mean).toBeCloseTo(upper.mean - lower.mean, 9);
  // The same rule without a martingale: the same mean, a hundred times the variance and more.
  expect(Math.abs(standardisedError(plain, lower.mean))).toBeLessThan(limit);
  expect(plain.squares / lower.squares).toBeGreaterThan(100);

  const nested = runNestedPaths(
    whole.block,
    whole.nested,
    whole.rule,
    { round: 1, pathCount: 1024, innerPathCount: 32 },
    { firstBlock: 0, blockCount: 2 },
  );
  expect(oneSided(nested.upper)).toBeGreaterThan(-limit);
  expect(nested.upper.mean).toBeLessThan(exact * 1.008);
  // Continuing from today with the rule is what the rule is worth: two estimates on different draws.
  const difference = nested.continuationToday.mean - lower.mean;
  const variance = (moments: Moments) => moments.squares / (moments.count - 1) / moments.count;
  expect(Math.abs(difference) / Math.sqrt(variance(nested.continuationToday) + variance(lower))).toBeLessThan(limit);
});

test('one date left is a European right: both bounds meet the closed form 11.19568', async () => {
  // European max-call on two assets, one integral (Stulz 1982; Johnson 1987), error 1e-5.
  const { outer } = await fitted(lots({ dates: '[3]' }), 16_384);
  const { lower, upper, gap } = outer('outer', 4096, 64);
  expect(Math.abs(standardisedError(lower, 11.19568))).toBeLessThan(limit);
  expect(upper.mean).toBeCloseTo(lower.mean, 9);
  expect(gap.mean).toBeCloseTo(0, 9);
});

test('four times the paths halve the error', async () => {
  const { outer } = await fitted(lots(), 8192);
  const error = ({ squares, count }: Moments) => Math.sqrt(squares / (count - 1) / count);
  expect(error(outer('outer', 2048, 16).lower) / error(outer('outer', 8192, 16).lower)).toBeCloseTo(2, 0);
});

test('upper is at least lower on every path: the gap has no negative part', async () => {
  const { outer } = await fitted(lots(), 4096);
  const { gap } = outer('outer', 512, 8);
  expect(gap.mean).toBeGreaterThan(0);
  for (let seed = 0; seed < 3; seed++) {
    const single = (await fitted(lots({ seed: `s${seed}` }), 4096)).outer('outer', 1, 4);
    expect(single.gap.mean).toBeGreaterThanOrEqual(0);
  }
});

test('control: a rule that is valued on the few paths that made it looks better than any rule can be', async () => {
  const thin = await fitted(lots(), 40);
  const fresh = thin.outer('outer', 40_000, 1).plain;
  let lookAhead = 0;
  for (let i = 0; i < 40; i++) {
    const own = await fitted(lots({ seed: `thin ${i}` }), 40);
    lookAhead += own.outer('fit' as OuterPurpose, 40, 1).plain.mean / 40;
  }
  expect(oneSided(fresh)).toBeLessThan(-limit);
  expect(lookAhead).toBeGreaterThan(exact);
});

test('control: a martingale with a mean of 0.02 for each step breaks the lower bound, and the exact value shows it', async () => {
  const whole = await fitted(lots(), 8192);
  const { block } = whole;
  const addIncrement = block.addIncrement.bind(block);
  block.addIncrement = (sign, target) => {
    addIncrement(sign, target);
    if (sign !== -1) return;
    const innerValue = block.column(target);
    for (let lane = 0; lane < innerValue.length; lane++) innerValue[lane] = innerValue[lane]! + 0.02;
  };
  expect(oneSided(whole.outer('outer', 4096, 16).lower)).toBeGreaterThan(limit);
});
