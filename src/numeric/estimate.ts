import { type Moments, standardErrorOf } from './moments.js';

/** Half-width of a 95% interval in standard errors; the project's ± everywhere. */
export const standardErrorsIn95 = 1.96;

/** A mean with its error; the errors are null when a single path cannot tell. */
export interface MeanEstimate {
  readonly value: number;
  readonly standardError: number | null;
  readonly halfWidth95: number | null;
}

/** An estimate from its value and standard error. */
export function estimateFrom(value: number, standardError: number | null): MeanEstimate {
  return { value, standardError, halfWidth95: standardError === null ? null : standardErrorsIn95 * standardError };
}

/** The mean of independent paths with its standard error and the half-width of its 95% interval. */
export function estimateOf(moments: Moments): MeanEstimate {
  return estimateFrom(moments.mean, standardErrorOf(moments));
}

/** Standard error of the difference of two independent estimates; null if one is unknown. */
export function jointError(a: MeanEstimate, b: MeanEstimate): number | null {
  if (a.standardError === null || b.standardError === null) return null;
  return Math.sqrt(a.standardError * a.standardError + b.standardError * b.standardError);
}
