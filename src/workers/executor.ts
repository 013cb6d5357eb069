import type { Job, JobReply } from './jobs.js';

/** Does jobs, somewhere; who does them, and how many at once, changes no result. */
export interface Executor {
  /** Jobs that can run at once. */
  readonly workerCount: number;
  run(job: Job): Promise<JobReply>;
  close(): Promise<void>;
}
