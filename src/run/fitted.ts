import type { StepFit } from '../rule/backward-induction.js';
import type { Executor } from '../workers/executor.js';
import type { JobContext } from '../workers/jobs.js';
import type { Candidate } from './candidates.js';
import type { Environment } from './environment.js';
import { openContext } from './fit-size.js';
import { runFit } from './fit-stage.js';
import type { Progress, ValueOptions } from './options.js';

/** A candidate whose rule is fitted, with the workers that hold it. */
export interface Fitted {
  readonly candidate: Candidate;
  readonly context: JobContext;
  readonly executor: Executor;
  readonly fits: readonly StepFit[];
  /** How long the fit took; only a time budget looks at it. */
  readonly milliseconds: number;
}

/** What stages take beside the model. */
export type StageOptions = ValueOptions & { readonly onProgress: (progress: Progress) => void };

/**
 * Fits candidates, each on workers of its own, and lets the workers go.
 *
 * Whoever opens a bench closes it, whatever happened in between.
 */
export class FitBench {
  readonly #open = new Set<Executor>();

  constructor(
    readonly seed: string,
    readonly workerCount: number,
    readonly environment: Environment,
    readonly options: StageOptions,
  ) {}

  /** @fails throws Stopped, and NotFinite from the paths */
  async fit(candidate: Candidate): Promise<Fitted> {
    const { programs, counts, keeping } = candidate;
    const { options, environment } = this;
    const kernels = environment.kernels(options.interpreter);
    const context = openContext(programs, this.seed, counts.fitPathCount, kernels, keeping);
    const executor = environment.openExecutor(context, this.workerCount);
    this.#open.add(executor);
    const onProgress: StageOptions['onProgress'] = (progress) =>
      options.onProgress({ ...progress, columnCount: programs.columns.length });
    const started = environment.now();
    const fits = await runFit(executor, programs, context.rule, context.store, options.signal, onProgress);
    return { candidate, context, executor, fits, milliseconds: environment.now() - started };
  }

  /** Ends the workers of a rule that is not wanted any more. */
  async dismiss({ executor }: Fitted): Promise<void> {
    this.#open.delete(executor);
    await executor.close();
  }

  async close(): Promise<void> {
    await Promise.all([...this.#open].map((executor) => executor.close()));
    this.#open.clear();
  }
}
