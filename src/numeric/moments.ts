/** Count, mean and sum of squared deviations of a sample: enough for a mean with its standard error. */
export interface Moments {
  readonly count: number;
  readonly mean: number;
  /** Σ (x - mean)² */
  readonly squares: number;
}

/** The moments of an empty sample. */
export const noMoments: Moments = { count: 0, mean: 0, squares: 0 };

/**
 * Moments of two samples together; not associative to the last bit, so merge in a fixed order.
 *
 * @source Chan, Golub & LeVeque (1983), American Statistician 37, 242-247
 */
export function mergeMoments(a: Moments, b: Moments): Moments {
  if (a.count === 0) return b;
  if (b.count === 0) return a;
  const count = a.count + b.count;
  const difference = b.mean - a.mean;
  return {
    count,
    mean: a.mean + (difference * b.count) / count,
    squares: a.squares + b.squares + (difference * difference * a.count * b.count) / count,
  };
}

/** The moments of the other values of a sample in which so many are zeros that do not count. */
export function momentsWithoutZeros({ count, mean, squares }: Moments, zeroCount: number): Moments {
  const left = count - zeroCount;
  if (zeroCount === 0) return { count, mean, squares };
  if (left === 0) return noMoments;
  const meanOfLeft = (mean * count) / left;
  return { count: left, mean: meanOfLeft, squares: Math.max(0, squares - mean * meanOfLeft * zeroCount) };
}

/** Unbiased sample variance; 0 for a sample of one. */
export function varianceOf(moments: Moments): number {
  return moments.count > 1 ? moments.squares / (moments.count - 1) : 0;
}

/** Standard error of the mean; null for a sample of fewer than two, whose error is unknown. */
export function standardErrorOf(moments: Moments): number | null {
  return moments.count > 1 ? Math.sqrt(varianceOf(moments) / moments.count) : null;
}
