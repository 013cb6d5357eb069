import { setImmediate } from 'node:timers/promises';
import type { Executor } from './executor.js';
import { createJobRunner, type JobContext } from './jobs.js';

/** Does every job in the calling thread, leaving it free between jobs so that a signal is heard. */
export function createInProcessExecutor(context: JobContext): Executor {
  const runJob = createJobRunner(context);
  return {
    workerCount: 1,
    async run(job) {
      await setImmediate();
      return runJob(job);
    },
    async close() {},
  };
}
