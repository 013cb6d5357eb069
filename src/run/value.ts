import type { NestedSums } from '../bounds/nested-paths.js';
import type { OuterSums } from '../bounds/outer-sums.js';
import type { Plan } from '../result/record.js';
import { NotFinite } from '../rule/not-finite.js';
import type { Executor } from '../workers/executor.js';
import type { JobContext } from '../workers/jobs.js';
import { runNested, runOuter } from './bounds-stage.js';
import { countsBeforePilot } from './counts.js';
import { defaultWorkerCount, type Environment } from './environment.js';
import { decideKeeping, describeKeeping } from './fit-memory.js';
import { openContext } from './fit-size.js';
import { runFit } from './fit-stage.js';
import { forecastOf } from './forecast.js';
import { judgeCounts, judgePlan } from './judge-counts.js';
import { judgeOptions } from './judge-options.js';
import { makeRecord } from './make-record.js';
import { notFiniteMessage } from './not-finite-message.js';
import type { Progress, ValueOptions, ValueOutcome } from './options.js';
import { Stopped } from './parcels.js';
import { choosePlan, fixedPlan } from './pilot-stage.js';
import { type Prepared, prepare } from './prepare.js';

/**
 * Values a scenario: fit, pilot, plan, bounds, record.
 *
 * The fit, the pilot and the final run each draw their own paths; the plan is fixed before the final draws.
 */
export async function valueScenario(
  source: string | object,
  options: ValueOptions,
  environment: Environment,
): Promise<ValueOutcome> {
  const wrongOptions = judgeOptions(options);
  if (wrongOptions.length > 0) return { kind: 'refused', messages: wrongOptions };
  const outcome = prepare(source, options);
  if (outcome.kind === 'refused') return outcome;
  const { scenario, programs } = outcome.prepared;
  const workerCount = options.workers ?? defaultWorkerCount(environment);
  const counts = options.plan ?? countsBeforePilot(programs, scenario.model.method);
  const planMessages = options.plan === undefined ? [] : judgePlan(options.plan);
  if (planMessages.length > 0) return { kind: 'refused', messages: planMessages };
  const kept = decideKeeping(programs, counts.fitPathCount, options.fitMemoryBytes);
  if (kept.kind === 'refused') return kept;
  const { keeping } = kept;
  const forecast = forecastOf(programs, counts, keeping, workerCount, environment.memoryBytes);
  const messages = judgeCounts(programs, counts, forecast);
  if (messages.length > 0) return { kind: 'refused', messages };

  const kernels = environment.kernels(options.interpreter);
  const context = openContext(programs, scenario.model.seed, counts.fitPathCount, kernels, keeping);
  const executor = environment.openExecutor(context, workerCount);
  let stage: Progress['stage'] = 'fit';
  const onProgress = (progress: Progress) => {
    stage = progress.stage;
    options.onProgress?.(progress);
  };
  try {
    return {
      kind: 'delivered',
      record: await runStages(source, outcome.prepared, context, executor, { ...options, onProgress }, environment),
    };
  } catch (problem) {
    if (problem instanceof Stopped) return { kind: 'stopped', stage };
    if (problem instanceof NotFinite)
      return { kind: 'refused', messages: [notFiniteMessage(problem.place, source, options.path ?? 'scenario')] };
    throw problem;
  } finally {
    await executor.close();
  }
}

type StageOptions = ValueOptions & { readonly onProgress: (progress: Progress) => void };

async function runStages(
  source: string | object,
  { scenario, programs }: Prepared,
  context: JobContext,
  executor: Executor,
  options: StageOptions,
  environment: Environment,
) {
  const { signal, onProgress } = options;
  const started = environment.now();
  const fits = await runFit(executor, programs, context.rule, context.store, signal, onProgress);
  const fitted = environment.now();
  const { plan, pilot } =
    fixedPlan(scenario, options, programs) ??
    (await choosePlan(executor, scenario, programs, options, environment, started));
  const planned = environment.now();
  const { outer, nested, isComplete } = await runBounds(executor, programs, plan, options);
  const finished = environment.now();
  const seconds = (from: number, to: number) => (to - from) / 1000;
  return makeRecord({
    source,
    path: options.path ?? null,
    scenario,
    programs,
    plan,
    pilot,
    paths: describeKeeping(programs, plan.fitPathCount, context.store.keeping),
    fits,
    outer,
    nested,
    isComplete,
    hashOf: environment.hashOf,
    interpreter: options.interpreter ?? 'wasm',
    versions: environment.versions,
    timing: {
      totalSeconds: seconds(started, finished),
      fitSeconds: seconds(started, fitted),
      pilotSeconds: seconds(fitted, planned),
      boundsSeconds: seconds(planned, finished),
    },
  });
}

/** Draws the final paths; a stop in between delivers what is there, unless nothing is. */
async function runBounds(
  executor: Executor,
  programs: Prepared['programs'],
  plan: Plan,
  { signal, onProgress }: StageOptions,
): Promise<{ outer: OuterSums; nested: NestedSums | null; isComplete: boolean }> {
  const outer = await runOuter(executor, programs, 'outer', plan, signal, onProgress);
  if (outer.sums.lower.count < 2) throw new Stopped();
  if (plan.nestedOuterPathCount === 0) return { outer: outer.sums, nested: null, isComplete: outer.isComplete };
  const nested = await runNested(executor, plan, signal, onProgress);
  const isUsable = nested.sums.upper.count >= 2;
  return {
    outer: outer.sums,
    nested: isUsable ? nested.sums : null,
    isComplete: outer.isComplete && nested.isComplete,
  };
}
