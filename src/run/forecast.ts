import { columnStride } from '../program/program.js';
import type { Forecast, Plan } from '../result/record.js';
import { sweepsPerDate } from '../rule/backward-induction.js';
import { type Programs, workspaceColumnCount } from '../rule/programs.js';
import { fitStoreBytes } from './fit-size.js';

/** Resident before any work: the engine, this program's code, and each thread's own engine. Measured, see DEVELOPERS.md. */
const processBytes = 97e6;
const threadBytes = 25e6;

/** What a run will need, from its counts alone. */
export function forecastOf(
  programs: Programs,
  counts: ForecastCounts,
  workerCount: number,
  machineMemoryBytes: number | null,
): Forecast {
  const dateCount = programs.times.length - 1;
  const columnCount = programs.columns.length;
  const workspaceBytes = workspaceColumnCount(programs) * columnStride * 8;
  const ruleBytes = (dateCount + 1) * columnCount * (1 + programs.polynomialNames.length) * 8;
  return {
    peakMemoryBytes:
      processBytes +
      workerCount * (threadBytes + workspaceBytes) +
      fitStoreBytes(programs, counts.fitPathCount) +
      ruleBytes,
    machineMemoryBytes,
    work: {
      fit: counts.fitPathCount * dateCount * (1 + sweepsPerDate(programs)),
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
