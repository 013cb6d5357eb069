import { NotFinite } from '../rule/not-finite.js';
import type { CheckedScenario } from '../scenario/model.js';
import { type CandidatesOutcome, openCandidates } from './candidates.js';
import { defaultWorkerCount, type Environment } from './environment.js';
import { describeKeeping } from './fit-memory.js';
import { FitBench } from './fitted.js';
import { judgePlan } from './judge-counts.js';
import { judgeOptions } from './judge-options.js';
import { makeRecord } from './make-record.js';
import { notFiniteMessage } from './not-finite-message.js';
import type { Progress, ValueOptions, ValueOutcome } from './options.js';
import { Stopped } from './parcels.js';
import { choosePlan, fixedPlan } from './pilot-stage.js';
import { prepare } from './prepare.js';
import { runRounds } from './rounds.js';
import { selectFit } from './select-stage.js';

/**
 * Values a scenario: fit, choice of the basis' size, pilot, plan, bounds, record.
 *
 * Fit, choice, pilot and every final round each draw their own paths; a plan is fixed before the draws that it is for.
 */
export async function valueScenario(
  source: string | object,
  options: ValueOptions,
  environment: Environment,
): Promise<ValueOutcome> {
  const wrongOptions = [...judgeOptions(options), ...(options.plan === undefined ? [] : judgePlan(options.plan))];
  if (wrongOptions.length > 0) return { kind: 'refused', messages: wrongOptions };
  const outcome = prepare(source, options);
  if (outcome.kind === 'refused') return outcome;
  const { scenario, programs } = outcome.prepared;
  const { model } = scenario;
  const workerCount = options.workers ?? defaultWorkerCount(environment);
  const opened = openCandidates(model, programs, options, environment, workerCount);
  if (opened.kind === 'refused') return opened;

  let stage: Progress['stage'] = 'fit';
  const onProgress = (progress: Progress) => {
    stage = progress.stage;
    options.onProgress?.(progress);
  };
  const bench = new FitBench(model.seed, workerCount, environment, { ...options, onProgress });
  try {
    return { kind: 'delivered', record: await runStages(source, scenario, opened, bench) };
  } catch (problem) {
    if (problem instanceof Stopped) return { kind: 'stopped', stage };
    if (problem instanceof NotFinite)
      return { kind: 'refused', messages: [notFiniteMessage(problem.place, source, options.path ?? 'scenario')] };
    throw problem;
  } finally {
    await bench.close();
  }
}

async function runStages(
  source: string | object,
  scenario: CheckedScenario,
  opened: Extract<CandidatesOutcome, { kind: 'open' }>,
  bench: FitBench,
) {
  const { environment, options } = bench;
  const { method } = scenario.model;
  const started = environment.now();
  const { fitted, selection, ended } = await selectFit(bench, opened, method, started);
  const { candidate, fits } = fitted;
  const { programs, keeping } = candidate;
  const fittedAt = environment.now();
  const { plan, pilot } =
    fixedPlan(scenario, options, candidate) ?? (await choosePlan(fitted, scenario, options, environment, started));
  const plannedAt = environment.now();
  const isToWidth = pilot !== null && pilot.wantedWidth !== null;
  const { rounds, ...last } = await runRounds(fitted, method, plan, isToWidth, options);
  const finishedAt = environment.now();
  const seconds = (from: number, to: number) => (to - from) / 1000;
  return makeRecord({
    source,
    path: options.path ?? null,
    scenario,
    programs,
    selection,
    sizesEnded: ended,
    pilot,
    rounds,
    paths: describeKeeping(programs, plan.fitPathCount, keeping),
    fits,
    ...last,
    hashOf: environment.hashOf,
    interpreter: options.interpreter ?? 'wasm',
    versions: environment.versions,
    timing: {
      totalSeconds: seconds(started, finishedAt),
      fitSeconds: seconds(started, fittedAt),
      pilotSeconds: seconds(fittedAt, plannedAt),
      boundsSeconds: seconds(plannedAt, finishedAt),
    },
  });
}
