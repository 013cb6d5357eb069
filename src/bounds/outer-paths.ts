import { noMoments } from '../numeric/moments.js';
import { type Purpose, purposeInRound } from '../paths/stream-keys.js';
import type { Block } from '../rule/block.js';
import { type BlockRange, forEachBlock } from '../rule/fit-store.js';
import type { Rule } from '../rule/rule.js';
import { sumInnerPoints } from './inner-points.js';
import type { OuterKind, OuterPrograms } from './outer-programs.js';
import { mergeOuterSums, noOuterSums, type OuterSums } from './outer-sums.js';

/** Which draws a set of outer paths uses; those of a bracket have rounds, from 1 on. */
export type OuterPurpose = 'select' | 'pilot' | 'outer';

/** What a set of outer paths is asked for. */
export interface OuterWork {
  readonly purpose: OuterPurpose;
  readonly round: number;
  readonly pathCount: number;
  /** Points of one step at every path and date; with none, the regressed martingale stands for the one-step one. */
  readonly innerPointCount: number;
}

/**
 * Both bounds on one set of outer paths, with the one-step martingale of the fitted value.
 *
 * The increment over a step is v(X′) - E[v(X′) | X], v the larger of payoff and fitted continuation value. The
 * conditional mean is estimated from inner points spread evenly and drawn afresh for every path and date, today included,
 * with the regressed increment as control (`inner-points.ts`). What the estimates mean:
 *
 * - lower: mean of payoff less martingale where the rule exercises. The inner noise has mean 0 and is independent of the
 *   path given the state, so its mean is the value of the rule: biased low for the best value by what the rule misses, only.
 * - upper: mean of the largest payoff less martingale. Noise inside a maximum can only raise its mean: biased high.
 *
 * Where the ending event holds, what it pays is the path's last amount: a running path takes it, the maxima take it in,
 * and nothing later counts.
 *
 * Without inner points the regressed martingale, exact whatever its coefficients, serves both.
 *
 * @source Haugh & Kogan (2004), Operations Research 52, 258-270; Rogers (2002), Mathematical Finance 12, 271-286
 * @cost outer paths × dates × (inner points + 1) steps and evaluations
 */
export function runOuterPaths(
  block: Block,
  outer: OuterPrograms,
  rule: Rule,
  work: OuterWork,
  range: BlockRange,
): OuterSums {
  let total = noOuterSums(block.programs.times.length);
  forEachBlock(block, range, work.pathCount, (index, firstPath) => {
    total = mergeOuterSums(total, runBlock(block, outer, rule, work, index, firstPath));
  });
  return total;
}

function runBlock(
  block: Block,
  outer: OuterPrograms,
  rule: Rule,
  work: OuterWork,
  index: number,
  firstPath: number,
): OuterSums {
  const { times, todayIsDecisionDate, layout } = block.programs;
  const { innerPointCount } = work;
  const purposes = purposesOf(work);
  const kind: OuterKind = innerPointCount > 0 ? 'one-step' : 'regressed';
  const last = times.length - 1;
  const exerciseCounts = times.map(() => 0);
  const endedCounts = times.map(() => 0);
  const chooseAt = (date: number) => {
    block.run(date === last ? outer.chooseLast[kind] : outer.choose[kind]);
    exerciseCounts[date] = block.interpreter.sum(outer.columns.exercised, block.lanes);
    if (layout.ended !== null) endedCounts[date] = block.interpreter.sum(outer.columns.ended, block.lanes);
  };

  openPaths(block, outer);
  block.restart();
  block.evaluate(0, rule, firstPath);
  block.value(0, rule, firstPath);
  if (todayIsDecisionDate) chooseAt(0);
  for (let date = 0; date < last; date++) {
    const arrives = date + 1;
    block.ruleIntegrands(date, rule);
    block.advance();
    if (innerPointCount > 0)
      sumInnerPoints(block, outer, rule, innerPointCount, { purpose: purposes.inner, index, firstPath, date });
    block.draw(purposes.outer, index, date, 0);
    block.polynomials();
    block.column(outer.columns.regressedStep).fill(0);
    block.addIncrement(1, outer.columns.regressedStep);
    block.step(date, firstPath);
    block.evaluate(arrives, rule, firstPath);
    block.value(arrives, rule, firstPath);
    block.run(outer.move[kind]);
    chooseAt(arrives);
  }
  return { ...sumPaths(block, outer, kind), exerciseCounts, endedCounts };
}

function purposesOf({ purpose, round }: OuterWork): { outer: Purpose; inner: Purpose } {
  if (purpose !== 'outer') return { outer: purpose, inner: `${purpose} inner` };
  return { outer: purposeInRound('outer', round), inner: purposeInRound('inner', round) };
}

/** Puts the lanes of a block at the start: nothing taken off, nothing brought, all running. */
function openPaths(block: Block, { columns }: OuterPrograms): void {
  const { regressed, martingale, halfMartingale, lower, plain } = columns;
  const { upper, halfUpper, regressedUpper, running, alive } = columns;
  for (const column of [regressed, martingale, halfMartingale, lower, plain]) block.column(column).fill(0);
  for (const column of [upper, halfUpper, regressedUpper]) block.column(column).fill(Number.NEGATIVE_INFINITY);
  for (const column of [running, alive]) block.column(column).fill(1);
}

function sumPaths(
  block: Block,
  outer: OuterPrograms,
  kind: OuterKind,
): Omit<OuterSums, 'exerciseCounts' | 'endedCounts'> {
  const { interpreter, lanes } = block;
  const { columns, gaps } = outer;
  const moments = (column: number) => interpreter.moments(column, lanes);
  const oneStep = (column: number) => (kind === 'one-step' ? moments(column) : noMoments);
  const bounds = {
    lower: moments(columns.lower),
    plain: moments(columns.plain),
    regressed: moments(columns.regressedUpper),
    upper: oneStep(columns.upper),
    halfInner: oneStep(columns.halfUpper),
  };
  block.run(gaps[kind]);
  return {
    ...bounds,
    regressedGap: moments(columns.regressedUpper),
    gap: oneStep(columns.upper),
    neverCount: interpreter.sum(columns.unused, lanes),
  };
}
