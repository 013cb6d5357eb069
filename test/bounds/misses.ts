import type { MeanEstimate } from '#built/numeric/estimate.js';

/** An interval that should contain a value. */
export interface Interval {
  readonly low: number;
  readonly high: number;
}

/** How many intervals lie wholly below the value, and how many wholly above it. */
export interface Misses {
  readonly tooLow: number;
  readonly tooHigh: number;
  readonly count: number;
}

/** Counts the intervals that do not contain a value, by side. */
export function countMisses(intervals: readonly Interval[], value: number): Misses {
  const tooLow = intervals.filter(({ high }) => high < value).length;
  const tooHigh = intervals.filter(({ low }) => low > value).length;
  return { tooLow, tooHigh, count: tooLow + tooHigh };
}

/** The probability of a miss that the intervals claim to keep below. */
const claimedRate = 0.05;

/** Largest count of misses among independent intervals that the claimed rate exceeds only once in a thousand (binomial law). */
export function mostMisses(intervalCount: number): number {
  let probability = (1 - claimedRate) ** intervalCount;
  let total = probability;
  let misses = 0;
  while (total < 0.999) {
    misses++;
    probability *= ((intervalCount - misses + 1) / misses) * (claimedRate / (1 - claimedRate));
    total += probability;
  }
  return misses;
}

/** The interval of an estimate with so many standard errors to each side. */
export function intervalOf({ value, standardError }: MeanEstimate, standardErrors: number): Interval {
  const reach = standardErrors * standardError!;
  return { low: value - reach, high: value + reach };
}

/** The median of some numbers; the upper one of two. */
export function medianOf(values: readonly number[]): number {
  return [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]!;
}
