import { type Moments, mergeMoments, noMoments } from '../numeric/moments.js';
import { blockLanes, columnStride } from '../program/program.js';
import type { Block } from './block.js';
import type { Programs } from './programs.js';
import type { Rule } from './rule.js';

/**
 * The fit's paths and values, on shared memory.
 *
 * A sweep writes values only from the paths and the rule, so that a sweep which broke off can be run again.
 */
export interface FitStore {
  readonly pathCount: number;
  /** @shape blocks × dates (1 … last) × drivers × columnStride */
  readonly paths: Float64Array;
  /** Fitted value of each path at the date after the one in work, in money of today. @shape paths */
  readonly values: Float64Array;
  /** Direction of search at the date in work. @shape columns, then polynomials × integrand columns */
  readonly direction: Float64Array;
}

/** A run of whole blocks; the smallest unit that is handed to a worker. */
export interface BlockRange {
  readonly firstBlock: number;
  readonly blockCount: number;
}

/** Sums of one sweep over some blocks, to be added in the order of the blocks. */
export interface SweepSums {
  /** Σ column × column, lower triangle row by row. */
  readonly gram: Float64Array;
  /** Σ column × response. */
  readonly products: Float64Array;
  /** Σ column × response × polynomial. @shape polynomials × integrand columns */
  readonly integrandProducts: Float64Array;
  readonly response: Moments;
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

/** Draws and stores the fit's paths; returns moments of the variables. @shape result: dates × variables, date 0 empty */
export function simulateFit(block: Block, store: FitStore, range: BlockRange): Moments[][] {
  const { programs } = block;
  const { layout } = programs;
  const moments = programs.times.map(() => new Array<Moments>(programs.variableCount).fill(noMoments));
  forEachBlock(block, range, store.pathCount, (index, firstPath) => {
    block.restart();
    for (let date = 0; date + 1 < programs.times.length; date++) {
      block.advance();
      block.draw('fit', index, date, 0);
      block.step(date, firstPath);
      storePaths(block, store, index, date + 1);
      block.writeVariables();
      const row = moments[date + 1]!;
      for (let v = 0; v < programs.variableCount; v++) {
        row[v] = mergeMoments(row[v]!, block.interpreter.moments(layout.variables + v, block.lanes));
      }
    }
  });
  return moments;
}

/**
 * First sweep at a date: values each path at the following date with the rule fitted there, and sums the normal
 * equations of that on the basis at this date.
 */
export function sweepValues(block: Block, store: FitStore, rule: Rule, date: number, range: BlockRange): SweepSums {
  const { interpreter } = block;
  const { layout, columns } = block.programs;
  const sums = emptySums(block.programs, 'gram');
  let response = noMoments;
  forEachBlock(block, range, store.pathCount, (index, firstPath) => {
    loadPaths(block, store, index, date + 1);
    block.evaluate(date + 1, rule, firstPath);
    block.value(date + 1, rule, firstPath);
    store.values.set(block.column(layout.value), firstPath);
    loadPaths(block, store, index, date);
    block.evaluate(date, rule, firstPath);
    interpreter.accumulateGram(layout.basis, columns.length, block.lanes, sums.gram);
    if (!hasFiniteSquares(sums.gram)) block.checkBasis(date, firstPath);
    interpreter.accumulateProducts(layout.basis, columns.length, layout.value, 1, block.lanes, sums.products);
    response = mergeMoments(response, interpreter.moments(layout.value, block.lanes));
  });
  return { ...sums, response };
}

/** Sums the products of basis and basis × polynomial with what the continuation value leaves of the next value. */
export function sweepResiduals(block: Block, store: FitStore, rule: Rule, date: number, range: BlockRange): SweepSums {
  const { columns, layout, rest } = block.programs;
  return sweepProducts(block, store, rule, date, range, (firstPath) => {
    block.combineBasis(rule.continuation, date * columns.length, layout.stage);
    block.column(layout.value).set(store.values.subarray(firstPath, firstPath + block.lanes));
    block.run(rest);
  });
}

/** Sums the same products with what the store's direction would add on each path: one product of the joint problem. */
export function sweepDirection(block: Block, store: FitStore, rule: Rule, date: number, range: BlockRange): SweepSums {
  const { columns, layout } = block.programs;
  return sweepProducts(block, store, rule, date, range, () => {
    block.combineBasis(store.direction, 0, layout.stage);
    block.integrands(store.direction, columns.length);
    block.addIncrement(1, layout.stage);
  });
}

/** @param writeResponse writes each path's response to the first column of the stage */
function sweepProducts(
  block: Block,
  store: FitStore,
  rule: Rule,
  date: number,
  range: BlockRange,
  writeResponse: (firstPath: number) => void,
): SweepSums {
  const { interpreter } = block;
  const { layout, columns, integrandColumnCount, polynomialNames, responses } = block.programs;
  const { basis, stage } = layout;
  const sums = emptySums(block.programs, 'products');
  const { products, integrandProducts } = sums;
  let response = noMoments;
  forEachBlock(block, range, store.pathCount, (index, firstPath) => {
    const { lanes } = block;
    loadPaths(block, store, index, date);
    block.advance();
    block.draw('fit', index, date, 0);
    block.polynomials();
    block.evaluate(date, rule, firstPath);
    writeResponse(firstPath);
    block.run(responses);
    interpreter.accumulateProducts(basis, columns.length, stage, 1, lanes, products);
    interpreter.accumulateProducts(
      basis,
      integrandColumnCount,
      stage + 1,
      polynomialNames.length,
      lanes,
      integrandProducts,
    );
    response = mergeMoments(response, interpreter.moments(stage, lanes));
  });
  return { ...sums, response };
}

/** Whether the sums of squares, the diagonal of the triangle, are finite: if they are, so is every value behind them. */
function hasFiniteSquares(gram: Float64Array): boolean {
  for (let row = 0, at = 0; at < gram.length; row++, at += row + 1) if (!Number.isFinite(gram[at])) return false;
  return true;
}

function emptySums(
  { columns, integrandColumnCount, polynomialNames }: Programs,
  kind: 'gram' | 'products',
): Omit<SweepSums, 'response'> {
  const columnCount = columns.length;
  return {
    gram: new Float64Array(kind === 'gram' ? (columnCount * (columnCount + 1)) / 2 : 0),
    products: new Float64Array(columnCount),
    integrandProducts: new Float64Array(kind === 'gram' ? 0 : integrandColumnCount * polynomialNames.length),
  };
}

function pathOffset(block: Block, index: number, date: number): number {
  const { times, drivers } = block.programs;
  return (index * (times.length - 1) + date - 1) * drivers.length * columnStride;
}

function storePaths(block: Block, store: FitStore, index: number, date: number): void {
  store.paths.set(nextDrivers(block), pathOffset(block, index, date));
}

function loadPaths(block: Block, store: FitStore, index: number, date: number): void {
  if (date === 0) {
    block.restart();
    return;
  }
  const drivers = nextDrivers(block);
  const offset = pathOffset(block, index, date);
  drivers.set(store.paths.subarray(offset, offset + drivers.length));
}

/** The columns of the drivers at `next`, as they stand in the workspace. */
function nextDrivers(block: Block): Float64Array {
  const first = block.programs.layout.next * columnStride;
  return block.interpreter.columns.subarray(first, first + block.driverCount * columnStride);
}
