import { blockLanes } from '../program/program.js';
import type { CompiledKernels } from '../program/wasm-module.js';
import { type FitStore, slotLength } from '../rule/fit-store.js';
import { keepAllPaths, type PathKeeping, slotCount } from '../rule/path-keeping.js';
import type { Programs } from '../rule/programs.js';
import { emptyRule, sharedNumbers } from '../rule/rule.js';
import type { JobContext } from '../workers/jobs.js';

const smallestFitPathCount = 32_768;
const largestFitPathCount = 262_144;
const fitPathStep = 4096;

/** Dates beyond which fewer paths do: the fits of neighbouring dates then tell nearly the same (measured). */
const mostDatesInFull = 50;

/** Paths of the fit when nobody says: in proportion to the columns, within limits, in whole parcels. */
export function defaultFitPathCount({ pathsPerColumn, columns, times }: Programs): number {
  const share = Math.min(1, mostDatesInFull / (times.length - 1));
  const wanted = Math.ceil((share * pathsPerColumn * columns.length) / fitPathStep) * fitPathStep;
  return Math.min(largestFitPathCount, Math.max(smallestFitPathCount, wanted));
}

/** Opens the shared memory of a run; all paths stay in memory unless it is told otherwise. */
export function openContext(
  programs: Programs,
  seed: string,
  pathCount: number,
  kernels: CompiledKernels | null,
  keeping: PathKeeping = keepAllPaths(programs.times.length - 1),
): JobContext {
  const store: FitStore = {
    pathCount,
    keeping,
    paths: sharedNumbers(slotCount(keeping) * slotLength(programs, pathCount)),
    values: sharedNumbers(2 * Math.ceil(pathCount / blockLanes) * blockLanes),
    direction: sharedNumbers(programs.columns.length + programs.polynomialNames.length * programs.integrandColumnCount),
  };
  return { programs, seed, kernels, rule: emptyRule(programs), store };
}
