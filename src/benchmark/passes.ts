import { estimateOf, type MeanEstimate } from '../numeric/estimate.js';
import { type FitWork, fitRule } from '../rule/backward-induction.js';
import type { Programs } from '../rule/programs.js';
import { runOuter } from '../run/bounds-stage.js';
import type { Environment } from '../run/environment.js';
import { openContext } from '../run/fit-size.js';
import { fitWorkOn } from '../run/fit-stage.js';
import type { Executor } from '../workers/executor.js';
import type { JobContext } from '../workers/jobs.js';

const seed = 'yardstick';

/** Seconds of one pass each, and what the forward pass found. */
export interface Measured {
  readonly fitSeconds: number;
  readonly forwardSeconds: number;
  readonly lower: MeanEstimate;
}

/** One fit over stored paths, their simulation not counted, and one forward valuation on fresh paths. */
export interface Passes {
  fitOnce(): Promise<number>;
  valueOnce(): Promise<{ seconds: number; lower: MeanEstimate }>;
}

export async function measureOnce({ fitOnce, valueOnce }: Passes): Promise<Measured> {
  const fitSeconds = await fitOnce();
  const { seconds, lower } = await valueOnce();
  return { fitSeconds, forwardSeconds: seconds, lower };
}

/** Opens an executor for each count of workers on one store of paths, and gives what can be measured on each. */
export async function withPasses<T>(
  programs: Programs,
  pathCount: number,
  workerCounts: readonly number[],
  environment: Environment,
  measure: (passes: readonly Passes[]) => Promise<T>,
): Promise<T> {
  const context = openContext(programs, seed, pathCount, environment.kernels('wasm'));
  const executors = workerCounts.map((workerCount) => environment.openExecutor(context, workerCount));
  try {
    const simulated = await fitWorkOn(executors[0]!, programs, context.store, undefined, () => {}).simulate();
    return await measure(
      executors.map((executor) => passesOn(executor, context, pathCount, simulated, environment.now)),
    );
  } finally {
    await Promise.all(executors.map((executor) => executor.close()));
  }
}

function passesOn(
  executor: Executor,
  { programs, rule, store }: JobContext,
  pathCount: number,
  simulated: Awaited<ReturnType<FitWork['simulate']>>,
  now: () => number,
): Passes {
  const work = fitWorkOn(executor, programs, store, undefined, () => {});
  const counts = { outerPathCount: pathCount, innerPointCount: 0 };
  return {
    async fitOnce() {
      const started = now();
      await fitRule(programs, rule, store.direction, { ...work, simulate: async () => simulated });
      return (now() - started) / 1000;
    },
    async valueOnce() {
      const started = now();
      const { sums } = await runOuter(executor, programs, 'outer', counts, 1, undefined, () => {});
      return { seconds: (now() - started) / 1000, lower: estimateOf(sums.lower) };
    },
  };
}
