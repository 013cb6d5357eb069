import { blockLanes } from '../program/program.js';
import { type FitWork, fitRule, type StepFit, type SweepKind, sweepsPerDate } from '../rule/backward-induction.js';
import type { BlockRange, FitStore } from '../rule/fit-store.js';
import { segmentCount, segmentOf } from '../rule/path-keeping.js';
import type { Programs } from '../rule/programs.js';
import type { Rule } from '../rule/rule.js';
import type { Executor } from '../workers/executor.js';
import type { Job } from '../workers/jobs.js';
import type { Progress } from './options.js';
import { cutIntoParcels, runParcels, Stopped } from './parcels.js';

/** Blocks of a parcel at least: some thousand paths, so that the sums that travel are small beside the work. */
const fewestBlocks = 8;
/** Blocks of a parcel at most, unless there are very many: a stop is heard, and progress seen, between parcels. */
const mostBlocks = 128;
const mostLargeParcels = 64;

/** Parcels of the fit; they depend on the count of paths alone. */
export function fitParcels(pathCount: number): BlockRange[] {
  const blockCount = Math.ceil(pathCount / blockLanes);
  return cutIntoParcels(pathCount, fewestBlocks, Math.max(mostBlocks, Math.ceil(blockCount / mostLargeParcels)));
}

/** Fits the rule on the executor. @fails throws Stopped, and NotFinite from the paths */
export function runFit(
  executor: Executor,
  programs: Programs,
  rule: Rule,
  store: FitStore,
  signal: AbortSignal | undefined,
  onProgress: (progress: Progress) => void,
): Promise<StepFit[]> {
  return fitRule(programs, rule, store.direction, fitWorkOn(executor, programs, store, signal, onProgress));
}

/** The fit's sweeps over all paths, in parcels on the executor; what is not in memory is brought in before a sweep. */
export function fitWorkOn(
  executor: Executor,
  programs: Programs,
  store: FitStore,
  signal: AbortSignal | undefined,
  onProgress: (progress: Progress) => void,
): FitWork {
  const ranges = fitParcels(store.pathCount);
  const { keeping } = store;
  const lastSegment = segmentCount(keeping) - 1;
  const total = ranges.length * (1 + lastSegment + sweepsPerDate(programs) * (programs.times.length - 1));
  let done = 0;
  const runAll = async <J extends Job>(jobs: J[]) => {
    const { results, isComplete } = await runParcels(executor, jobs, signal, () =>
      onProgress({ stage: 'fit', done: ++done, total }),
    );
    if (!isComplete) throw new Stopped();
    return results;
  };
  let inMemory = lastSegment;
  const bringIn = async (segment: number) => {
    if (segment === inMemory) return;
    await runAll(ranges.map((range) => ({ kind: 'restore' as const, segment, range })));
    inMemory = segment;
  };
  return {
    simulate: () => runAll(ranges.map((range) => ({ kind: 'simulate' as const, range }))),
    sweep: async (sweep: SweepKind, date: number) => {
      await bringIn(segmentOf(keeping, date));
      return runAll(ranges.map((range) => ({ kind: 'sweep' as const, sweep, date, range })));
    },
  };
}
