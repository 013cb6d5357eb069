import {
  chooseCounts,
  defaultStepLimit,
  expectedWidth,
  modelOfPilot,
  pilotInnerPointCount,
  pilotOuterPathCount,
} from '../bounds/plan.js';
import type { PilotFinding, Plan } from '../result/record.js';
import type { Programs } from '../rule/programs.js';
import type { CheckedScenario } from '../scenario/model.js';
import type { Executor } from '../workers/executor.js';
import { runOuter } from './bounds-stage.js';
import { countsBeforePilot } from './counts.js';
import type { Environment } from './environment.js';
import type { Progress, ValueOptions } from './options.js';
import { Stopped } from './parcels.js';
import { wantedWidthOf } from './wanted-width.js';

/** A plan with what it was made from. */
export interface Planned {
  readonly plan: Plan;
  /** Null when every count was given. */
  readonly pilot: PilotFinding | null;
}

/** The plan when no pilot is needed: a replayed one, or counts that the scenario fixes. */
export function fixedPlan({ model }: CheckedScenario, options: ValueOptions, programs: Programs): Planned | null {
  if (options.plan !== undefined) return { plan: options.plan, pilot: null };
  const counts = countsBeforePilot(programs, model.method);
  const { outerPathCount, innerPointCount } = counts;
  if (outerPathCount === null || innerPointCount === null) return null;
  return { plan: { ...counts, outerPathCount, innerPointCount, upper: model.method.upper }, pilot: null };
}

/**
 * Draws a pilot on its own stream and fixes the plan from it. A time budget is turned into a count of steps here, once;
 * the counts that come out replay the run without a clock.
 */
export async function choosePlan(
  executor: Executor,
  { model }: CheckedScenario,
  programs: Programs,
  options: ValueOptions & { readonly onProgress: (progress: Progress) => void },
  environment: Environment,
  started: number,
): Promise<Planned> {
  const { method } = model;
  const counts = {
    outerPathCount: pilotOuterPathCount,
    innerPointCount: Math.min(method.innerPointCount ?? pilotInnerPointCount, pilotInnerPointCount),
  };
  const before = environment.now();
  const { sums, isComplete } = await runOuter(executor, programs, 'pilot', counts, options.signal, options.onProgress);
  if (!isComplete) throw new Stopped();
  const after = environment.now();

  const dateCount = programs.times.length - 1;
  const pilotSteps = counts.outerPathCount * dateCount * (counts.innerPointCount + 1);
  const pilotModel = modelOfPilot(sums, counts.innerPointCount, method.upper);
  const wantedWidth = wantedWidthOf(method, pilotModel.value);
  const { budgetSeconds } = options;
  const secondsLeft = budgetSeconds === undefined ? null : Math.max(0, budgetSeconds - (after - started) / 1000);
  const affordable = secondsLeft === null ? null : (secondsLeft * pilotSteps * 1000) / Math.max(1, after - before);
  const isNested = method.upper === 'andersen-broadie';
  const share = affordable === null ? null : isNested ? affordable / 2 : affordable;
  const chosen = chooseCounts(pilotModel, {
    wantedWidth,
    stepLimit: share ?? defaultStepLimit,
    dateCount,
    outerPathCount: method.outerPathCount,
    innerPointCount: method.innerPointCount,
    spendAll: budgetSeconds !== undefined,
  });
  return {
    plan: { ...countsBeforePilot(programs, method, share ?? undefined), ...chosen, upper: method.upper },
    pilot: {
      ...counts,
      lowerStandardDeviation: pilotModel.lowerStandardDeviation,
      upperStandardDeviation: pilotModel.upperStandardDeviation,
      gap: sums.gap.count === 0 || method.upper === 'regressed' ? sums.regressedGap.mean : sums.gap.mean,
      expectedWidth: expectedWidth(pilotModel, chosen),
      wantedWidth: budgetSeconds === undefined && method.outerPathCount === null ? wantedWidth : null,
    },
  };
}
