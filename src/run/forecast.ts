import type { Forecast, Plan } from '../result/record.js';
import { sweepsPerDate } from '../rule/backward-induction.js';
import type { PathKeeping } from '../rule/path-keeping.js';
import type { Programs } from '../rule/programs.js';
import { describeKeeping } from './fit-memory.js';
import { peakMemoryBytes, peakMemoryOfTwo } from './peak-memory.js';

/** What a run will need, from its counts alone. */
export function forecastOf(
  programs: Programs,
  counts: ForecastCounts,
  keeping: PathKeeping,
  workerCount: number,
  machineMemoryBytes: number | null,
): Forecast {
  const dateCount = programs.times.length - 1;
  const paths = describeKeeping(programs, counts.fitPathCount, keeping);
  const columnCount = programs.columns.length;
  return {
    sizeCount: 1,
    peakMemoryBytes: peakMemoryBytes(programs, counts, paths.bytes, workerCount),
    machineMemoryBytes,
    paths,
    work: {
      fit: counts.fitPathCount * dateCount * (paths.workFactor + sweepsPerDate(programs)),
      bounds:
        counts.outerPathCount === null || counts.innerPointCount === null
          ? null
          : counts.outerPathCount * dateCount * (1 + counts.innerPointCount),
      nested: counts.nestedOuterPathCount * counts.nestedInnerPathCount * ((dateCount * (dateCount + 1)) / 2),
    },
    columnCount,
    polynomialCount: programs.polynomialNames.length,
  };
}

/**
 * What a run needs at most that may try several sizes, from small to large: all of their fits, and the memory of two at
 * once, since the best so far is held while another is fitted.
 */
export function forecastOfSizes(forecasts: readonly Forecast[]): Forecast {
  const largest = forecasts.at(-1)!;
  return {
    ...largest,
    sizeCount: forecasts.length,
    peakMemoryBytes: peakMemoryOfTwo(forecasts.map(({ peakMemoryBytes: peak }) => peak)),
    work: { ...largest.work, fit: forecasts.reduce((total, { work }) => total + work.fit, 0) },
  };
}

/** Counts that are known before the pilot. */
export type ForecastCounts = Pick<Plan, 'fitPathCount' | 'nestedOuterPathCount' | 'nestedInnerPathCount'> & {
  readonly outerPathCount: number | null;
  readonly innerPointCount: number | null;
};
