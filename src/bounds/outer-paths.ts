import type { Block } from '../rule/block.js';
import { type BlockRange, forEachBlock } from '../rule/fit-sweeps.js';
import type { Rule } from '../rule/rule.js';
import { type Choice, type InnerMeans, OuterLanes } from './outer-lanes.js';
import { mergeOuterSums, noOuterSums, type OuterSums } from './outer-sums.js';

/** Which draws a set of outer paths uses. */
export type OuterPurpose = 'outer' | 'pilot';

/**
 * Both bounds on one set of outer paths, with the one-step martingale of the fitted value.
 *
 * The increment over a step is v(X′) - E[v(X′) | X], v the larger of payoff and fitted continuation value. The
 * conditional mean is estimated from inner points drawn afresh for every path and date, today included, with the
 * regressed increment as control. What the estimates mean:
 *
 * - lower: mean of payoff less martingale where the rule exercises. The inner noise is independent of the path given
 *   the state, so its mean is the value of the rule: biased low for the best value by what the rule misses, only.
 * - upper: mean of the largest payoff less martingale. Noise inside a maximum can only raise its mean: biased high.
 *
 * @source Haugh & Kogan (2004), Operations Research 52, 258-270; Rogers (2002), Mathematical Finance 12, 271-286
 * @cost outer paths × dates × (inner points + 1) steps and evaluations
 */
export function runOuterPaths(
  block: Block,
  rule: Rule,
  purpose: OuterPurpose,
  pathCount: number,
  innerPointCount: number,
  range: BlockRange,
): OuterSums {
  let total = noOuterSums(block.programs.times.length);
  forEachBlock(block, range, pathCount, (index, firstPath) => {
    total = mergeOuterSums(total, runBlock(block, rule, purpose, innerPointCount, index, firstPath));
  });
  return total;
}

function runBlock(
  block: Block,
  rule: Rule,
  purpose: OuterPurpose,
  innerPointCount: number,
  index: number,
  firstPath: number,
): OuterSums {
  const { layout, times, polynomialNames, todayIsDecisionDate } = block.programs;
  const { lanes } = block;
  const last = times.length - 1;
  const savedNext = layout.stage;
  const nextIntegrands = savedNext + block.driverCount;
  const hold = nextIntegrands + polynomialNames.length;
  const [outerValue, innerValue, regressedStep] = [hold + 1, hold + 2, hold + 3];
  const paths = new OuterLanes(block.programs, lanes);

  const choiceAt = (date: number): Choice => ({
    date,
    brings: block.column(date === last ? layout.terminal : layout.payoff).slice(),
    payoff: block.column(layout.payoff).slice(),
    continuation: block.column(hold).slice(),
  });

  block.restart();
  block.evaluate(0, rule, firstPath);
  block.continuation(0, rule, hold, firstPath);
  if (todayIsDecisionDate) paths.choose(choiceAt(0));
  block.ruleIntegrands(0, rule, layout.integrands);
  for (let date = 0; date < last; date++) {
    const arrives = date + 1;
    block.advance();
    block.draw(purpose, index, date, 0);
    block.polynomials();
    block.column(regressedStep).fill(0);
    block.addIncrement(layout.integrands, 1, regressedStep);
    block.step(date, firstPath);
    block.evaluate(arrives, rule, firstPath);
    block.value(arrives, rule, hold, outerValue, firstPath);
    if (arrives < last) block.ruleIntegrands(arrives, rule, nextIntegrands);
    const choice = choiceAt(arrives);
    block.interpreter.copy(layout.next, savedNext, block.driverCount);

    const place = { index, firstPath, date, value: innerValue, hold };
    const means = innerMeans(block, rule, purpose === 'outer' ? 'inner' : 'pilot inner', innerPointCount, place);
    paths.move(block.column(outerValue), means, block.column(regressedStep));
    paths.choose(choice);
    block.interpreter.copy(savedNext, layout.next, block.driverCount);
    block.interpreter.copy(nextIntegrands, layout.integrands, polynomialNames.length);
  }
  return paths.sums();
}

interface InnerPlace {
  readonly index: number;
  readonly firstPath: number;
  readonly date: number;
  readonly value: number;
  readonly hold: number;
}

/**
 * Mean of the fitted value after one step from `state`, over inner points that are fresh for each lane: over all of
 * them and over the first half. Leaves `next` and the basis overwritten.
 */
function innerMeans(
  block: Block,
  rule: Rule,
  purpose: 'inner' | 'pilot inner',
  pointCount: number,
  place: InnerPlace,
): InnerMeans {
  const sum = new Float64Array(block.lanes);
  const half = Math.ceil(pointCount / 2);
  let halfMean = sum;
  for (let point = 0; point < pointCount; point++) {
    block.draw(purpose, place.index, place.date, point);
    block.polynomials();
    block.step(place.date, place.firstPath);
    block.evaluate(place.date + 1, rule, place.firstPath);
    block.value(place.date + 1, rule, place.hold, place.value, place.firstPath);
    block.addIncrement(block.programs.layout.integrands, -1, place.value);
    const value = block.column(place.value);
    for (let lane = 0; lane < block.lanes; lane++) sum[lane] = sum[lane]! + value[lane]!;
    if (point + 1 === half) halfMean = sum.map((total) => total / half);
  }
  return { mean: sum.map((total) => total / pointCount), halfMean };
}
