import type { Forecast, Plan } from '../result/record.js';
import { sweepsPerDate } from '../rule/backward-induction.js';
import type { PathKeeping } from '../rule/path-keeping.js';
import type { Programs } from '../rule/programs.js';
import { describeKeeping } from './fit-memory.js';
import { peakMemoryBytes } from './peak-memory.js';

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

/** Counts that are known before the pilot. */
export type ForecastCounts = Pick<Plan, 'fitPathCount' | 'nestedOuterPathCount' | 'nestedInnerPathCount'> & {
  readonly outerPathCount: number | null;
  readonly innerPointCount: number | null;
};
