import { type Moments, mergeMoments, momentsOf, noMoments } from '../numeric/moments.js';
import type { Block } from '../rule/block.js';
import { type BlockRange, forEachBlock } from '../rule/fit-sweeps.js';
import type { Rule } from '../rule/rule.js';

/** Which draws a set of outer paths uses. */
export type OuterPurpose = 'outer' | 'pilot';

/**
 * Sums over outer paths, in the decider's sign: `lower` is what the rule brings and `upper` what hindsight with the
 * martingale as its price would bring.
 */
export interface OuterSums {
  /** Payoff where the rule exercises, less the martingale there. */
  readonly lower: Moments;
  /** Largest payoff less martingale on the path: at least `lower` on every path. */
  readonly upper: Moments;
  readonly gap: Moments;
  /** Regressed maximum less `lower`. */
  readonly regressedGap: Moments;
  /** The same maximum with the regressed martingale, which needs no inner points. */
  readonly regressed: Moments;
  /** Upper with the first half of the inner points: shows how fast inner noise still falls. */
  readonly halfInner: Moments;
  /** What the rule brings without any martingale. */
  readonly plain: Moments;
  /** Paths on which the rule exercises at each date of the grid. */
  readonly exerciseCounts: readonly number[];
  readonly neverCount: number;
}

export const noOuterSums = (dateCount: number): OuterSums => ({
  lower: noMoments,
  upper: noMoments,
  gap: noMoments,
  regressedGap: noMoments,
  regressed: noMoments,
  halfInner: noMoments,
  plain: noMoments,
  exerciseCounts: new Array<number>(dateCount).fill(0),
  neverCount: 0,
});

/** Adds the sums of two stretches of paths, the earlier first. */
export function mergeOuterSums(a: OuterSums, b: OuterSums): OuterSums {
  return {
    lower: mergeMoments(a.lower, b.lower),
    upper: mergeMoments(a.upper, b.upper),
    gap: mergeMoments(a.gap, b.gap),
    regressedGap: mergeMoments(a.regressedGap, b.regressedGap),
    regressed: mergeMoments(a.regressed, b.regressed),
    halfInner: mergeMoments(a.halfInner, b.halfInner),
    plain: mergeMoments(a.plain, b.plain),
    exerciseCounts: a.exerciseCounts.map((count, date) => count + b.exerciseCounts[date]!),
    neverCount: a.neverCount + b.neverCount,
  };
}

/**
 * Both bounds on one set of outer paths, with the one-step martingale of the fitted value.
 *
 * The increment over a step is v(X′) - E[v(X′) | X], v the larger of payoff and fitted continuation value. The
 * conditional mean is estimated from inner points drawn afresh for every path and date, today included, with the
 * regressed increment as control. What the estimates mean:
 *
 * - lower: mean of payoff less martingale where the rule exercises. The inner noise is independent of the path given
 *   the state, so its mean is the value of the rule: biased low for the best value by what the rule misses, only.
 * - upper: mean of the largest payoff less martingale. Noise inside a maximum can only raise its mean: biased high.
 *
 * @source Haugh & Kogan (2004), Operations Research 52, 258-270; Rogers (2002), Mathematical Finance 12, 271-286
 * @cost outer paths × dates × (inner points + 1) steps and evaluations
 */
export function runOuterPaths(
  block: Block,
  rule: Rule,
  purpose: OuterPurpose,
  pathCount: number,
  innerPointCount: number,
  range: BlockRange,
): OuterSums {
  let total = noOuterSums(block.programs.times.length);
  forEachBlock(block, range, pathCount, (index, firstPath) => {
    total = mergeOuterSums(total, runBlock(block, rule, purpose, innerPointCount, index, firstPath));
  });
  return total;
}

function runBlock(
  block: Block,
  rule: Rule,
  purpose: OuterPurpose,
  innerPointCount: number,
  index: number,
  firstPath: number,
): OuterSums {
  const { layout, times, polynomialNames, todayIsDecisionDate, floor } = block.programs;
  const lanes = block.lanes;
  const polynomialCount = polynomialNames.length;
  const last = times.length - 1;
  let free = layout.stage;
  const savedNext = free;
  free += block.driverCount;
  const nextIntegrands = free;
  free += polynomialCount;
  const [hold, outerValue, inner, regressedStep] = [free, free + 1, free + 2, free + 3];

  const martingale = new Float64Array(lanes);
  const halfMartingale = new Float64Array(lanes);
  const regressed = new Float64Array(lanes);
  const lower = new Float64Array(lanes);
  const plain = new Float64Array(lanes);
  const upper = new Float64Array(lanes).fill(-Infinity);
  const halfUpper = new Float64Array(lanes).fill(-Infinity);
  const regressedUpper = new Float64Array(lanes).fill(-Infinity);
  const exercisedAt = new Int32Array(lanes).fill(-1);

  const decide = (date: number, amount: Float64Array, isLast: boolean) => {
    const continuation = block.column(hold);
    const payoff = block.column(layout.payoff);
    for (let lane = 0; lane < lanes; lane++) {
      const brings = amount[lane]!;
      upper[lane] = Math.max(upper[lane]!, brings - martingale[lane]!);
      halfUpper[lane] = Math.max(halfUpper[lane]!, brings - halfMartingale[lane]!);
      regressedUpper[lane] = Math.max(regressedUpper[lane]!, brings - regressed[lane]!);
      if (exercisedAt[lane] === -1 && (isLast || brings > continuation[lane]!)) {
        lower[lane] = brings - martingale[lane]!;
        plain[lane] = brings;
        const isUnused = isLast && (brings > payoff[lane]! || (floor !== null && brings <= floor));
        exercisedAt[lane] = isUnused ? last + 1 : date;
      }
    }
  };

  block.restart();
  block.evaluate(0, rule, firstPath);
  block.continuation(0, rule, hold);
  if (todayIsDecisionDate) decide(0, block.column(layout.payoff), false);
  block.ruleIntegrands(0, rule, layout.integrands);
  for (let date = 0; date < last; date++) {
    const arrives = date + 1;
    block.advance();
    block.draw(purpose, index, date, 0);
    block.polynomials();
    block.column(regressedStep).fill(0);
    block.addIncrement(layout.integrands, 1, regressedStep);
    block.step(date, firstPath);
    block.evaluate(arrives, rule, firstPath);
    block.value(arrives, rule, hold, outerValue);
    if (arrives < last) block.ruleIntegrands(arrives, rule, nextIntegrands);
    const amount = Float64Array.from(block.column(arrives === last ? layout.terminal : layout.payoff));
    const payoff = Float64Array.from(block.column(layout.payoff));
    const continuation = Float64Array.from(block.column(hold));
    block.interpreter.copy(layout.next, savedNext, block.driverCount);

    const { mean, halfMean } = innerMeans(block, rule, purpose === 'outer' ? 'inner' : 'pilot inner', innerPointCount, {
      index,
      firstPath,
      date,
      value: inner,
      hold,
    });
    const value = block.column(outerValue);
    const step = block.column(regressedStep);
    for (let lane = 0; lane < lanes; lane++) {
      martingale[lane] = martingale[lane]! + value[lane]! - mean[lane]!;
      halfMartingale[lane] = halfMartingale[lane]! + value[lane]! - halfMean[lane]!;
      regressed[lane] = regressed[lane]! + step[lane]!;
    }
    block.column(hold).set(continuation);
    block.column(layout.payoff).set(payoff);
    decide(arrives, amount, arrives === last);
    block.interpreter.copy(savedNext, layout.next, block.driverCount);
    block.interpreter.copy(nextIntegrands, layout.integrands, polynomialCount);
  }

  const gap = upper.map((value, lane) => value - lower[lane]!);
  const regressedGap = regressedUpper.map((value, lane) => value - lower[lane]!);
  const exerciseCounts = new Array<number>(times.length + 1).fill(0);
  for (const date of exercisedAt) exerciseCounts[date] = exerciseCounts[date]! + 1;
  return {
    lower: momentsOf(lower, 0, lanes),
    upper: momentsOf(upper, 0, lanes),
    gap: momentsOf(gap, 0, lanes),
    regressedGap: momentsOf(regressedGap, 0, lanes),
    regressed: momentsOf(regressedUpper, 0, lanes),
    halfInner: momentsOf(halfUpper, 0, lanes),
    plain: momentsOf(plain, 0, lanes),
    exerciseCounts: exerciseCounts.slice(0, times.length),
    neverCount: exerciseCounts[times.length]!,
  };
}

interface InnerPlace {
  readonly index: number;
  readonly firstPath: number;
  readonly date: number;
  readonly value: number;
  readonly hold: number;
}

/**
 * Mean of the fitted value after one step from `state`, over inner points that are fresh for each lane: over all of
 * them and over the first half. Leaves `next` and the basis overwritten.
 */
function innerMeans(
  block: Block,
  rule: Rule,
  purpose: 'inner' | 'pilot inner',
  pointCount: number,
  place: InnerPlace,
): { mean: Float64Array; halfMean: Float64Array } {
  const sum = new Float64Array(block.lanes);
  const half = Math.ceil(pointCount / 2);
  let halfMean = sum;
  for (let point = 0; point < pointCount; point++) {
    block.draw(purpose, place.index, place.date, point);
    block.polynomials();
    block.step(place.date, place.firstPath);
    block.evaluate(place.date + 1, rule, place.firstPath);
    block.value(place.date + 1, rule, place.hold, place.value);
    block.addIncrement(block.programs.layout.integrands, -1, place.value);
    const value = block.column(place.value);
    for (let lane = 0; lane < block.lanes; lane++) sum[lane] = sum[lane]! + value[lane]!;
    if (point + 1 === half) halfMean = sum.map((total) => total / half);
  }
  return { mean: sum.map((total) => total / pointCount), halfMean };
}
