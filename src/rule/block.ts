import { latticeOffsets } from '../paths/lattice.js';
import { stepUniforms } from '../paths/step-program.js';
import { type Purpose, streamKeys } from '../paths/stream-keys.js';
import type { Interpreter, InterpreterMaker, LoadedProgram } from '../program/interpreter.js';
import { blockLanes, columnStride, type Program } from '../program/program.js';
import { dateUniforms } from './date-graph.js';
import { NotFinite } from './not-finite.js';
import { largestNumberCount, type Programs, programList, workspaceColumnCount } from './programs.js';
import type { Rule } from './rule.js';

/** Neighbouring drivers whose laws keep them all above the same number. */
interface DriverRun {
  readonly first: number;
  readonly count: number;
  readonly lowest: number;
}

/**
 * One block of lanes with everything that a model can do to it: the stages of a run are written in its words.
 *
 * A date is an index of the grid of times, today being 0; a step leads from a date to the next.
 */
export class Block {
  readonly interpreter: Interpreter;
  /** Paths in this block; lanes beyond are not looked at. */
  lanes = blockLanes;
  readonly #loaded: Map<Program, LoadedProgram>;
  readonly #keys = new Map<Purpose, Int32Array>();
  readonly #driverRuns: readonly DriverRun[];
  /** Of one point of a lattice, for each innovation. */
  readonly #offsets: Float64Array;

  /** @param stagePrograms what the stages run beside the model's own programs */
  constructor(
    readonly programs: Programs,
    readonly seed: string,
    makeInterpreter: InterpreterMaker,
    stagePrograms: readonly Program[] = [],
  ) {
    const all = [...programList(programs), ...stagePrograms];
    const columnCount = Math.max(
      workspaceColumnCount(programs),
      ...stagePrograms.map((program) => program.columnCount),
    );
    this.interpreter = makeInterpreter({ columnCount, programs: all, numberCount: largestNumberCount(programs) });
    this.#loaded = new Map(all.map((program, index) => [program, this.interpreter.programs[index]!]));
    this.#driverRuns = findDriverRuns(programs);
    this.#offsets = new Float64Array(programs.drivers.length);
  }

  /** The values of one column on the lanes in use; a view, changed by whatever runs next. */
  column(column: number): Float64Array {
    return this.interpreter.columns.subarray(column * columnStride, column * columnStride + this.lanes);
  }

  get driverCount(): number {
    return this.programs.drivers.length;
  }

  /** Runs one of the model's or the stages' programs. */
  run(program: Program): void {
    this.interpreter.run(this.loaded(program), this.lanes);
  }

  loaded(program: Program): LoadedProgram {
    const loaded = this.#loaded.get(program);
    if (loaded === undefined) throw new Error('the block was not made with this program');
    return loaded;
  }

  /** Puts every path at its start, as the state after a step that led to today. */
  restart(): void {
    this.programs.drivers.forEach(({ start }, index) => {
      this.column(this.programs.layout.next + index).fill(start);
    });
  }

  /** Takes the drivers after the last step as the state before the next. */
  advance(): void {
    this.interpreter.copy(this.programs.layout.next, this.programs.layout.state, this.driverCount);
  }

  /** Draws the innovations of the step that leaves a date. `replicate` tells repeated draws of one step apart. */
  draw(purpose: Purpose, block: number, date: number, replicate: number): void {
    const { innovations } = this.programs.layout;
    this.interpreter.drawNormals(this.#keysOf(purpose), block, date, replicate, innovations, this.lanes);
  }

  /**
   * Draws the shifts of a lattice for the step that leaves a date: one for every lane and innovation, to columns from the
   * first on. They are the stream of replicate 0, so a purpose serves either these or plain draws.
   */
  drawShifts(purpose: Purpose, block: number, date: number, firstColumn: number): void {
    this.interpreter.drawUniforms(this.#keysOf(purpose), block, date, 0, firstColumn, this.lanes);
  }

  /** Takes one point of the lattice, shifted as the columns say, as the innovations of the step. */
  drawLatticePoint(point: number, firstShift: number): void {
    latticeOffsets(point, this.#offsets);
    this.interpreter.latticeNormals(firstShift, this.#offsets, this.programs.layout.innovations, this.lanes);
  }

  /** Moves the drivers from `state` at a date to `next` at the following one. */
  step(date: number, firstPath: number): void {
    const { times, layout, step } = this.programs;
    this.loaded(step).uniforms[stepUniforms.duration] = times[date + 1]! - times[date]!;
    this.run(step);
    for (const { first, count, lowest } of this.#driverRuns) {
      if (!this.interpreter.areBetween(layout.next + first, count, lowest, this.lanes))
        throw this.#badDriver(date + 1, firstPath);
    }
  }

  /** Writes the variables of the automatic basis at `next`. */
  writeVariables(): void {
    this.run(this.programs.variables);
  }

  /**
   * Writes discounted payoff, terminal amount, whether the ending event holds and, before the last date, the basis columns
   * for the drivers in `next`.
   */
  evaluate(date: number, rule: Rule, firstPath: number): void {
    const {
      times,
      discountFactors: factors,
      variableCount,
      layout,
      amounts,
      evaluate,
      todayIsDecisionDate,
    } = this.programs;
    const program = date === times.length - 1 ? amounts : evaluate;
    const { uniforms } = this.loaded(program);
    uniforms[dateUniforms.clock] = times[date]!;
    uniforms[dateUniforms.discountFactor] = factors[date]!;
    uniforms[dateUniforms.untilNext] = (times[date + 1] ?? times[date]!) - times[date]!;
    uniforms[dateUniforms.untilLast] = times.at(-1)! - times[date]!;
    uniforms[dateUniforms.isDecisionDate] = date > 0 || todayIsDecisionDate ? 1 : 0;
    const firstStandard = date * variableCount * 2;
    for (let i = 0; i < variableCount * 2; i++)
      uniforms[dateUniforms.firstStandard + i] = rule.standards[firstStandard + i]!;
    this.run(program);
    this.#checkFinite(layout.payoff, layout.basis - layout.payoff, date, firstPath);
  }

  /** Says which basis column is not finite, if one is. */
  checkBasis(date: number, firstPath: number): void {
    this.#checkFinite(this.programs.layout.basis, this.programs.columns.length, date, firstPath);
  }

  /** Writes basis × coefficients, from the basis at `next`, into a column. */
  combineBasis(coefficients: Float64Array, offset: number, target: number): void {
    const { layout, columns } = this.programs;
    this.interpreter.combine(layout.basis, columns.length, coefficients, offset, target, 1, this.lanes);
  }

  /**
   * Writes the fitted value at `next` to `value`: the larger of payoff and continuation value, which goes to `hold`; on
   * the last date the terminal amount. Where the ending event holds, what it pays.
   */
  value(date: number, rule: Rule, firstPath: number): void {
    const { layout, times, columns, value } = this.programs;
    if (date === times.length - 1) {
      this.interpreter.copy(layout.terminal, layout.value, 1);
      return;
    }
    this.combineBasis(rule.continuation, date * columns.length, layout.hold);
    if (!this.interpreter.areBetween(layout.hold, 1, Number.NEGATIVE_INFINITY, this.lanes))
      this.checkBasis(date, firstPath);
    this.run(value);
  }

  /**
   * Writes the integrands at `next`, from the basis there, to `integrands`.
   *
   * @param coefficients polynomials × integrand columns, from the offset on
   */
  integrands(coefficients: Float64Array, offset: number): void {
    const { layout, integrandColumnCount: count, polynomialNames } = this.programs;
    const polynomialCount = polynomialNames.length;
    if (polynomialCount === 0) return;
    this.interpreter.combine(layout.basis, count, coefficients, offset, layout.integrands, polynomialCount, this.lanes);
  }

  /** Writes the rule's integrands at a date. */
  ruleIntegrands(date: number, rule: Rule): void {
    const { integrandColumnCount, polynomialNames } = this.programs;
    this.integrands(rule.integrands, date * polynomialNames.length * integrandColumnCount);
  }

  /** Writes the polynomials of the innovations, given the drivers in `state`. */
  polynomials(): void {
    this.run(this.programs.polynomials);
  }

  /** Adds Σ integrand × polynomial to a column, or takes it off: the regressed martingale's increment over the step. */
  addIncrement(sign: 1 | -1, target: number): void {
    const { layout, polynomialNames } = this.programs;
    const { integrands, polynomials } = layout;
    this.interpreter.addProducts(integrands, polynomials, polynomialNames.length, sign, target, this.lanes);
  }

  /** A driver that is not finite, or that its law keeps positive and that was rounded to 0. */
  #badDriver(date: number, firstPath: number): NotFinite {
    const { times, layout, drivers } = this.programs;
    const place = this.#firstWhere(layout.next, drivers.length, (value, driver) => {
      return !Number.isFinite(value) || (drivers[driver]!.isPositive && value <= 0);
    });
    if (place === null) throw new Error('a bound on the drivers failed without a driver that breaks it');
    const { name, line } = drivers[place.position]!;
    const what =
      place.value === 0
        ? `the driver ${name} fell below the smallest number there is; its logarithm`
        : `the driver ${name}`;
    return new NotFinite({ what, line, path: firstPath + place.lane, date, time: times[date]! });
  }

  #checkFinite(first: number, count: number, date: number, firstPath: number): void {
    if (this.interpreter.areBetween(first, count, Number.NEGATIVE_INFINITY, this.lanes)) return;
    const place = this.#firstWhere(first, count, (value) => !Number.isFinite(value));
    if (place === null) throw new Error('a check for finite numbers failed without one that is not');
    const { what, line } = this.#nameOf(first + place.position, place.lane);
    throw new NotFinite({ what, line, path: firstPath + place.lane, date, time: this.programs.times[date]! });
  }

  /** What stands in a column of amounts or of the basis on one lane, and its line. */
  #nameOf(column: number, lane: number): { what: string; line: number | null } {
    const { layout, columns, payoffLine, endingLines } = this.programs;
    if (column >= layout.basis) {
      const { name, line } = columns[column - layout.basis]!;
      return { what: `the basis column ${name}`, line };
    }
    const ended = layout.ended === null ? 0 : this.column(layout.ended)[lane]!;
    if (Number.isNaN(ended)) return { what: 'the ending event', line: endingLines!.event };
    if (ended !== 0) return { what: 'the amount that the ending event pays', line: endingLines!.pays };
    return { what: column === layout.payoff ? 'the payoff' : 'the amount at expiry', line: payoffLine };
  }

  /** The first value that meets a test, column by column. */
  #firstWhere(first: number, count: number, isMet: (value: number, position: number) => boolean) {
    for (let position = 0; position < count; position++) {
      const values = this.column(first + position);
      const lane = values.findIndex((value) => isMet(value, position));
      if (lane >= 0) return { position, lane, value: values[lane]! };
    }
    return null;
  }

  #keysOf(purpose: Purpose): Int32Array {
    const known = this.#keys.get(purpose);
    if (known !== undefined) return known;
    const names = this.programs.drivers.map(({ name }) => name);
    const keys = streamKeys(this.seed, purpose, names);
    this.#keys.set(purpose, keys);
    return keys;
  }
}

function findDriverRuns({ drivers }: Programs): DriverRun[] {
  const runs: DriverRun[] = [];
  drivers.forEach(({ isPositive }, index) => {
    const lowest = isPositive ? 0 : Number.NEGATIVE_INFINITY;
    const run = runs.at(-1);
    if (run?.lowest === lowest) runs[runs.length - 1] = { ...run, count: run.count + 1 };
    else runs.push({ first: index, count: 1, lowest });
  });
  return runs;
}
