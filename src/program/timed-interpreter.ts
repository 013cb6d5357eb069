import type { Interpreter, InterpreterMaker } from './interpreter.js';

/** Time spent in one kernel or program. */
export interface KernelTime {
  readonly name: string;
  readonly milliseconds: number;
  readonly callCount: number;
  /** Lanes worked through, all calls together. */
  readonly laneCount: number;
}

/** Interpreters that keep time, and what they kept since it was last taken. */
export interface TimedInterpreters {
  readonly make: InterpreterMaker;
  /** The kernels by falling time; starts anew. */
  take(): KernelTime[];
}

/** Wraps interpreters so that each call is timed; results stay the same. @param now milliseconds, from any origin */
export function timeInterpreters(make: InterpreterMaker, now: () => number): TimedInterpreters {
  let times = new Map<string, { milliseconds: number; callCount: number; laneCount: number }>();
  const timed = <T>(name: string, lanes: number, work: () => T): T => {
    const started = now();
    const result = work();
    const time = times.get(name) ?? { milliseconds: 0, callCount: 0, laneCount: 0 };
    time.milliseconds += now() - started;
    time.callCount++;
    time.laneCount += lanes;
    times.set(name, time);
    return result;
  };
  const wrap = (inner: Interpreter): Interpreter => ({
    columns: inner.columns,
    programs: inner.programs,
    run: (program, lanes) => timed(`program: ${program.name}`, lanes, () => inner.run(program, lanes)),
    copy: (...words) => timed('copies', 0, () => inner.copy(...words)),
    drawNormals: (...words) => timed('normal draws', words[5], () => inner.drawNormals(...words)),
    drawUniforms: (...words) => timed('shifts of lattices', words[5], () => inner.drawUniforms(...words)),
    latticeNormals: (...words) => timed('points of lattices', words[3], () => inner.latticeNormals(...words)),
    combine: (...words) =>
      timed(`combinations of columns, ${words[5]} at once`, words[6], () => inner.combine(...words)),
    addProducts: (...words) => timed('regressed increments', words[5], () => inner.addProducts(...words)),
    accumulateGram: (...words) => timed('normal equations', words[2], () => inner.accumulateGram(...words)),
    accumulateProducts: (...words) => timed('right-hand sides', words[4], () => inner.accumulateProducts(...words)),
    sum: (...words) => timed('sums and moments', words[1], () => inner.sum(...words)),
    moments: (...words) => timed('sums and moments', words[1], () => inner.moments(...words)),
    areBetween: (...words) => timed('checks for finite numbers', words[3], () => inner.areBetween(...words)),
  });
  return {
    make: (room) => wrap(make(room)),
    take() {
      const taken = [...times].map(([name, time]) => ({ name, ...time }));
      times = new Map();
      return taken.sort((a, b) => b.milliseconds - a.milliseconds);
    },
  };
}
