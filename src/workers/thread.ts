import { workerData } from 'piscina';
import { createJobRunner, type JobContext } from './jobs.js';

/** The worker thread's whole work: one job runner for the run that started it. */
export default createJobRunner(workerData as JobContext);
