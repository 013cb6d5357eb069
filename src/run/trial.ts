import type { OuterPurpose } from '../bounds/outer-paths.js';
import type { OuterSums } from '../bounds/outer-sums.js';
import {
  type Counts,
  chooseCounts,
  expectedWidth,
  modelOfPilot,
  type PilotModel,
  pilotInnerPointCount,
} from '../bounds/plan.js';
import { standardErrorsIn95 } from '../numeric/estimate.js';
import { blockLanes } from '../program/program.js';
import { stepOperations } from '../rule/operations.js';
import type { Method } from '../scenario/model.js';
import { runOuter } from './bounds-stage.js';
import type { Candidate } from './candidates.js';
import { type Effort, effortOf } from './effort.js';
import type { Environment } from './environment.js';
import type { Fitted, StageOptions } from './fitted.js';
import { Stopped } from './parcels.js';
import { wantedWidthOf } from './wanted-width.js';

/** What a small set of outer paths tells about a fitted rule, and the plan that it leads to. */
export interface Trial {
  readonly counts: Counts;
  readonly sums: OuterSums;
  readonly model: PilotModel;
  readonly effort: Effort;
  readonly chosen: Counts;
  readonly wantedWidth: number;
  readonly expectedWidth: number;
}

/** Share of a fit's operations that a trial of it may take, within these counts of paths. */
const trialShare = 0.2;
const fewestTrialPaths = 1024;
const mostTrialPaths = 8192;

/** More paths than spreads alone would ask for: it is the small gap that they must tell from nothing. */
function trialPathCount({ programs, operations }: Candidate, innerPointCount: number): number {
  const operationsOfPath = (programs.times.length - 1) * (innerPointCount + 1) * stepOperations(programs);
  const affordable = Math.floor((trialShare * operations) / operationsOfPath / blockLanes) * blockLanes;
  return Math.min(mostTrialPaths, Math.max(fewestTrialPaths, affordable));
}

/**
 * Draws a small set of outer paths on a stream of its own and reads the cheapest counts for the wanted width off it.
 *
 * A time budget is turned into a count of steps here, at the pace of these very steps.
 *
 * @param started when the run began, by the environment's clock
 * @fails throws Stopped, and NotFinite from the paths
 */
export async function runTrial(
  { candidate, executor }: Fitted,
  method: Method,
  purpose: Exclude<OuterPurpose, 'outer'>,
  options: StageOptions,
  environment: Environment,
  started: number,
): Promise<Trial> {
  const { programs } = candidate;
  const innerPointCount = Math.min(method.innerPointCount ?? pilotInnerPointCount, pilotInnerPointCount);
  const counts = { outerPathCount: trialPathCount(candidate, innerPointCount), innerPointCount };
  const before = environment.now();
  const onProgress: StageOptions['onProgress'] = (progress) =>
    options.onProgress({ ...progress, columnCount: programs.columns.length });
  const { sums, isComplete } = await runOuter(executor, programs, purpose, counts, 1, options.signal, onProgress);
  if (!isComplete) throw new Stopped();
  const after = environment.now();

  const dateCount = programs.times.length - 1;
  const { budgetSeconds } = options;
  const secondsLeft = budgetSeconds === undefined ? null : budgetSeconds - (after - started) / 1000;
  const isNested = method.upper === 'andersen-broadie';
  const effort = effortOf(programs, secondsLeft === null || !isNested ? secondsLeft : secondsLeft / 2, {
    steps: counts.outerPathCount * dateCount * (counts.innerPointCount + 1),
    milliseconds: after - before,
  });
  const model = modelOfPilot(sums, counts.innerPointCount, method.upper);
  const wantedWidth = wantedWidthOf(method, model.value);
  const chosen = chooseCounts(model, {
    ...effort,
    wantedWidth,
    standardErrors: standardErrorsIn95,
    dateCount,
    outerPathCount: method.outerPathCount,
    innerPointCount: method.innerPointCount,
  });
  return { counts, sums, model, effort, chosen, wantedWidth, expectedWidth: expectedWidth(model, chosen) };
}
