import { type Moments, mergeMoments, momentsOf, noMoments } from '../numeric/moments.js';
import { blockLanes } from '../program/program.js';
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
  /** @shape blocks × dates (1 … last) × drivers × lanes */
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
        row[v] = mergeMoments(row[v]!, momentsOf(block.column(layout.variables + v), 0, block.lanes));
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
  const { layout, columns } = block.programs;
  const hold = layout.stage;
  const value = layout.stage + 1;
  const sums = emptySums(block.programs, 'gram');
  let response = noMoments;
  forEachBlock(block, range, store.pathCount, (index, firstPath) => {
    loadPaths(block, store, index, date + 1);
    block.evaluate(date + 1, rule, firstPath);
    block.value(date + 1, rule, hold, value, firstPath);
    const values = block.column(value);
    store.values.set(values, firstPath);
    loadPaths(block, store, index, date);
    block.evaluate(date, rule, firstPath);
    block.checkBasis(date, firstPath);
    block.interpreter.accumulateGram(layout.basis, columns.length, block.lanes, sums.gram);
    block.interpreter.accumulateProducts(layout.basis, columns.length, value, 1, block.lanes, sums.products);
    response = mergeMoments(response, momentsOf(values, 0, block.lanes));
  });
  return { ...sums, response };
}

/** Sums the products of basis and basis × polynomial with what the continuation value leaves of the next value. */
export function sweepResiduals(block: Block, store: FitStore, rule: Rule, date: number, range: BlockRange): SweepSums {
  const { columns, layout } = block.programs;
  return sweepProducts(block, store, rule, date, range, (firstPath, target) => {
    block.interpreter.combine(
      layout.basis,
      columns.length,
      rule.continuation,
      date * columns.length,
      target,
      block.lanes,
    );
    const rest = block.column(target);
    for (let lane = 0; lane < block.lanes; lane++) rest[lane] = store.values[firstPath + lane]! - rest[lane]!;
  });
}

/** Sums the same products with what the store's direction would add on each path: one product of the joint problem. */
export function sweepDirection(block: Block, store: FitStore, rule: Rule, date: number, range: BlockRange): SweepSums {
  const { columns, layout } = block.programs;
  return sweepProducts(block, store, rule, date, range, (_, target) => {
    block.interpreter.combine(layout.basis, columns.length, store.direction, 0, target, block.lanes);
    block.integrands(store.direction, columns.length, layout.integrands);
    block.addIncrement(layout.integrands, 1, target);
  });
}

function sweepProducts(
  block: Block,
  store: FitStore,
  rule: Rule,
  date: number,
  range: BlockRange,
  writeResponse: (firstPath: number, target: number) => void,
): SweepSums {
  const { layout, columns, integrandColumnCount, polynomialNames } = block.programs;
  const polynomialCount = polynomialNames.length;
  const single = layout.stage;
  const sums = emptySums(block.programs, 'products');
  let response = noMoments;
  forEachBlock(block, range, store.pathCount, (index, firstPath) => {
    loadPaths(block, store, index, date);
    block.advance();
    block.draw('fit', index, date, 0);
    block.polynomials();
    block.evaluate(date, rule, firstPath);
    writeResponse(firstPath, single);
    const values = block.column(single);
    for (let p = 0; p < polynomialCount; p++) {
      const polynomial = block.column(layout.polynomials + p);
      const target = block.column(single + 1 + p);
      for (let lane = 0; lane < block.lanes; lane++) target[lane] = values[lane]! * polynomial[lane]!;
    }
    const { interpreter, lanes } = block;
    interpreter.accumulateProducts(layout.basis, columns.length, single, 1, lanes, sums.products);
    const { integrandProducts } = sums;
    interpreter.accumulateProducts(
      layout.basis,
      integrandColumnCount,
      single + 1,
      polynomialCount,
      lanes,
      integrandProducts,
    );
    response = mergeMoments(response, momentsOf(values, 0, block.lanes));
  });
  return { ...sums, response };
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
  return (index * (times.length - 1) + date - 1) * drivers.length * blockLanes;
}

function storePaths(block: Block, store: FitStore, index: number, date: number): void {
  const first = block.programs.layout.next * blockLanes;
  store.paths.set(
    block.columns.subarray(first, first + block.driverCount * blockLanes),
    pathOffset(block, index, date),
  );
}

function loadPaths(block: Block, store: FitStore, index: number, date: number): void {
  if (date === 0) {
    block.restart();
    return;
  }
  const offset = pathOffset(block, index, date);
  block.columns.set(
    store.paths.subarray(offset, offset + block.driverCount * blockLanes),
    block.programs.layout.next * blockLanes,
  );
}
