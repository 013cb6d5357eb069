import { setImmediate } from 'node:timers/promises';
import type { Executor } from './executor.js';
import type { Job, JobReply } from './jobs.js';

/** Does every job in the calling thread, leaving it free between jobs so that a signal is heard. */
export function createInProcessExecutor(runJob: (job: Job) => JobReply): Executor {
  return {
    workerCount: 1,
    async run(job) {
      await setImmediate();
      return runJob(job);
    },
    async close() {},
  };
}
