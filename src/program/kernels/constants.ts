/**
 * The constants of the elementary functions in memory.
 *
 * A vector made of one number in memory costs one operation; a vector constant in the code costs several, because the
 * engine builds it anew wherever it is used (measured: an exponential takes half as long again).
 */
import * as table from '../elementary-tables';

/** A vector with one number of a table in both lanes. */
// @ts-ignore: decorator
@inline
export function constant(numbers: usize, position: i32): v128 {
  return v128.load64_splat(numbers + (<usize>position << 3));
}

/** Ascending coefficients at 0 … 9. */
export const exponential = memory.data<f64>([
  table.exponential0, table.exponential1, table.exponential2, table.exponential3, table.exponential4,
  table.exponential5, table.exponential6, table.exponential7, table.exponential8, table.exponential9,
]);

/** Ascending coefficients at 0 … 6. */
export const logarithm = memory.data<f64>([
  table.logarithm0, table.logarithm1, table.logarithm2, table.logarithm3, table.logarithm4, table.logarithm5,
  table.logarithm6,
]);

/** Numerator at 0 … 9, denominator of power i at 10 + i. */
export const tail = memory.data<f64>([
  table.tailNumerator0, table.tailNumerator1, table.tailNumerator2, table.tailNumerator3, table.tailNumerator4,
  table.tailNumerator5, table.tailNumerator6, table.tailNumerator7, table.tailNumerator8, table.tailNumerator9,
  1.0, table.tailDenominator1, table.tailDenominator2, table.tailDenominator3, table.tailDenominator4,
  table.tailDenominator5, table.tailDenominator6, table.tailDenominator7, table.tailDenominator8,
  table.tailDenominator9, table.tailDenominator10,
]);

/** The three ratios of the quantile: numerator of power i at i, denominator at 8 + i. */
export const middle = memory.data<f64>([
  table.middleNumerator0, table.middleNumerator1, table.middleNumerator2, table.middleNumerator3,
  table.middleNumerator4, table.middleNumerator5, table.middleNumerator6, table.middleNumerator7,
  1.0, table.middleDenominator1, table.middleDenominator2, table.middleDenominator3,
  table.middleDenominator4, table.middleDenominator5, table.middleDenominator6, table.middleDenominator7,
]);
export const outer = memory.data<f64>([
  table.outerNumerator0, table.outerNumerator1, table.outerNumerator2, table.outerNumerator3,
  table.outerNumerator4, table.outerNumerator5, table.outerNumerator6, table.outerNumerator7,
  1.0, table.outerDenominator1, table.outerDenominator2, table.outerDenominator3,
  table.outerDenominator4, table.outerDenominator5, table.outerDenominator6, table.outerDenominator7,
]);
export const far = memory.data<f64>([
  table.farNumerator0, table.farNumerator1, table.farNumerator2, table.farNumerator3,
  table.farNumerator4, table.farNumerator5, table.farNumerator6, table.farNumerator7,
  1.0, table.farDenominator1, table.farDenominator2, table.farDenominator3,
  table.farDenominator4, table.farDenominator5, table.farDenominator6, table.farDenominator7,
]);

/** Single numbers, by their position in the table below. */
export const enum Named {
  half,
  one,
  two,
  oneOverLogOfTwo,
  logOfTwoHigh,
  logOfTwoLow,
  /** 1.5 · 2^52: added and taken off again it rounds to a whole number, which the lowest bits of the sum hold. */
  rounder,
  /** Below this size of its argument an exponential is neither subnormal nor infinite. */
  ordinaryExponent,
  lowestExponent,
  highestExponent,
  /** 2^52 + 1023: added to n it leaves the bits of n + 1023 lowest, to be moved where a double keeps its exponent. */
  exponentPlacer,
  smallestNormal,
  infinity,
  /** 2^27 + 1, which cuts a double into two halves. */
  splitter,
  /** From here on the tails of the normal law count as 0 and 1. */
  farthest,
  /** The quantile's middle part: its half width, and the square of that. */
  middleLimit,
  middleSquare,
  outerShift,
}

const named = memory.data<f64>([
  0.5,
  1.0,
  2.0,
  table.oneOverLogOfTwo,
  table.logOfTwoHigh,
  table.logOfTwoLow,
  6755399441055744.0,
  708.0,
  -746.0,
  710.0,
  4503599627371519.0,
  2.2250738585072014e-308,
  Infinity,
  134217729.0,
  39.0,
  0.425,
  0.180625,
  1.6,
]);

// @ts-ignore: decorator
@inline
export function number(name: Named): v128 {
  return constant(named, <i32>name);
}
