import type { Moments } from '../numeric/moments.js';
import type { Program } from './program.js';

/** A program made ready for one interpreter. */
export interface LoadedProgram {
  readonly name: string;
  /** Uniform inputs, to be filled before each run. */
  readonly uniforms: Float64Array;
}

/** What an interpreter is made for: its memory is laid out once. */
export interface Room {
  readonly columnCount: number;
  readonly programs: readonly Program[];
  /** Most coefficients that one `combine`, sums that one `accumulate…`, keys or offsets that one draw will bring. */
  readonly numberCount: number;
}

/**
 * Runs programs and the kernels around them on a workspace of columns, one block at a time.
 *
 * Every method is defined to the last bit, so that another interpreter gives the same bits. A sum over lanes is two
 * running sums, of the even and of the odd lanes, and ends as the first plus the second. Methods work on lanes
 * 0 … lanes - 1; what they leave in the lanes of a target beyond those is not defined.
 */
export interface Interpreter {
  /** The workspace: column c starts at c × `columnStride`; filled by callers, changed by runs. */
  readonly columns: Float64Array;
  /** The programs of the room, in its order. */
  readonly programs: readonly LoadedProgram[];
  run(program: LoadedProgram, lanes: number): void;
  copy(fromColumn: number, toColumn: number, columnCount: number): void;
  /**
   * Fills columns with independent standard normals; each is the stream that its key and the three numbers name.
   *
   * @param keys low and high half of each column's key. @shape columns × 2
   */
  drawNormals(
    keys: Int32Array,
    block: number,
    date: number,
    replicate: number,
    firstColumn: number,
    lanes: number,
  ): void;
  /**
   * Fills columns with the uniforms (k + ½) 2⁻⁵² of the same streams, of which `drawNormals` takes the quantiles.
   *
   * @param keys low and high half of each column's key. @shape columns × 2
   */
  drawUniforms(
    keys: Int32Array,
    block: number,
    date: number,
    replicate: number,
    firstColumn: number,
    lanes: number,
  ): void;
  /**
   * Writes one point of a lattice that is shifted afresh in every lane, as standard normals: the quantile of
   * `latticeUniform(shift, offset)`, column by column.
   *
   * @param firstShift columns of uniforms, one for each offset
   * @param offsets of the point, each from 0 up to 1 and a multiple of 2⁻⁵². @shape columns
   */
  latticeNormals(firstShift: number, offsets: Float64Array, firstColumn: number, lanes: number): void;
  /**
   * Writes Σ coefficient × column over `count` columns from `firstColumn`, in their order, to each target.
   *
   * @param coefficients from `offset` on. @shape targets × columns
   */
  combine(
    firstColumn: number,
    count: number,
    coefficients: Float64Array,
    offset: number,
    firstTarget: number,
    targetCount: number,
    lanes: number,
  ): void;
  /** Adds the products of `count` pairs of columns to a target, in their order; takes them off for a sign of -1. */
  addProducts(firstLeft: number, firstRight: number, count: number, sign: 1 | -1, target: number, lanes: number): void;
  /** Adds the sums of products of every pair of columns, lower triangle row by row, to `sums`. */
  accumulateGram(firstColumn: number, count: number, lanes: number, sums: Float64Array): void;
  /** Adds the sums of response × column to `sums`. @shape responses × columns */
  accumulateProducts(
    firstColumn: number,
    count: number,
    firstResponse: number,
    responseCount: number,
    lanes: number,
    sums: Float64Array,
  ): void;
  sum(column: number, lanes: number): number;
  /** Moments of a column, by two passes. */
  moments(column: number, lanes: number): Moments;
  /** Whether every value lies above `lowest` and below infinity; not-a-number does not. */
  areBetween(firstColumn: number, count: number, lowest: number, lanes: number): boolean;
}

/** Makes an interpreter; which kind does not change a bit of any result. */
export type InterpreterMaker = (room: Room) => Interpreter;
