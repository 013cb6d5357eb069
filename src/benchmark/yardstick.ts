import { median } from 'simple-statistics';
import type { Programs } from '../rule/programs.js';
import type { Environment } from '../run/environment.js';
import { measureDraws } from './draws.js';
import { measureOnce, withPasses } from './passes.js';
import { yardstickPrograms } from './problems.js';
import { rounded } from './rounded.js';

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

const warmUpPathCount = 65_536;
/** Least seconds of one worker's work behind a comparison of workers. */
const leastSeconds = 5;
/** A median of fewer would be at the mercy of a single disturbance. */
const fewestRounds = 5;

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
  for (let total = 0; total < leastSeconds || rounds.length < fewestRounds; total += rounds.at(-1)!.one)
    rounds.push({ one: await one(), several: await several() });
  return {
    seconds: median(rounds.map((round) => round.several)),
    speedup: median(rounds.map((round) => round.one / round.several)),
  };
}

function nsPerPathDate(programs: Programs, pathCount: number, seconds: number): number {
  return rounded((seconds * 1e9) / (pathCount * (programs.times.length - 1)), 1);
}
