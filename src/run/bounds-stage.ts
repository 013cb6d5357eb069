import { mergeNestedSums, type NestedSums, noNestedSums } from '../bounds/nested-paths.js';
import type { OuterPurpose } from '../bounds/outer-paths.js';
import { mergeOuterSums, noOuterSums, type OuterSums } from '../bounds/outer-sums.js';
import type { Programs } from '../rule/programs.js';
import type { Executor } from '../workers/executor.js';
import type { Progress } from './options.js';
import { cutIntoParcels, runParcels } from './parcels.js';

/** Sums of a stage and whether all of its paths are in them. */
export interface StageSums<S> {
  readonly sums: S;
  readonly isComplete: boolean;
}

/** Steps of one block that a parcel should hold, so that messages stay small beside the work and a stop is heard. */
const fewestSteps = 32;
const mostSteps = 512;

/**
 * Values the outer paths with both bounds.
 *
 * @param round of a bracket's draws, from 1 on; 1 for other purposes
 */
export async function runOuter(
  executor: Executor,
  programs: Programs,
  purpose: OuterPurpose,
  counts: { readonly outerPathCount: number; readonly innerPointCount: number },
  round: number,
  signal: AbortSignal | undefined,
  onProgress: (progress: Progress) => void,
): Promise<StageSums<OuterSums>> {
  const dateCount = programs.times.length - 1;
  const stepsOfBlock = dateCount * (counts.innerPointCount + 1);
  const [fewest, most] = [fewestSteps, mostSteps].map((steps) => Math.max(1, Math.floor(steps / stepsOfBlock)));
  const jobs = cutIntoParcels(counts.outerPathCount, fewest!, most!).map((range) => ({
    kind: 'outer' as const,
    work: { purpose, round, pathCount: counts.outerPathCount, innerPointCount: counts.innerPointCount },
    range,
  }));
  const stage = purpose === 'outer' ? 'bounds' : purpose;
  const { results, isComplete } = await runParcels(executor, jobs, signal, (done) =>
    onProgress({ stage, done, total: jobs.length, round }),
  );
  return { sums: results.reduce(mergeOuterSums, noOuterSums(programs.times.length)), isComplete };
}

/** Values the outer paths of the nested upper bound. */
export async function runNested(
  executor: Executor,
  counts: { readonly nestedOuterPathCount: number; readonly nestedInnerPathCount: number },
  round: number,
  signal: AbortSignal | undefined,
  onProgress: (progress: Progress) => void,
): Promise<StageSums<NestedSums>> {
  const jobs = cutIntoParcels(counts.nestedOuterPathCount, 1).map((range) => ({
    kind: 'nested' as const,
    work: { round, pathCount: counts.nestedOuterPathCount, innerPathCount: counts.nestedInnerPathCount },
    range,
  }));
  const { results, isComplete } = await runParcels(executor, jobs, signal, (done) =>
    onProgress({ stage: 'nested', done, total: jobs.length, round }),
  );
  return { sums: results.reduce(mergeNestedSums, noNestedSums), isComplete };
}
