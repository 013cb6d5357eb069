import { type Moments, noMoments } from '#built/numeric/moments.js';
import { normalQuantile } from '#built/program/elementary.js';

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

/** Size that the largest of some independent standard normals exceeds once in a thousand (two-sided). */
export function largestLimit(count: number): number {
  return normalQuantile(1 - 0.0005 / count);
}

/**
 * The band that holds the mean square of some independent standard normals 999 times in a thousand.
 *
 * @source the cube root of a chi-square as a normal: Wilson & Hilferty (1931), PNAS 17, 684-688
 */
export function meanSquareBand(count: number): { low: number; high: number } {
  const spread = 2 / (9 * count);
  const cube = (sign: number) => (1 - spread + sign * normalQuantile(0.9995) * Math.sqrt(spread)) ** 3;
  return { low: cube(-1), high: cube(1) };
}

/** Moments of `values[offset … offset + count - 1]` by two passes, in rising order. */
export function momentsOf(values: Float64Array, offset: number, count: number): Moments {
  if (count === 0) return noMoments;
  let sum = 0;
  for (let i = offset; i < offset + count; i++) sum += values[i]!;
  const mean = sum / count;
  let squares = 0;
  for (let i = offset; i < offset + count; i++) squares += (values[i]! - mean) * (values[i]! - mean);
  return { count, mean, squares };
}
