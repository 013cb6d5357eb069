import { Piscina } from 'piscina';
import type { Executor } from './executor.js';
import type { Job, JobContext, JobReply } from './jobs.js';

/** Times that one job is tried when the thread under it dies. */
const largestTryCount = 5;

/** A pool of threads; gives access to them, so that a test can end one and see that it mattered. */
export interface ThreadExecutor extends Executor {
  readonly pool: Piscina;
  /** Jobs that were begun again because their thread died. */
  readonly retryCount: number;
}

/**
 * Does jobs in worker threads. A thread that dies is replaced and its job done again: a job writes only what nobody
 * reads before it is done, so the result is the same.
 *
 * @fails throws when a job's thread died `largestTryCount` times, or when a job has a defect
 */
export function createThreadExecutor(context: JobContext, workerCount: number): ThreadExecutor {
  const pool = new Piscina({
    filename: new URL('./thread.js', import.meta.url).href,
    workerData: context,
    minThreads: workerCount,
    maxThreads: workerCount,
    idleTimeout: Number.POSITIVE_INFINITY,
    // Without the pool's own histograms a job costs half the time beside its work.
    recordTiming: false,
  });
  // A thread that dies without a job is replaced by the pool; there is nothing to do again.
  pool.on('error', () => {});
  let retryCount = 0;
  return {
    pool,
    workerCount,
    get retryCount() {
      return retryCount;
    },
    async run(job: Job): Promise<JobReply> {
      for (let attempt = 1; ; attempt++) {
        try {
          return (await pool.run(job)) as JobReply;
        } catch (problem) {
          if (!isThreadDeath(problem) || attempt === largestTryCount) throw problem;
          retryCount++;
        }
      }
    },
    close: () => pool.destroy(),
  };
}

/** Whether the thread ended under its job, as opposed to the job throwing. */
function isThreadDeath(problem: unknown): boolean {
  if (!(problem instanceof Error)) return false;
  return (
    problem.message.startsWith('worker exited') || (problem as { code?: string }).code === 'ERR_WORKER_OUT_OF_MEMORY'
  );
}
