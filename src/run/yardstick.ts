import { median } from 'simple-statistics';
import { estimateOf, type MeanEstimate } from '../numeric/estimate.js';
import { blockLanes } from '../program/program.js';
import { type FitWork, fitRule } from '../rule/backward-induction.js';
import { Block } from '../rule/block.js';
import { buildPrograms, type Programs, withoutMartingale } from '../rule/programs.js';
import { readScenario } from '../scenario/read.js';
import type { Executor } from '../workers/executor.js';
import { interpreterMaker, type JobContext } from '../workers/jobs.js';
import { runOuter } from './bounds-stage.js';
import type { Environment } from './environment.js';
import { openContext } from './fit-size.js';
import { fitWorkOn } from './fit-stage.js';
import { yardstickScenario } from './yardstick-scenario.js';

/** Speed on a fixed problem: nanoseconds for each unit of work, with what was computed on the way. */
export interface YardstickLine {
  readonly program: 'tarry';
  readonly nsPerNormal: number;
  readonly nsPerStateStep: number;
  /** For each path and regression: columns of two dates, normal equations, decision. */
  readonly nsPerPathDateFit: number;
  /** For each path and date: draws, step, columns, decision. */
  readonly nsPerPathDateForward: number;
  readonly lower: number;
  readonly halfWidth95: number;
  /** A sum over what was drawn, so that no work can be left out. */
  readonly sink: number;
}

/** The same work on threads. */
export interface WorkersLine {
  readonly program: 'tarry';
  readonly workers: number;
  readonly nsPerPathDateFit: number;
  readonly nsPerPathDateForward: number;
  /** Times as fast as one worker with the same work. */
  readonly speedupFit: number;
  readonly speedupForward: number;
}

const seed = 'yardstick';
const warmUpPathCount = 65_536;
/** Least seconds of one worker's work behind a comparison of workers. */
const leastSeconds = 5;

/** Measures the calling thread, through the same programs, interpreter and conductors as a valuation. */
export async function runYardstick(pathCount: number, environment: Environment): Promise<YardstickLine> {
  const programs = yardstickPrograms();
  const draws = measureDraws(programs, pathCount, environment);
  await withPasses(programs, warmUpPathCount, [0], environment, async ([passes]) => measureOnce(passes!));
  const { fitSeconds, forwardSeconds, lower } = await withPasses(
    programs,
    pathCount,
    [0],
    environment,
    async ([passes]) => measureOnce(passes!),
  );
  return {
    program: 'tarry',
    ...draws,
    nsPerPathDateFit: nsPerPathDate(programs, pathCount, fitSeconds),
    nsPerPathDateForward: nsPerPathDate(programs, pathCount, forwardSeconds),
    lower: rounded(lower.value, 4),
    halfWidth95: rounded(lower.halfWidth95 ?? Number.NaN, 4),
  };
}

/**
 * Measures several workers against one, both warm: passes alternate, so that a machine whose speed drifts treats both
 * alike, and the medians are told.
 */
export async function runYardstickWorkers(
  pathCount: number,
  workers: number,
  environment: Environment,
): Promise<WorkersLine> {
  const programs = yardstickPrograms();
  return withPasses(programs, pathCount, [1, workers], environment, async ([one, several]) => {
    await measureOnce(one!);
    await measureOnce(several!);
    const fit = await compare(one!.fitOnce, several!.fitOnce);
    const forward = await compare(
      async () => (await one!.valueOnce()).seconds,
      async () => (await several!.valueOnce()).seconds,
    );
    return {
      program: 'tarry',
      workers,
      nsPerPathDateFit: nsPerPathDate(programs, pathCount, fit.seconds),
      nsPerPathDateForward: nsPerPathDate(programs, pathCount, forward.seconds),
      speedupFit: rounded(fit.speedup, 2),
      speedupForward: rounded(forward.speedup, 2),
    };
  });
}

async function compare(
  one: () => Promise<number>,
  several: () => Promise<number>,
): Promise<{ seconds: number; speedup: number }> {
  const rounds: { one: number; several: number }[] = [];
  for (let total = 0; total < leastSeconds; total += rounds.at(-1)!.one)
    rounds.push({ one: await one(), several: await several() });
  return {
    seconds: median(rounds.map((round) => round.several)),
    speedup: median(rounds.map((round) => round.one / round.several)),
  };
}

function yardstickPrograms(): Programs {
  const { scenario, messages } = readScenario(yardstickScenario, {});
  if (scenario === null) throw new Error(`the yardstick's scenario has mistakes: ${JSON.stringify(messages)}`);
  return withoutMartingale(buildPrograms(scenario.model));
}

function nsPerPathDate(programs: Programs, pathCount: number, seconds: number): number {
  return rounded((seconds * 1e9) / (pathCount * (programs.times.length - 1)), 1);
}

/** Draws alone, and draws with steps, on one block again and again. */
function measureDraws(programs: Programs, pathCount: number, { now, kernels }: Environment) {
  const block = new Block(programs, seed, interpreterMaker(kernels('wasm')));
  const dateCount = programs.times.length - 1;
  const { innovations, next } = programs.layout;
  const blockCount = Math.ceil(pathCount / blockLanes);
  const units = blockCount * blockLanes * dateCount * programs.drivers.length;
  let sink = 0;
  const nsPerUnit = (work: (index: number) => void) => {
    for (let index = 0; index < warmUpPathCount / blockLanes; index++) work(index);
    const started = now();
    for (let index = 0; index < blockCount; index++) work(index);
    return rounded(((now() - started) * 1e6) / units, 2);
  };
  const nsPerNormal = nsPerUnit((index) => {
    for (let date = 0; date < dateCount; date++) block.draw('outer', index, date, 0);
    sink += block.column(innovations)[3]!;
  });
  const nsPerStateStep = nsPerUnit((index) => {
    block.restart();
    for (let date = 0; date < dateCount; date++) {
      block.advance();
      block.draw('outer', index, date, 0);
      block.step(date, index * blockLanes);
    }
    sink += block.column(next)[0]!;
  });
  return { nsPerNormal, nsPerStateStep, sink: Math.round(sink) };
}

/** Seconds of one pass each, and what the forward pass found. */
interface Measured {
  readonly fitSeconds: number;
  readonly forwardSeconds: number;
  readonly lower: MeanEstimate;
}

/** One fit over stored paths, their simulation not counted, and one forward valuation on fresh paths. */
interface Passes {
  fitOnce(): Promise<number>;
  valueOnce(): Promise<{ seconds: number; lower: MeanEstimate }>;
}

async function measureOnce({ fitOnce, valueOnce }: Passes): Promise<Measured> {
  const fitSeconds = await fitOnce();
  const { seconds, lower } = await valueOnce();
  return { fitSeconds, forwardSeconds: seconds, lower };
}

/** Opens an executor for each count of workers on one store of paths, and gives what can be measured on each. */
async function withPasses<T>(
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
      const { sums } = await runOuter(executor, programs, 'outer', counts, undefined, () => {});
      return { seconds: (now() - started) / 1000, lower: estimateOf(sums.lower) };
    },
  };
}

function rounded(value: number, digits: number): number {
  return Number(value.toFixed(digits));
}
