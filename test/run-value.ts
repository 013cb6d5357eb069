import { value } from '#built/index.js';
import type { RunRecord } from '#built/result/record.js';
import type { ValueOptions } from '#built/run/options.js';

/** The record of a run that must be delivered; in the calling thread unless workers are asked for. */
export async function recordOf(scenario: string | object, options: ValueOptions = {}): Promise<RunRecord> {
  const outcome = await value(scenario, { workers: 0, ...options });
  if (outcome.kind !== 'delivered') throw new Error(JSON.stringify(outcome, null, 1));
  return outcome.record;
}
