import { type Moments, mergeMoments, momentsOf, noMoments } from '../numeric/moments.js';
import type { Block } from '../rule/block.js';
import { type BlockRange, forEachBlock } from '../rule/fit-sweeps.js';
import type { Rule } from '../rule/rule.js';

/** Sums over the outer paths of the nested upper bound, in the decider's sign. */
export interface NestedSums {
  readonly upper: Moments;
  /** What continuing with the rule is worth today, by the inner paths from today. */
  readonly continuationToday: Moments;
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
 * It rests on the rule and not on the fitted value, and runs on outer paths of its own: an independent witness beside
 * the one-step bound.
 *
 * @source Andersen & Broadie (2004), Management Science 50, 1222-1234
 * @cost outer paths × dates² / 2 × inner paths
 */
export function runNestedPaths(
  block: Block,
  rule: Rule,
  pathCount: number,
  innerPathCount: number,
  range: BlockRange,
): NestedSums {
  let total = noNestedSums;
  forEachBlock(block, range, pathCount, (index, firstPath) => {
    total = mergeNestedSums(total, runBlock(block, rule, innerPathCount, index, firstPath));
  });
  return total;
}

function runBlock(block: Block, rule: Rule, innerPathCount: number, index: number, firstPath: number): NestedSums {
  const { layout, times, todayIsDecisionDate } = block.programs;
  const { lanes } = block;
  const last = times.length - 1;
  const saved = layout.stage;
  const hold = saved + block.driverCount;

  const martingale = new Float64Array(lanes);
  const upper = new Float64Array(lanes).fill(-Infinity);
  let continuationNow = new Float64Array(lanes);
  let today = noMoments;

  block.restart();
  for (let date = 0; date <= last; date++) {
    block.evaluate(date, rule, firstPath);
    block.interpreter.copy(layout.next, saved, block.driverCount);
    const payoff = Float64Array.from(block.column(date === last ? layout.terminal : layout.payoff));
    const exercises = new Uint8Array(lanes);
    if (date === last) exercises.fill(1);
    else if (date > 0 || todayIsDecisionDate) {
      block.continuation(date, rule, hold, firstPath);
      const continuation = block.column(hold);
      for (let lane = 0; lane < lanes; lane++) exercises[lane] = payoff[lane]! > continuation[lane]! ? 1 : 0;
    }
    const continuationNext =
      date === last ? payoff : continuationValues(block, rule, innerPathCount, { index, firstPath, date, saved, hold });
    if (date === 0) today = momentsOf(continuationNext, 0, lanes);
    for (let lane = 0; lane < lanes; lane++) {
      if (date > 0) {
        const worth = exercises[lane] === 1 ? payoff[lane]! : continuationNext[lane]!;
        martingale[lane] = martingale[lane]! + worth - continuationNow[lane]!;
      }
      if (date > 0 || todayIsDecisionDate) upper[lane] = Math.max(upper[lane]!, payoff[lane]! - martingale[lane]!);
    }
    continuationNow = continuationNext;
    if (date < last) {
      block.interpreter.copy(saved, layout.next, block.driverCount);
      block.advance();
      block.draw('nested outer', index, date, 0);
      block.step(date, firstPath);
    }
  }
  return { upper: momentsOf(upper, 0, lanes), continuationToday: today };
}

interface NestedPlace {
  readonly index: number;
  readonly firstPath: number;
  readonly date: number;
  /** Columns with the drivers at the date. */
  readonly saved: number;
  /** First of the columns that may be used. */
  readonly hold: number;
}

/** Worth of continuing with the rule from the saved drivers, by inner paths; overwrites everything but `saved`. */
function continuationValues(
  block: Block,
  rule: Rule,
  innerPathCount: number,
  place: NestedPlace,
): Float64Array<ArrayBuffer> {
  const { layout, times } = block.programs;
  const { lanes } = block;
  const last = times.length - 1;
  const increments = place.hold + 1;
  const total = new Float64Array(lanes);
  const running = new Uint8Array(lanes);
  for (let path = 0; path < innerPathCount; path++) {
    let runningCount = lanes;
    running.fill(1);
    block.column(increments).fill(0);
    block.interpreter.copy(place.saved, layout.next, block.driverCount);
    block.evaluate(place.date, rule, place.firstPath);
    for (let date = place.date; runningCount > 0; date++) {
      const arrives = date + 1;
      block.ruleIntegrands(date, rule, layout.integrands);
      block.advance();
      block.draw('nested inner', place.index, place.date * times.length + date, path);
      block.polynomials();
      block.addIncrement(layout.integrands, 1, increments);
      block.step(date, place.firstPath);
      block.evaluate(arrives, rule, place.firstPath);
      if (arrives < last) block.continuation(arrives, rule, place.hold, place.firstPath);
      const brings = block.column(arrives === last ? layout.terminal : layout.payoff);
      const continuation = block.column(place.hold);
      const increment = block.column(increments);
      for (let lane = 0; lane < lanes; lane++) {
        if (running[lane] === 1 && (arrives === last || brings[lane]! > continuation[lane]!)) {
          total[lane] = total[lane]! + brings[lane]! - increment[lane]!;
          running[lane] = 0;
          runningCount--;
        }
      }
    }
  }
  return total.map((sum) => sum / innerPathCount);
}
