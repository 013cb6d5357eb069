import { type Moments, mergeMoments, noMoments } from '../numeric/moments.js';
import type { Block } from './block.js';
import { type BlockRange, type FitStore, forEachBlock, loadDrivers, storeDrivers } from './fit-store.js';
import { checkpointBefore, checkpointSlotOf, segmentCount, segmentEnd, segmentStart, slotOf } from './path-keeping.js';

/**
 * Draws the fit's paths over all dates; stores the checkpoints and the last segment.
 *
 * @returns moments of the variables. @shape dates × variables, date 0 empty
 */
export function simulateFit(block: Block, store: FitStore, range: BlockRange): Moments[][] {
  const { programs } = block;
  const { keeping } = store;
  const { layout, variableCount } = programs;
  const dateCount = programs.times.length - 1;
  const moments = programs.times.map(() => new Array<Moments>(variableCount).fill(noMoments));
  const lastStart = segmentStart(keeping, segmentCount(keeping) - 1);
  const checkpointSlots = programs.times.map((_, date) => checkpointSlotOf(keeping, date));
  forEachBlock(block, range, store.pathCount, (index, firstPath) => {
    block.restart();
    for (let date = 1; date <= dateCount; date++) {
      stepTo(block, index, date, firstPath);
      if (date > lastStart) storeDrivers(block, store, index, slotOf(keeping, date));
      const checkpointSlot = checkpointSlots[date]!;
      if (checkpointSlot !== null) storeDrivers(block, store, index, checkpointSlot);
      block.writeVariables();
      const row = moments[date]!;
      for (let v = 0; v < variableCount; v++) {
        row[v] = mergeMoments(row[v]!, block.interpreter.moments(layout.variables + v, block.lanes));
      }
    }
  });
  return moments;
}

/**
 * Simulates a segment again from the checkpoint before it and stores it over the one that was in memory, all but the
 * latter's first date. It reads only checkpoints and writes none, so that a restoring which broke off can be run again.
 *
 * @returns steps of paths that it took
 */
export function restoreSegment(block: Block, store: FitStore, segment: number, range: BlockRange): number {
  const { keeping } = store;
  const from = checkpointBefore(keeping, segment);
  const [start, end] = [segmentStart(keeping, segment), segmentEnd(keeping, segment)];
  const checkpointSlot = checkpointSlotOf(keeping, from);
  let stepCount = 0;
  forEachBlock(block, range, store.pathCount, (index, firstPath) => {
    if (checkpointSlot === null) block.restart();
    else loadDrivers(block, store, index, checkpointSlot);
    for (let date = from + 1; date <= end; date++) {
      stepTo(block, index, date, firstPath);
      if (date > start) storeDrivers(block, store, index, slotOf(keeping, date));
    }
    stepCount += block.lanes * (end - from);
  });
  return stepCount;
}

/** Moves a block of the fit's paths to a date from the one before, which is at `next`. */
function stepTo(block: Block, index: number, date: number, firstPath: number): void {
  block.advance();
  block.draw('fit', index, date - 1, 0);
  block.step(date - 1, firstPath);
}
