import { type Moments, standardErrorOf } from './moments.js';

/** Half-width of a 95% interval in standard errors; the project's ± everywhere. */
export const standardErrorsIn95 = 1.96;

/** A mean with its error; the errors are null when a single path cannot tell. */
export interface MeanEstimate {
  readonly value: number;
  readonly standardError: number | null;
  readonly halfWidth95: number | null;
}

/** The mean of independent paths with its standard error and the half-width of its 95% interval. */
export function estimateOf(moments: Moments): MeanEstimate {
  const standardError = standardErrorOf(moments);
  return {
    value: moments.mean,
    standardError,
    halfWidth95: standardError === null ? null : standardErrorsIn95 * standardError,
  };
}
