import { type Moments, mergeMoments, noMoments } from '../numeric/moments.js';

/**
 * Sums over outer paths, in the decider's sign: `lower` is what the rule brings and `upper` what hindsight with the
 * martingale as its price would bring.
 */
export interface OuterSums {
  /** Payoff where the rule exercises, less the martingale there. */
  readonly lower: Moments;
  /** Largest payoff less martingale on the path: at least `lower` on every path. Empty without inner points. */
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
  /** Paths that the ending event ends at each date while the right is unused; all 0 without one. */
  readonly endedCounts: readonly number[];
}

/** The sums of no paths. */
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
  endedCounts: new Array<number>(dateCount).fill(0),
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
    endedCounts: a.endedCounts.map((count, date) => count + b.endedCounts[date]!),
  };
}
