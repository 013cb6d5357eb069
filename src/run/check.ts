import { countsBeforePilot } from './counts.js';
import { defaultWorkerCount, type Environment } from './environment.js';
import { decideKeeping } from './fit-memory.js';
import { forecastOf } from './forecast.js';
import { judgeCounts } from './judge-counts.js';
import { judgeOptions } from './judge-options.js';
import type { CheckOptions, CheckOutcome } from './options.js';
import { prepare } from './prepare.js';

/** Checks a scenario and forecasts what a run will need, without drawing a path. */
export function checkScenario(source: string | object, options: CheckOptions, environment: Environment): CheckOutcome {
  const wrongOptions = judgeOptions(options);
  if (wrongOptions.length > 0) return { kind: 'refused', messages: wrongOptions };
  const outcome = prepare(source, options);
  if (outcome.kind === 'refused') return outcome;
  const { scenario, programs } = outcome.prepared;
  const counts = countsBeforePilot(programs, scenario.model.method);
  const kept = decideKeeping(programs, counts.fitPathCount, options.fitMemoryBytes);
  if (kept.kind === 'refused') return kept;
  const workerCount = defaultWorkerCount(environment);
  const forecast = forecastOf(programs, counts, kept.keeping, workerCount, environment.memoryBytes);
  const messages = judgeCounts(programs, counts, forecast);
  if (messages.length > 0) return { kind: 'refused', messages };
  return { kind: 'checked', scenario, forecast, advice: [] };
}
