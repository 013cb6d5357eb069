import { stepUniforms } from '../paths/step-program.js';
import { type Purpose, streamKey } from '../paths/stream-keys.js';
import type { Interpreter, LoadedProgram } from '../program/interpreter.js';
import { createPlainInterpreter } from '../program/plain-interpreter.js';
import { blockLanes } from '../program/program.js';
import type { StreamKey } from '../program/stream.js';
import { dateUniforms } from './date-graph.js';
import { NotFinite } from './not-finite.js';
import { type Programs, programList, workspaceColumnCount } from './programs.js';
import type { Rule } from './rule.js';

/**
 * One block of lanes with everything that a model can do to it: the stages of a run are written in its words.
 *
 * A date is an index of the grid of times, today being 0; a step leads from a date to the next.
 */
export class Block {
  readonly interpreter: Interpreter;
  readonly columns: Float64Array;
  /** Paths in this block; lanes beyond are not looked at. */
  lanes = blockLanes;
  readonly #step: LoadedProgram;
  readonly #evaluate: LoadedProgram;
  readonly #amounts: LoadedProgram;
  readonly #variables: LoadedProgram;
  readonly #polynomials: LoadedProgram;
  readonly #keys = new Map<Purpose, StreamKey[]>();

  constructor(
    readonly programs: Programs,
    readonly seed: string,
  ) {
    const all = programList(programs);
    const scalarCount = all.reduce((total, program) => total + program.scalars.length, 0);
    this.interpreter = createPlainInterpreter(workspaceColumnCount(programs), scalarCount);
    this.columns = this.interpreter.columns;
    const [step, evaluate, amounts, variables, polynomials] = all.map((program) => this.interpreter.load(program));
    this.#step = step!;
    this.#evaluate = evaluate!;
    this.#amounts = amounts!;
    this.#variables = variables!;
    this.#polynomials = polynomials!;
  }

  /** The values of one column on the lanes in use; a view, changed by whatever runs next. */
  column(column: number): Float64Array {
    return this.columns.subarray(column * blockLanes, column * blockLanes + this.lanes);
  }

  get driverCount(): number {
    return this.programs.drivers.length;
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
    const { layout } = this.programs;
    this.#keysOf(purpose).forEach((key, index) => {
      this.interpreter.drawNormals(key, block, date, replicate, layout.innovations + index, this.lanes);
    });
  }

  /** Moves the drivers from `state` at a date to `next` at the following one. */
  step(date: number, firstPath: number): void {
    const { times, layout, drivers } = this.programs;
    this.#step.uniforms[stepUniforms.duration] = times[date + 1]! - times[date]!;
    this.interpreter.run(this.#step, this.lanes);
    const bad = this.interpreter.findNotFinite(layout.next, drivers.length, this.lanes) ?? this.#findVanished();
    if (bad === null) return;
    const { name, line, isPositive } = drivers[bad.column - layout.next]!;
    const value = this.columns[bad.column * blockLanes + bad.lane]!;
    const what =
      isPositive && value === 0
        ? `the driver ${name} fell below the smallest number there is; its logarithm`
        : `the driver ${name}`;
    throw new NotFinite({ what, line, path: firstPath + bad.lane, date: date + 1, time: times[date + 1]! });
  }

  /** A driver that its law keeps positive, rounded to 0. */
  #findVanished(): { column: number; lane: number } | null {
    const { layout, drivers } = this.programs;
    for (let driver = 0; driver < drivers.length; driver++) {
      if (!drivers[driver]!.isPositive) continue;
      const lane = this.column(layout.next + driver).indexOf(0);
      if (lane >= 0) return { column: layout.next + driver, lane };
    }
    return null;
  }

  /** Writes the variables of the automatic basis at `next`. */
  writeVariables(): void {
    this.interpreter.run(this.#variables, this.lanes);
  }

  /**
   * Writes discounted payoff, terminal amount and, before the last date, the basis columns for the drivers in `next`.
   */
  evaluate(date: number, rule: Rule, firstPath: number): void {
    const { times, discountFactors: factors, variableCount, layout } = this.programs;
    const program = date === times.length - 1 ? this.#amounts : this.#evaluate;
    const { uniforms } = program;
    uniforms[dateUniforms.clock] = times[date]!;
    uniforms[dateUniforms.discountFactor] = factors[date]!;
    uniforms[dateUniforms.untilNext] = (times[date + 1] ?? times[date]!) - times[date]!;
    uniforms[dateUniforms.untilLast] = times.at(-1)! - times[date]!;
    uniforms.set(
      rule.standards.subarray(date * variableCount * 2, (date + 1) * variableCount * 2),
      dateUniforms.firstStandard,
    );
    this.interpreter.run(program, this.lanes);
    this.#checkFinite(layout.payoff, 2, date, firstPath);
  }

  /** Says which basis column is not finite, if one is. */
  checkBasis(date: number, firstPath: number): void {
    this.#checkFinite(this.programs.layout.basis, this.programs.columns.length, date, firstPath);
  }

  /** Writes the continuation value at `next`, from the basis there, into a column. */
  continuation(date: number, rule: Rule, target: number, firstPath: number): void {
    const { layout, columns, floor } = this.programs;
    this.interpreter.combine(
      layout.basis,
      columns.length,
      rule.continuation,
      date * columns.length,
      target,
      this.lanes,
    );
    if (this.interpreter.findNotFinite(target, 1, this.lanes) !== null) this.checkBasis(date, firstPath);
    if (floor === null) return;
    const values = this.column(target);
    for (let lane = 0; lane < values.length; lane++) if (values[lane]! < floor) values[lane] = floor;
  }

  /**
   * Writes the fitted value at `next`: the larger of payoff and continuation value, which goes to `hold`; on the last
   * date the terminal amount.
   */
  value(date: number, rule: Rule, hold: number, target: number, firstPath: number): void {
    const { layout, times } = this.programs;
    const values = this.column(target);
    if (date === times.length - 1) {
      values.set(this.column(layout.terminal));
      return;
    }
    this.continuation(date, rule, hold, firstPath);
    const payoff = this.column(layout.payoff);
    const continuation = this.column(hold);
    for (let lane = 0; lane < values.length; lane++) values[lane] = Math.max(payoff[lane]!, continuation[lane]!);
  }

  /**
   * Writes the integrands at `next`, from the basis there, into as many columns as there are polynomials.
   *
   * @param coefficients polynomials × integrand columns, from the offset on
   */
  integrands(coefficients: Float64Array, offset: number, target: number): void {
    const { layout, integrandColumnCount: count, polynomialNames } = this.programs;
    for (let p = 0; p < polynomialNames.length; p++) {
      this.interpreter.combine(layout.basis, count, coefficients, offset + p * count, target + p, this.lanes);
    }
  }

  /** Writes the rule's integrands at a date. */
  ruleIntegrands(date: number, rule: Rule, target: number): void {
    const { integrandColumnCount, polynomialNames } = this.programs;
    this.integrands(rule.integrands, date * polynomialNames.length * integrandColumnCount, target);
  }

  /** Writes the polynomials of the innovations, given the drivers in `state`. */
  polynomials(): void {
    this.interpreter.run(this.#polynomials, this.lanes);
  }

  /** Adds factor × Σ integrand × polynomial to a column: the regressed martingale's increment over the step. */
  addIncrement(integrands: number, factor: number, target: number): void {
    const { layout, polynomialNames } = this.programs;
    const out = this.column(target);
    for (let p = 0; p < polynomialNames.length; p++) {
      const integrand = this.column(integrands + p);
      const polynomial = this.column(layout.polynomials + p);
      for (let lane = 0; lane < out.length; lane++)
        out[lane] = out[lane]! + factor * integrand[lane]! * polynomial[lane]!;
    }
  }

  #checkFinite(first: number, count: number, date: number, firstPath: number): void {
    const bad = this.interpreter.findNotFinite(first, count, this.lanes);
    if (bad === null) return;
    const { layout, columns, payoffLine, times } = this.programs;
    const isColumn = bad.column >= layout.basis;
    const column = isColumn ? columns[bad.column - layout.basis]! : null;
    const what =
      column !== null
        ? `the basis column ${column.name}`
        : bad.column === layout.payoff
          ? 'the payoff'
          : 'the amount at expiry';
    const line = column !== null ? column.line : payoffLine;
    throw new NotFinite({ what, line, path: firstPath + bad.lane, date, time: times[date]! });
  }

  #keysOf(purpose: Purpose): StreamKey[] {
    const known = this.#keys.get(purpose);
    if (known !== undefined) return known;
    const keys = this.programs.drivers.map(({ name }) => streamKey(this.seed, purpose, name));
    this.#keys.set(purpose, keys);
    return keys;
  }
}
