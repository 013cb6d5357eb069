import { estimateOf, type MeanEstimate, standardErrorsIn95 } from '../numeric/estimate.js';
import type { Moments } from '../numeric/moments.js';

/** An estimated bound with the paths behind it. */
export interface Bound extends MeanEstimate {
  readonly pathCount: number;
}

/** Turns moments in the decider's sign into an estimate as the holder sees it. */
export function asHeld(moments: Moments, sign: 1 | -1): MeanEstimate {
  const estimate = estimateOf(moments);
  return { ...estimate, value: sign * estimate.value };
}

/** The same with the count of paths behind it. */
export function boundOf(moments: Moments, sign: 1 | -1): Bound {
  return { ...asHeld(moments, sign), pathCount: moments.count };
}

/**
 * The 95% bracket: from the low end of the lower bound's interval to the high end of the upper bound's.
 *
 * Each end is one-sided at 2.5%, so the value lies between them with at least 95%, whatever links the two estimates.
 */
export function bracketOf(lower: MeanEstimate, upper: MeanEstimate): { low: number; high: number } {
  return {
    low: lower.value - standardErrorsIn95 * (lower.standardError ?? Number.POSITIVE_INFINITY),
    high: upper.value + standardErrorsIn95 * (upper.standardError ?? Number.POSITIVE_INFINITY),
  };
}
