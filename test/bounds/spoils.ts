import type { Spoil } from './brackets-of-blocks.js';

/** Gives every increment of the one-step martingale a mean, so that it is none. */
export function martingaleWithMean(meanOfStep: number): Spoil {
  return (block, outer, { innerPointCount }) => {
    const run = block.run.bind(block);
    block.run = (program) => {
      if (program === outer.move['one-step']) {
        const sums = block.column(outer.columns.innerSum);
        for (let lane = 0; lane < sums.length; lane++) sums[lane] = sums[lane]! - meanOfStep * innerPointCount;
      }
      run(program);
    };
  };
}

/** One shift of the inner points for all outer paths of a sample, at each date and innovation. */
export const oneShiftForAllPaths: Spoil = (block, _outer, { blocksEach }) => {
  const drawShifts = block.drawShifts.bind(block);
  block.drawShifts = (purpose, index, date, first) => {
    drawShifts(purpose, Math.floor(index / blocksEach), date, first);
    for (let column = first; column < first + block.driverCount; column++)
      block.column(column).fill(block.column(column)[0]!);
  };
};
