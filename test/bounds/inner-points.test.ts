/** Shifts of the inner points: fresh for every lane, date and block, and what happens to the error bars if they were not. */
import { expect, test } from 'vitest';
import { runOuterPaths } from '#built/bounds/outer-paths.js';
import { buildOuterPrograms, outerProgramList } from '#built/bounds/outer-programs.js';
import type { Moments } from '#built/numeric/moments.js';
import { wasmInterpreters } from '#built/program/wasm-interpreter.js';
import { Block } from '#built/rule/block.js';
import { loadKernels } from '#built/workers/machine.js';
import { type Fitted, fitted } from '../fitted.js';
import { lots } from '../scenario-texts.js';
import { meanSquareBand } from '../statistics.js';

test('no shift serves twice: lanes, innovations, dates, blocks and purposes all have their own', async () => {
  const { block, programs } = await fitted(lots(), 512);
  const first = programs.layout.stage;
  const seen = new Set<number>();
  let drawn = 0;
  for (const purpose of ['inner', 'pilot inner'] as const) {
    for (let index = 0; index < 6; index++) {
      for (let date = 0; date < 9; date++) {
        block.drawShifts(purpose, index, date, first);
        for (let column = first; column < first + 2; column++) {
          for (const shift of block.column(column)) seen.add(shift);
          drawn += block.lanes;
        }
      }
    }
  }
  expect(seen.size).toBe(drawn);
});

const runCount = 60;
const innerPointCount = 8;

/** Upper bounds of independent runs, each on one block of outer paths of its own. */
function upperBounds({ programs, rule, context }: Fitted, change: (block: Block) => void): Moments[] {
  const outer = buildOuterPrograms(programs);
  const block = new Block(programs, context.seed, wasmInterpreters(loadKernels()), outerProgramList(outer));
  change(block);
  const work = { purpose: 'outer', round: 1, pathCount: runCount * 512, innerPointCount } as const;
  return Array.from(
    { length: runCount },
    (_, firstBlock) => runOuterPaths(block, outer, rule, work, { firstBlock, blockCount: 1 }).upper,
  );
}

/** Mean square of the runs' distances from their mean, in standard errors as reported: 1 where those are honest. */
function meanSquare(bounds: readonly Moments[]): number {
  const mean = bounds.reduce((sum, bound) => sum + bound.mean, 0) / bounds.length;
  const squares = bounds.map((bound) => ((bound.mean - mean) ** 2 * bound.count * (bound.count - 1)) / bound.squares);
  return squares.reduce((sum, square) => sum + square, 0) / (bounds.length - 1);
}

test('the upper bound strays between independent runs as far as its standard error says', async () => {
  const { low, high } = meanSquareBand(runCount - 1);
  const found = meanSquare(upperBounds(await fitted(lots(), 8192), () => {}));
  expect(found).toBeGreaterThan(low);
  expect(found).toBeLessThan(high);
});

test('control: one shift for all outer paths of a run is caught by the same check', async () => {
  const shared = (block: Block) => {
    const drawShifts = block.drawShifts.bind(block);
    block.drawShifts = (purpose, index, date, first) => {
      drawShifts(purpose, index, date, first);
      for (let column = first; column < first + block.driverCount; column++)
        block.column(column).fill(block.column(column)[0]!);
    };
  };
  const found = meanSquare(upperBounds(await fitted(lots(), 8192), shared));
  expect(found).toBeGreaterThan(5 * meanSquareBand(runCount - 1).high);
});
