/** Lanes of one block: as many paths as run together through each instruction. */
export const blockLanes = 512;

/**
 * Numbers from the start of one column of a workspace to the next: a block and one cache line. Columns a power of two
 * apart would compete for the same few places of the cache (measured: an addition takes half as long again).
 */
export const columnStride = blockLanes + 8;

/** Integers of one instruction: operation code, target, three operands. */
export const instructionWidth = 5;

/**
 * A straight-line program over columns of lanes: plain data, the same for every interpreter.
 *
 * An operand of the lane code that is 0 or more names a column of the workspace; a negative one, -1 - i, names scalar
 * i, which all lanes share. The uniform code computes scalars from scalars, once for each run.
 */
export interface Program {
  readonly name: string;
  /** Initial scalars: the uniform inputs (zeros), then constants, then results of the uniform code (zeros). */
  readonly scalars: Float64Array;
  readonly uniformInputCount: number;
  /** @shape instructions × 5; targets and operands are indices of scalars */
  readonly uniformCode: Int32Array;
  /** @shape instructions × 5 */
  readonly laneCode: Int32Array;
  /** Columns of the workspace that the program touches: all indices are below this. */
  readonly columnCount: number;
}
