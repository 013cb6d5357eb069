import { type Moments, mergeMoments, noMoments } from '../numeric/moments.js';
import { purposeInRound } from '../paths/stream-keys.js';
import type { Block } from '../rule/block.js';
import { type BlockRange, forEachBlock } from '../rule/fit-store.js';
import type { Rule } from '../rule/rule.js';
import type { NestedPrograms } from './nested-programs.js';

/** Sums over the outer paths of the nested upper bound, in the decider's sign. */
export interface NestedSums {
  readonly upper: Moments;
  /** What continuing with the rule is worth today, by the inner paths from today. */
  readonly continuationToday: Moments;
}

/** What nested paths are asked for. */
export interface NestedWork {
  /** Each round of a run draws afresh; the first is 1. */
  readonly round: number;
  readonly pathCount: number;
  readonly innerPathCount: number;
}

/** The sums of no paths. */
export const noNestedSums: NestedSums = { upper: noMoments, continuationToday: noMoments };

/** Adds the sums of two stretches of paths, the earlier first. */
export function mergeNestedSums(a: NestedSums, b: NestedSums): NestedSums {
  return {
    upper: mergeMoments(a.upper, b.upper),
    continuationToday: mergeMoments(a.continuationToday, b.continuationToday),
  };
}

/**
 * The nested upper bound: the martingale of the *rule's* value, from inner paths that run until the rule exercises.
 *
 * With Q the worth of continuing with the rule and L = payoff where the rule exercises, Q elsewhere, the increment over
 * a step is L(next) - Q(now). Q is estimated afresh for every outer path and date, today included, with the regressed
 * martingale stopped at exercise as control. Q's noise has mean 0 given the path and sits inside a maximum, so the
 * mean is biased high, never low, by an amount that falls with the inner paths.
 *
 * Inner paths stop where the ending event holds, with what it pays; so do the maxima of the outer ones.
 *
 * It rests on the rule and not on the fitted value, and runs on outer paths of its own: an independent witness beside
 * the one-step bound.
 *
 * @source Andersen & Broadie (2004), Management Science 50, 1222-1234
 * @cost outer paths × dates² / 2 × inner paths
 */
export function runNestedPaths(
  block: Block,
  nested: NestedPrograms,
  rule: Rule,
  work: NestedWork,
  range: BlockRange,
): NestedSums {
  let total = noNestedSums;
  forEachBlock(block, range, work.pathCount, (index, firstPath) => {
    total = mergeNestedSums(total, runBlock(block, nested, rule, work, { index, firstPath }));
  });
  return total;
}

interface BlockPlace {
  readonly index: number;
  readonly firstPath: number;
}

function runBlock(block: Block, nested: NestedPrograms, rule: Rule, work: NestedWork, place: BlockPlace): NestedSums {
  const { layout, times, todayIsDecisionDate } = block.programs;
  const { interpreter, driverCount, lanes } = block;
  const { columns } = nested;
  const { index, firstPath } = place;
  const last = times.length - 1;
  let today = noMoments;

  block.column(columns.martingale).fill(0);
  block.column(columns.upper).fill(Number.NEGATIVE_INFINITY);
  block.column(columns.alive).fill(1);
  block.restart();
  for (let date = 0; date <= last; date++) {
    const isDecisionDate = date > 0 || todayIsDecisionDate;
    block.evaluate(date, rule, firstPath);
    interpreter.copy(date === last ? layout.terminal : layout.payoff, columns.amount, 1);
    if (layout.ended !== null) interpreter.copy(layout.ended, columns.ended, 1);
    interpreter.copy(layout.next, columns.drivers, driverCount);
    if (date === last) {
      block.column(columns.exercises).fill(1);
      interpreter.copy(columns.amount, columns.continuation, 1);
    } else {
      if (isDecisionDate) {
        block.value(date, rule, firstPath);
        block.run(nested.decide);
      } else block.column(columns.exercises).fill(0);
      estimateContinuation(block, nested, rule, work, { ...place, date });
    }
    if (date === 0) today = interpreter.moments(columns.continuation, lanes);
    else block.run(nested.move);
    if (isDecisionDate) block.run(nested.note);
    if (layout.ended !== null) block.run(nested.end);
    interpreter.copy(columns.continuation, columns.continuationBefore, 1);
    if (date < last) {
      interpreter.copy(columns.drivers, layout.state, driverCount);
      block.draw(purposeInRound('nested outer', work.round), index, date, 0);
      block.step(date, firstPath);
    }
  }
  return { upper: interpreter.moments(columns.upper, lanes), continuationToday: today };
}

/** Writes the worth of continuing with the rule from the saved drivers, by inner paths; overwrites `next` and the basis. */
function estimateContinuation(
  block: Block,
  nested: NestedPrograms,
  rule: Rule,
  work: NestedWork,
  { index, firstPath, date: start }: BlockPlace & { readonly date: number },
): void {
  const { layout, times } = block.programs;
  const { interpreter, driverCount, lanes } = block;
  const { columns } = nested;
  const last = times.length - 1;
  block.column(columns.continuation).fill(0);
  for (let path = 0; path < work.innerPathCount; path++) {
    block.column(columns.running).fill(1);
    block.column(columns.increments).fill(0);
    interpreter.copy(columns.drivers, layout.next, driverCount);
    block.evaluate(start, rule, firstPath);
    for (let date = start; date < last && interpreter.sum(columns.running, lanes) > 0; date++) {
      const arrives = date + 1;
      block.ruleIntegrands(date, rule);
      block.advance();
      block.draw(purposeInRound('nested inner', work.round), index, start * times.length + date, path);
      block.polynomials();
      block.addIncrement(1, columns.increments);
      block.step(date, firstPath);
      block.evaluate(arrives, rule, firstPath);
      if (arrives < last) block.value(arrives, rule, firstPath);
      block.run(arrives === last ? nested.endInnerLast : nested.endInner);
    }
  }
  const { uniforms } = block.loaded(nested.average);
  uniforms[0] = 1 / work.innerPathCount;
  block.run(nested.average);
}
