import type { Moments } from '#built/numeric/moments.js';

/** Distance of a mean from a value in standard errors. */
export function standardisedError(moments: Moments, expected: number): number {
  const error = Math.sqrt(moments.squares / (moments.count - 1) / moments.count);
  return (moments.mean - expected) / error;
}

/**
 * Standard errors within which every fixed-seed check must lie; with fixed seeds it never alarms by chance later, and
 * with a fresh seed once in 3,000 checks (normal law, two-sided).
 */
export const limit = 3.6;
