import { largestLatticeDimensionCount } from '../paths/lattice.js';
import type { Purpose } from '../paths/stream-keys.js';
import type { Block } from '../rule/block.js';
import type { Rule } from '../rule/rule.js';
import { moveUniforms, type OuterPrograms } from './outer-programs.js';

/** Where inner points are asked for: the block, its first path, and the date that the step leaves. */
export interface InnerPlace {
  readonly purpose: Purpose;
  readonly index: number;
  readonly firstPath: number;
  readonly date: number;
}

/**
 * Sums the fitted value after one step from `state`, less the regressed increment, over inner points: over all of them and
 * over the first half. Leaves `next` and the basis overwritten.
 *
 * The points of one lane are a lattice, shifted by uniforms that are fresh for every lane, date and innovation, and folded by
 * the tent transformation. What their mean estimates is E[v(X′) | X], and without bias whatever the lattice: every point
 * alone has the law of the step. How far it strays falls faster than one over the square root of the points where v bends
 * softly; nothing is proved for a payoff with kinks, and nothing rests on it, because errors are taken from the spread
 * between outer paths. That asks one thing: no two outer paths and no two dates may ever share a shift.
 *
 * The first half of the points is a lattice of its own when they are a power of two.
 *
 * @source Cranley & Patterson (1976), SIAM J. Numer. Anal. 13, 904-914 (random shifts); Hickernell (2002), Monte Carlo and
 *   Quasi-Monte Carlo Methods 2000, 274-289 (tent)
 * @cost points × lanes steps and evaluations
 */
export function sumInnerPoints(
  block: Block,
  { columns, addInner, move }: OuterPrograms,
  rule: Rule,
  pointCount: number,
  { purpose, index, firstPath, date }: InnerPlace,
): void {
  const { layout } = block.programs;
  const half = Math.ceil(pointCount / 2);
  const isLattice = block.driverCount <= largestLatticeDimensionCount;
  block.column(columns.innerSum).fill(0);
  if (isLattice) block.drawShifts(purpose, index, date, columns.shifts);
  for (let point = 0; point < pointCount; point++) {
    if (isLattice) block.drawLatticePoint(point, columns.shifts);
    else block.draw(purpose, index, date, point);
    block.polynomials();
    block.step(date, firstPath);
    block.evaluate(date + 1, rule, firstPath);
    block.value(date + 1, rule, firstPath);
    block.addIncrement(-1, layout.value);
    block.run(addInner);
    if (point + 1 === half) block.interpreter.copy(columns.innerSum, columns.innerHalfSum, 1);
  }
  const { uniforms } = block.loaded(move['one-step']);
  uniforms[moveUniforms.inversePoints] = 1 / pointCount;
  uniforms[moveUniforms.inverseHalfPoints] = 1 / half;
}
