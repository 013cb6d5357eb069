import { asHeld, bracketOf, errorProbability, mostRounds, standardErrorsInRound } from '../bounds/bracket.js';
import type { NestedSums } from '../bounds/nested-paths.js';
import type { OuterSums } from '../bounds/outer-sums.js';
import { aim, chooseCounts, expectedWidth, modelOfPilot } from '../bounds/plan.js';
import type { Plan, RoundFinding } from '../result/record.js';
import { stepOperations } from '../rule/operations.js';
import type { Method } from '../scenario/model.js';
import { runNested, runOuter } from './bounds-stage.js';
import { defaultOperationLimit } from './effort.js';
import type { Fitted, StageOptions } from './fitted.js';
import { Stopped } from './parcels.js';
import { wantedWidthOf } from './wanted-width.js';

/** The final draws of one round. */
export interface RoundSums {
  readonly plan: Plan;
  readonly outer: OuterSums;
  readonly nested: NestedSums | null;
  readonly isComplete: boolean;
}

/** The last round, which makes the bracket, and what every round found. */
export interface Rounds extends RoundSums {
  readonly rounds: readonly RoundFinding[];
}

/**
 * Draws the final paths; if the bracket misses the wanted width by noise, again on fresh streams with a plan made from
 * the round before, and with half the probability of a miss.
 *
 * Never more paths are added to a sample until it looks narrow: that stops where the sample errs, and misses too often.
 * A round that the gap alone keeps too wide is not followed by another. Replays, budgets and fixed counts have one round.
 */
export async function runRounds(
  fitted: Fitted,
  method: Method,
  plan: Plan,
  isToWidth: boolean,
  options: StageOptions,
): Promise<Rounds> {
  const rounds: RoundFinding[] = [];
  let current = await runRound(fitted, plan, options);
  for (;;) {
    rounds.push(describe(current, fitted));
    if (!isToWidth || !current.isComplete || current.plan.round >= mostRounds) break;
    const next = nextPlan(fitted, method, current, rounds.at(-1)!);
    if (next === null) break;
    const further = await runRound(fitted, next, options);
    if (!further.isComplete) break;
    current = further;
  }
  return { ...current, rounds };
}

/** One round; a stop in between delivers what is there, unless nothing is. */
async function runRound(
  { candidate: { programs }, executor }: Fitted,
  plan: Plan,
  { signal, onProgress }: StageOptions,
): Promise<RoundSums> {
  const outer = await runOuter(executor, programs, 'outer', plan, plan.round, signal, onProgress);
  if (outer.sums.lower.count < 2) {
    if (plan.round === 1) throw new Stopped();
    return { plan, outer: outer.sums, nested: null, isComplete: false };
  }
  if (plan.nestedOuterPathCount === 0) return { plan, outer: outer.sums, nested: null, isComplete: outer.isComplete };
  const nested = await runNested(executor, plan, plan.round, signal, onProgress);
  const isUsable = nested.sums.upper.count >= 2;
  return {
    plan,
    outer: outer.sums,
    nested: isUsable ? nested.sums : null,
    isComplete: outer.isComplete && nested.isComplete,
  };
}

/** The plan of a further round; null where the width is reached, or where no further round would reach it. */
function nextPlan(
  { candidate: { programs } }: Fitted,
  method: Method,
  { plan, outer }: RoundSums,
  found: RoundFinding,
): Plan | null {
  const wantedWidth = wantedWidthOf(method, outer.lower.mean);
  if (found.high - found.low <= wantedWidth || plan.upper === 'andersen-broadie') return null;
  const round = plan.round + 1;
  const standardErrors = standardErrorsInRound(round);
  const model = modelOfPilot(outer, plan.innerPointCount, plan.upper);
  const counts = chooseCounts(model, {
    wantedWidth,
    standardErrors,
    stepLimit: defaultOperationLimit / stepOperations(programs),
    spendAll: false,
    dateCount: programs.times.length - 1,
    outerPathCount: null,
    innerPointCount: method.innerPointCount,
  });
  const reachable = expectedWidth(model, counts, standardErrors) <= (wantedWidth * (1 + aim)) / 2;
  return reachable ? { ...plan, ...counts, round } : null;
}

function describe({ plan, outer, nested }: RoundSums, { candidate: { programs } }: Fitted): RoundFinding {
  const { round, outerPathCount, innerPointCount } = plan;
  const standardErrors = standardErrorsInRound(round);
  const ruled = asHeld(outer.lower, programs.sign);
  const chosen = nested !== null ? nested.upper : plan.upper === 'regressed' ? outer.regressed : outer.upper;
  const martingale = asHeld(chosen.count === 0 ? outer.regressed : chosen, programs.sign);
  const [lower, upper] = programs.sign === 1 ? [ruled, martingale] : [martingale, ruled];
  return {
    round,
    outerPathCount,
    innerPointCount,
    errorProbability: errorProbability(round),
    standardErrors,
    ...bracketOf(lower, upper, standardErrors),
  };
}
