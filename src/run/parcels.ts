import { blockLanes } from '../program/program.js';
import type { BlockRange } from '../rule/fit-store.js';
import { NotFinite, type NotFinitePlace } from '../rule/not-finite.js';
import type { Executor } from '../workers/executor.js';
import type { Job, ResultOf } from '../workers/jobs.js';

/** Ends a stage because the run was asked to stop. */
export class Stopped extends Error {}

/** Share of what is left that one parcel takes: as many workers and fewer share the work evenly. */
const parcelsOfTheRest = 8;

/**
 * Cuts paths into parcels of whole blocks, large ones first and smaller ones towards the end, so that few messages are
 * sent and no worker waits long for the last. Depends on the counts alone, never on who works.
 *
 * @source guided self-scheduling: Polychronopoulos & Kuck (1987), IEEE Trans. Computers C-36, 1425-1439
 */
export function cutIntoParcels(pathCount: number, fewestBlocks: number, mostBlocks = fewestBlocks): BlockRange[] {
  const total = Math.ceil(pathCount / blockLanes);
  const parcels: BlockRange[] = [];
  for (let firstBlock = 0; firstBlock < total; ) {
    const left = total - firstBlock;
    const wanted = Math.max(fewestBlocks, Math.min(mostBlocks, Math.ceil(left / parcelsOfTheRest)));
    const blockCount = Math.min(left, wanted);
    parcels.push({ firstBlock, blockCount });
    firstBlock += blockCount;
  }
  return parcels;
}

/** What a stage brought: the results of the first jobs in order; all of them unless the run was stopped. */
export interface ParcelResults<J extends Job> {
  readonly results: ResultOf<J>[];
  readonly isComplete: boolean;
}

/**
 * Runs jobs on the executor and returns their results in the order of the jobs, whoever finished first.
 *
 * After a stop nothing new is begun, and only the unbroken run of finished jobs from the first on is returned: which
 * paths an estimate uses then never depends on which of them came back quickly.
 *
 * @fails throws NotFinite with the place if a path leaves the finite numbers
 */
export async function runParcels<J extends Job>(
  executor: Executor,
  jobs: readonly J[],
  signal: AbortSignal | undefined,
  onDone: (doneCount: number) => void,
): Promise<ParcelResults<J>> {
  const failures: { position: number; place: NotFinitePlace }[] = [];
  const results = new Array<ResultOf<J> | undefined>(jobs.length).fill(undefined);
  let next = 0;
  let doneCount = 0;
  const work = async () => {
    while (next < jobs.length && signal?.aborted !== true) {
      const position = next++;
      const reply = await executor.run(jobs[position]!);
      if (!reply.ok) {
        failures.push({ position, place: reply.notFinite });
        next = jobs.length;
        return;
      }
      results[position] = reply.result as ResultOf<J>;
      onDone(++doneCount);
    }
  };
  await settleAll(Array.from({ length: executor.workerCount * 2 }, work));
  // All jobs before a failed one were begun before it, so the first failure is the same whoever came back first.
  failures.sort((a, b) => a.position - b.position);
  if (failures.length > 0) throw new NotFinite(failures[0]!.place);
  const finished = results.indexOf(undefined);
  const unbroken = finished < 0 ? results : results.slice(0, finished);
  return { results: unbroken as ResultOf<J>[], isComplete: finished < 0 };
}

/** Waits for all, then throws the first failure: no job is left running behind a thrown error. */
async function settleAll(tasks: Promise<void>[]): Promise<void> {
  for (const outcome of await Promise.allSettled(tasks)) if (outcome.status === 'rejected') throw outcome.reason;
}
