import type { PilotFinding, Plan } from '../result/record.js';
import type { CheckedScenario } from '../scenario/model.js';
import type { Candidate } from './candidates.js';
import { countsBeforePilot } from './counts.js';
import type { Environment } from './environment.js';
import type { Fitted, StageOptions } from './fitted.js';
import type { ValueOptions } from './options.js';
import { runTrial } from './trial.js';

/** A plan with what it was made from. */
export interface Planned {
  readonly plan: Plan;
  /** Null when every count was given. */
  readonly pilot: PilotFinding | null;
}

/** The plan when no pilot is needed: a replayed one, or counts that the scenario fixes. */
export function fixedPlan(
  { model: { method } }: CheckedScenario,
  { plan }: ValueOptions,
  { programs, counts }: Candidate,
): Planned | null {
  if (plan !== undefined) return { plan, pilot: null };
  const { outerPathCount, innerPointCount } = counts;
  if (outerPathCount === null || innerPointCount === null) return null;
  const { upper } = method;
  const { basisSize } = programs;
  return { plan: { basisSize, round: 1, ...counts, outerPathCount, innerPointCount, upper }, pilot: null };
}

/**
 * Draws a pilot on its own stream and fixes the plan from it. A time budget is turned into a count of steps here, once;
 * the counts that come out replay the run without a clock.
 */
export async function choosePlan(
  fitted: Fitted,
  { model: { method } }: CheckedScenario,
  options: StageOptions,
  environment: Environment,
  started: number,
): Promise<Planned> {
  const { programs } = fitted.candidate;
  const trial = await runTrial(fitted, method, 'pilot', options, environment, started);
  const { counts, sums, model, effort, chosen, wantedWidth, expectedWidth } = trial;
  const { upper } = method;
  const nestedSteps = effort.spendAll ? effort.stepLimit : undefined;
  return {
    plan: {
      ...countsBeforePilot(programs, method, nestedSteps),
      basisSize: programs.basisSize,
      round: 1,
      ...chosen,
      upper,
    },
    pilot: {
      ...counts,
      lowerStandardDeviation: model.lowerStandardDeviation,
      upperStandardDeviation: model.upperStandardDeviation,
      gap: sums.gap.count === 0 || upper === 'regressed' ? sums.regressedGap.mean : sums.gap.mean,
      expectedWidth,
      wantedWidth: options.budgetSeconds === undefined && method.outerPathCount === null ? wantedWidth : null,
    },
  };
}
