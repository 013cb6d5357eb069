import { type Moments, mergeMoments, momentsWithoutZeros, noMoments } from '../numeric/moments.js';
import type { Block } from './block.js';
import { type BlockRange, type FitStore, forEachBlock, loadPaths, valuesAt } from './fit-store.js';
import { NotFinite } from './not-finite.js';
import type { Programs } from './programs.js';
import type { Rule } from './rule.js';

/** Sums of one sweep over some blocks, to be added in the order of the blocks. */
export interface SweepSums {
  /** Σ column × column, lower triangle row by row. */
  readonly gram: Float64Array;
  /** Σ column × response. */
  readonly products: Float64Array;
  /** Σ column × response × polynomial. @shape polynomials × integrand columns */
  readonly integrandProducts: Float64Array;
  /** Over the paths whose contract goes on at the date. */
  readonly response: Moments;
}

/**
 * First sweep at a date: carries what each path brings from the following date on back to there, with the rule fitted
 * there, and sums the normal equations of that on the basis at this date.
 */
export function sweepValues(block: Block, store: FitStore, rule: Rule, date: number, range: BlockRange): SweepSums {
  const { interpreter } = block;
  const { layout, columns, unlessEnded } = block.programs;
  const sums = emptySums(block.programs, 'gram');
  let response = noMoments;
  forEachBlock(block, range, store.pathCount, (index, firstPath) => {
    carryBack(block, store, rule, date + 1, index, firstPath);
    valuesAt(store, date + 1, firstPath, block.lanes).set(block.column(layout.value));
    loadPaths(block, store, index, date);
    block.evaluate(date, rule, firstPath);
    if (layout.ended !== null) block.run(unlessEnded);
    interpreter.accumulateGram(layout.basis, columns.length, block.lanes, sums.gram);
    if (!hasFiniteSquares(sums.gram)) refuseColumns(block, sums.gram, date, firstPath);
    interpreter.accumulateProducts(layout.basis, columns.length, layout.value, 1, block.lanes, sums.products);
    response = mergeMoments(response, responseMoments(block, layout.value));
  });
  return { ...sums, response };
}

/**
 * Writes to `value` what each path brings from a date on, as `Programs.carry` says; on the last date the terminal
 * amount. What it brings later is in the store, and its martingale is the rule's regressed increment.
 */
function carryBack(block: Block, store: FitStore, rule: Rule, date: number, index: number, firstPath: number): void {
  const { layout, times, carry } = block.programs;
  const isLast = date === times.length - 1;
  if (!isLast) {
    loadPaths(block, store, index, date);
    block.advance();
    block.draw('fit', index, date, 0);
    block.polynomials();
  }
  loadPaths(block, store, index, date);
  block.evaluate(date, rule, firstPath);
  block.value(date, rule, firstPath);
  if (isLast) return;
  block.ruleIntegrands(date, rule);
  block.column(layout.stage).set(valuesAt(store, date + 1, firstPath, block.lanes));
  block.addIncrement(-1, layout.stage);
  block.run(carry);
}

/** Sums the products of basis and basis × polynomial with what the continuation value leaves of the next value. */
export function sweepResiduals(block: Block, store: FitStore, rule: Rule, date: number, range: BlockRange): SweepSums {
  const { columns, layout, rest } = block.programs;
  return sweepProducts(block, store, rule, date, range, (firstPath) => {
    block.combineBasis(rule.continuation, date * columns.length, layout.stage);
    block.column(layout.value).set(valuesAt(store, date + 1, firstPath, block.lanes));
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
    response = mergeMoments(response, responseMoments(block, stage));
  });
  return { ...sums, response };
}

/** Moments of a response that is 0 where the contract ends at the date: over the other lanes. */
function responseMoments({ interpreter, programs, lanes }: Block, column: number): Moments {
  const { ended } = programs.layout;
  return momentsWithoutZeros(interpreter.moments(column, lanes), ended === null ? 0 : interpreter.sum(ended, lanes));
}

/** Says which basis column is not finite, or too large for its square to be. */
function refuseColumns(block: Block, gram: Float64Array, date: number, firstPath: number): never {
  block.checkBasis(date, firstPath);
  const { columns, times } = block.programs;
  const { name, line } = columns.find((_, row) => !Number.isFinite(gram[(row * (row + 3)) / 2]))!;
  throw new NotFinite({
    what: `the square of the basis column ${name}`,
    line,
    path: firstPath,
    date,
    time: times[date]!,
  });
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
