import { type FitWork, fitRule, type StepFit, type SweepKind, sweepsPerDate } from '../rule/backward-induction.js';
import type { FitStore } from '../rule/fit-sweeps.js';
import type { Programs } from '../rule/programs.js';
import type { Rule } from '../rule/rule.js';
import type { Executor } from '../workers/executor.js';
import type { Job } from '../workers/jobs.js';
import type { Progress } from './options.js';
import { cutIntoParcels, runParcels, Stopped } from './parcels.js';

/** Blocks of one parcel of the fit: some thousand paths, so that the sums that travel are small beside the work. */
const blocksPerParcel = 8;

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

/** The fit's sweeps over all paths, in parcels on the executor. */
export function fitWorkOn(
  executor: Executor,
  programs: Programs,
  store: FitStore,
  signal: AbortSignal | undefined,
  onProgress: (progress: Progress) => void,
): FitWork {
  const ranges = cutIntoParcels(store.pathCount, blocksPerParcel);
  const total = ranges.length * (1 + sweepsPerDate(programs) * (programs.times.length - 1));
  let done = 0;
  const runAll = async <J extends Job>(jobs: J[]) => {
    const { results, isComplete } = await runParcels(executor, jobs, signal, () =>
      onProgress({ stage: 'fit', done: ++done, total }),
    );
    if (!isComplete) throw new Stopped();
    return results;
  };
  return {
    simulate: () => runAll(ranges.map((range) => ({ kind: 'simulate' as const, range }))),
    sweep: (sweep: SweepKind, date: number) =>
      runAll(ranges.map((range) => ({ kind: 'sweep' as const, sweep, date, range }))),
  };
}
