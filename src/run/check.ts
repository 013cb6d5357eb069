import { openCandidates } from './candidates.js';
import { defaultWorkerCount, type Environment } from './environment.js';
import { forecastOfSizes } from './forecast.js';
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
  const opened = openCandidates(scenario.model, programs, options, environment, defaultWorkerCount(environment));
  if (opened.kind === 'refused') return opened;
  const forecast = forecastOfSizes(opened.candidates.map((candidate) => candidate.forecast));
  return { kind: 'checked', scenario, forecast, advice: [] };
}
