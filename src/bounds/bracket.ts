import { estimateOf, type MeanEstimate, standardErrorsIn95 } from '../numeric/estimate.js';
import type { Moments } from '../numeric/moments.js';
import { normalQuantile } from '../program/elementary.js';

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

/** Rounds of final draws that a run may make: with all of them the probabilities below add up to 8.75%. */
export const mostRounds = 3;

/** Probability that the bracket of a round misses: half as much in each further round, so that all of them stay rare. */
export function errorProbability(round: number): number {
  let probability = 0.05;
  for (let earlier = 1; earlier < round; earlier++) probability /= 2;
  return probability;
}

/** Standard errors from each bound to its end of a round's bracket. */
export function standardErrorsInRound(round: number): number {
  return round === 1 ? standardErrorsIn95 : normalQuantile(1 - errorProbability(round) / 2);
}

/**
 * The bracket: from the low end of the lower bound's interval to the high end of the upper bound's.
 *
 * With 1.96 standard errors each end is one-sided at 2.5%, so the value lies between them with at least 95%, whatever
 * links the two estimates. A further round is drawn only if the one before was too wide, and its ends lie farther out.
 */
export function bracketOf(
  lower: MeanEstimate,
  upper: MeanEstimate,
  standardErrors: number,
): { low: number; high: number } {
  return {
    low: lower.value - standardErrors * (lower.standardError ?? Number.POSITIVE_INFINITY),
    high: upper.value + standardErrors * (upper.standardError ?? Number.POSITIVE_INFINITY),
  };
}
