import type { Message } from '../messages/message.js';
import { type KernelTime, timeInterpreters } from '../program/timed-interpreter.js';
import { runNested, runOuter } from '../run/bounds-stage.js';
import { openCandidates } from '../run/candidates.js';
import type { Environment } from '../run/environment.js';
import { openContext } from '../run/fit-size.js';
import { runFit } from '../run/fit-stage.js';
import { choosePlan, fixedPlan } from '../run/pilot-stage.js';
import { prepare } from '../run/prepare.js';
import { createInProcessExecutor } from '../workers/in-process.js';
import { createJobRunner, interpreterMaker } from '../workers/jobs.js';

/** Where the time of one stage goes. */
export interface StageProfile {
  readonly stage: 'fit' | 'pilot' | 'bounds';
  readonly seconds: number;
  /** The rest of the stage is work outside the kernels. */
  readonly kernels: readonly (KernelTime & { readonly share: number; readonly nsPerLane: number | null })[];
}

/** The stages in their order, or the mistakes of the scenario. */
export type ProfileOutcome =
  | { readonly kind: 'measured'; readonly stages: readonly StageProfile[] }
  | { readonly kind: 'refused'; readonly messages: readonly Message[] };

/** Which size of the basis is profiled, where there are several: the one that fixed counts take. */
const profiledSize = 1;

/** Runs a scenario in the calling thread with a clock around every kernel. */
export async function profileScenario(source: string, path: string, environment: Environment): Promise<ProfileOutcome> {
  const outcome = prepare(source, { path });
  if (outcome.kind === 'refused') return outcome;
  const { scenario, programs: smallest } = outcome.prepared;
  const { now } = environment;
  const opened = openCandidates(scenario.model, smallest, {}, environment, 0);
  if (opened.kind === 'refused') return opened;
  const candidate = opened.candidates[Math.min(profiledSize, opened.candidates.length - 1)]!;
  const { programs, counts, keeping } = candidate;
  const { seed } = scenario.model;
  const context = openContext(programs, seed, counts.fitPathCount, environment.kernels('wasm'), keeping);
  const { make, take } = timeInterpreters(interpreterMaker(context.kernels), now);
  const executor = createInProcessExecutor(createJobRunner(context, make));
  const options = { onProgress: () => {} };
  const profiles: StageProfile[] = [];
  const staged = async <T>(stage: StageProfile['stage'], work: () => Promise<T>): Promise<T> => {
    const started = now();
    const result = await work();
    const milliseconds = now() - started;
    const kernels = take().map((time) => ({
      ...time,
      share: time.milliseconds / milliseconds,
      nsPerLane: time.laneCount === 0 ? null : (time.milliseconds * 1e6) / time.laneCount,
    }));
    profiles.push({ stage, seconds: milliseconds / 1000, kernels });
    return result;
  };
  const fits = await staged('fit', () => runFit(executor, programs, context.rule, context.store, undefined, () => {}));
  const { plan } =
    fixedPlan(scenario, options, candidate) ??
    (await staged('pilot', () =>
      choosePlan({ candidate, context, executor, fits, milliseconds: 0 }, scenario, options, environment, now()),
    ));
  await staged('bounds', async () => {
    await runOuter(executor, programs, 'outer', plan, plan.round, undefined, () => {});
    if (plan.nestedOuterPathCount > 0) await runNested(executor, plan, plan.round, undefined, () => {});
  });
  return { kind: 'measured', stages: profiles };
}
