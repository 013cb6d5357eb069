import { blockLanes, columnStride } from '../program/program.js';
import type { Block } from './block.js';
import { type PathKeeping, slotCount, slotOf } from './path-keeping.js';
import type { Programs } from './programs.js';

/**
 * The fit's paths and values, on shared memory.
 *
 * What a sweep reads it does not write, so that a sweep which broke off can be run again.
 */
export interface FitStore {
  readonly pathCount: number;
  /** Which dates `paths` holds, and when. */
  readonly keeping: PathKeeping;
  /** Drivers at the dates in memory, then at the checkpoints. @shape blocks × slots × drivers × columnStride */
  readonly paths: Float64Array;
  /** What each path brings from a date on, in money of today, odd dates after even ones. @shape 2 × paths in whole blocks */
  readonly values: Float64Array;
  /** Direction of search at the date in work. @shape columns, then polynomials × integrand columns */
  readonly direction: Float64Array;
}

/** What the paths of the block in work bring from a date on; a view. */
export function valuesAt({ values }: FitStore, date: number, firstPath: number, lanes: number): Float64Array {
  const first = (date % 2) * (values.length / 2) + firstPath;
  return values.subarray(first, first + lanes);
}

/** A run of whole blocks; the smallest unit that is handed to a worker. */
export interface BlockRange {
  readonly firstBlock: number;
  readonly blockCount: number;
}

/** Runs `work` on each block of a range that still holds paths. */
export function forEachBlock(
  block: Block,
  range: BlockRange,
  pathCount: number,
  work: (index: number, firstPath: number) => void,
): void {
  for (let index = range.firstBlock; index < range.firstBlock + range.blockCount; index++) {
    const firstPath = index * blockLanes;
    block.lanes = Math.min(blockLanes, pathCount - firstPath);
    if (block.lanes <= 0) return;
    work(index, firstPath);
  }
}

/** Numbers that the drivers of so many paths take at one date; columns are padded and blocks are whole. */
export function slotLength({ drivers }: Programs, pathCount: number): number {
  return Math.ceil(pathCount / blockLanes) * drivers.length * columnStride;
}

/** Writes the drivers of a block at `next` to a slot of the store. */
export function storeDrivers(block: Block, store: FitStore, index: number, slot: number): void {
  store.paths.set(nextDrivers(block), slotOffset(block, store, index, slot));
}

/** Reads the drivers of a block from a slot of the store to `next`. */
export function loadDrivers(block: Block, store: FitStore, index: number, slot: number): void {
  const drivers = nextDrivers(block);
  const offset = slotOffset(block, store, index, slot);
  drivers.set(store.paths.subarray(offset, offset + drivers.length));
}

/** Reads the drivers of a block at a date of the segment in memory, or at today. */
export function loadPaths(block: Block, store: FitStore, index: number, date: number): void {
  if (date === 0) block.restart();
  else loadDrivers(block, store, index, slotOf(store.keeping, date));
}

function slotOffset({ driverCount }: Block, { keeping }: FitStore, index: number, slot: number): number {
  return (index * slotCount(keeping) + slot) * driverCount * columnStride;
}

/** The columns of the drivers at `next`, as they stand in the workspace. */
function nextDrivers(block: Block): Float64Array {
  const first = block.programs.layout.next * columnStride;
  return block.interpreter.columns.subarray(first, first + block.driverCount * columnStride);
}
