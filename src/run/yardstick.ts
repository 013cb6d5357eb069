import { estimateOf, type MeanEstimate } from '../numeric/estimate.js';
import { blockLanes } from '../program/program.js';
import { fitRule } from '../rule/backward-induction.js';
import { Block } from '../rule/block.js';
import { buildPrograms, type Programs, withoutMartingale } from '../rule/programs.js';
import { readScenario } from '../scenario/read.js';
import { interpreterMaker } from '../workers/jobs.js';
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
  await withPasses(programs, warmUpPathCount, 0, environment, measureOnce);
  const { fitSeconds, forwardSeconds, lower } = await withPasses(programs, pathCount, 0, environment, measureOnce);
  return {
    program: 'tarry',
    ...draws,
    ...perPathDate(programs, pathCount, fitSeconds, forwardSeconds),
    lower: rounded(lower.value, 4),
    halfWidth95: rounded(lower.halfWidth95 ?? Number.NaN, 4),
  };
}

/** Measures several workers against one, both warm. */
export async function runYardstickWorkers(
  pathCount: number,
  workers: number,
  environment: Environment,
): Promise<WorkersLine> {
  const programs = yardstickPrograms();
  const one = await withPasses(programs, pathCount, 1, environment, measureWarm);
  const several = await withPasses(programs, pathCount, workers, environment, measureWarm);
  return {
    program: 'tarry',
    workers,
    ...perPathDate(programs, pathCount, several.fitSeconds, several.forwardSeconds),
    speedupFit: rounded(one.fitSeconds / several.fitSeconds, 2),
    speedupForward: rounded(one.forwardSeconds / several.forwardSeconds, 2),
  };
}

function yardstickPrograms(): Programs {
  const { scenario, messages } = readScenario(yardstickScenario, {});
  if (scenario === null) throw new Error(`the yardstick's scenario has mistakes: ${JSON.stringify(messages)}`);
  return withoutMartingale(buildPrograms(scenario.model));
}

function perPathDate(programs: Programs, pathCount: number, fitSeconds: number, forwardSeconds: number) {
  const pathDates = pathCount * (programs.times.length - 1);
  return {
    nsPerPathDateFit: rounded((fitSeconds * 1e9) / pathDates, 1),
    nsPerPathDateForward: rounded((forwardSeconds * 1e9) / pathDates, 1),
  };
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

/** Repeats each pass until it has lasted long enough, after one that warms the threads up. */
async function measureWarm({ fitOnce, valueOnce }: Passes): Promise<Measured> {
  const { lower } = await measureOnce({ fitOnce, valueOnce });
  return {
    fitSeconds: await meanSeconds(fitOnce),
    forwardSeconds: await meanSeconds(async () => (await valueOnce()).seconds),
    lower,
  };
}

async function meanSeconds(pass: () => Promise<number>): Promise<number> {
  let total = 0;
  let count = 0;
  for (; total < leastSeconds; count++) total += await pass();
  return total / count;
}

async function withPasses(
  programs: Programs,
  pathCount: number,
  workerCount: number,
  environment: Environment,
  measure: (passes: Passes) => Promise<Measured>,
): Promise<Measured> {
  const { now } = environment;
  const context = openContext(programs, seed, pathCount, environment.kernels('wasm'));
  const { rule, store } = context;
  const executor = environment.openExecutor(context, workerCount);
  const seconds = async <T>(work: () => Promise<T>): Promise<{ seconds: number; result: T }> => {
    const started = now();
    const result = await work();
    return { seconds: (now() - started) / 1000, result };
  };
  try {
    const work = fitWorkOn(executor, programs, store, undefined, () => {});
    const simulated = await work.simulate();
    const counts = { outerPathCount: pathCount, innerPointCount: 0 };
    return await measure({
      fitOnce: async () =>
        (await seconds(() => fitRule(programs, rule, store.direction, { ...work, simulate: async () => simulated })))
          .seconds,
      valueOnce: async () => {
        const outer = await seconds(() => runOuter(executor, programs, 'outer', counts, undefined, () => {}));
        return { seconds: outer.seconds, lower: estimateOf(outer.result.sums.lower) };
      },
    });
  } finally {
    await executor.close();
  }
}

function rounded(value: number, digits: number): number {
  return Number(value.toFixed(digits));
}
