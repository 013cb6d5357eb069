import type { Machine } from '../workers/machine.js';

/** What a run takes from the machine; handed in, so that the conductors stay plain functions. */
export type Environment = Machine;

/** Workers when nobody says: one for each core, up to the count beyond which they only wait for one another. */
export function defaultWorkerCount(environment: Environment): number {
  return Math.max(1, Math.min(8, environment.coreCount));
}
