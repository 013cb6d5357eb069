import type { Program } from './program.js';
import type { StreamKey } from './stream.js';

/** A program made ready for one interpreter. */
export interface LoadedProgram {
  /** Uniform inputs, to be filled before each run. */
  readonly uniforms: Float64Array;
}

/**
 * Runs programs and the kernels around them on a workspace of columns, one block at a time.
 *
 * Every method is defined to the last bit, reductions included: another interpreter must give the same bits. Sums over
 * lanes use four running sums, lane i going to sum i mod 4, and end as (s0 + s2) + (s1 + s3).
 */
export interface Interpreter {
  /** The workspace, column after column, each `blockLanes` long; filled by callers, changed by runs. */
  readonly columns: Float64Array;
  load(program: Program): LoadedProgram;
  /** Runs on lanes 0 … lanes - 1; the other lanes keep what they held. */
  run(program: LoadedProgram, lanes: number): void;
  copy(fromColumn: number, toColumn: number, columnCount: number): void;
  /** Fills a column with independent standard normals of the stream that the key and the three numbers name. */
  drawNormals(key: StreamKey, block: number, date: number, replicate: number, column: number, lanes: number): void;
  /** Writes Σ coefficient × column over `count` columns from `firstColumn`, in their order, into a column. */
  combine(
    firstColumn: number,
    count: number,
    coefficients: Float64Array,
    offset: number,
    target: number,
    lanes: number,
  ): void;
  /** Adds the sums of products of every pair of columns, lower triangle row by row, to `target`. */
  accumulateGram(firstColumn: number, count: number, lanes: number, target: Float64Array): void;
  /** Adds the sums of response × column to `target`. @shape responses × columns */
  accumulateProducts(
    firstColumn: number,
    count: number,
    firstResponse: number,
    responseCount: number,
    lanes: number,
    target: Float64Array,
  ): void;
  /** The first column, from `firstColumn`, that holds a value that is not finite, with its lane; null if all are. */
  findNotFinite(firstColumn: number, count: number, lanes: number): { column: number; lane: number } | null;
}
