import { quantileSorted } from 'simple-statistics';
import { asHeld, type Bound, boundOf, bracketOf, standardErrorsInRound } from '../bounds/bracket.js';
import type { NestedSums } from '../bounds/nested-paths.js';
import type { OuterSums } from '../bounds/outer-sums.js';
import { estimateFrom, estimateOf, jointError } from '../numeric/estimate.js';
import { judge } from '../result/advice.js';
import type {
  BoundEstimate,
  BoundMethod,
  DateFinding,
  Estimate,
  PathsFinding,
  PilotFinding,
  Plan,
  RoundFinding,
  RunRecord,
  SelectionFinding,
  SizesEnded,
} from '../result/record.js';
import type { StepFit } from '../rule/backward-induction.js';
import type { Programs } from '../rule/programs.js';
import type { CheckedScenario } from '../scenario/model.js';
import { wantedWidthOf } from './wanted-width.js';

/** Everything that a finished run measured. */
export interface RunFindings {
  readonly source: string | object;
  readonly path: string | null;
  readonly scenario: CheckedScenario;
  readonly programs: Programs;
  readonly plan: Plan;
  readonly selection: SelectionFinding | null;
  /** Why no larger size was tried; null where nothing was left to choose. */
  readonly sizesEnded: SizesEnded | null;
  readonly pilot: PilotFinding | null;
  readonly rounds: readonly RoundFinding[];
  readonly paths: PathsFinding;
  readonly fits: readonly StepFit[];
  readonly outer: OuterSums;
  /** Null when the nested bound was not asked for, or when the run was stopped before it. */
  readonly nested: NestedSums | null;
  readonly isComplete: boolean;
  readonly hashOf: (text: string) => string;
  readonly versions: RunRecord['versions'];
  readonly interpreter: RunRecord['interpreter'];
  readonly timing: RunRecord['timing'];
}

/** Turns measurements into the record: the decider's signs become the holder's, and the result is judged. */
export function makeRecord(findings: RunFindings): RunRecord {
  const { source, path, scenario, programs, plan, pilot, outer, nested, isComplete } = findings;
  const { model, settings } = scenario;
  const { sign } = programs;
  const named = (bound: Bound, method: BoundMethod): BoundEstimate => ({ ...bound, method });
  const ruled = named(boundOf(outer.lower, sign), 'rule');
  const martingales = [
    ...(outer.upper.count === 0 ? [] : [named(boundOf(outer.upper, sign), 'one-step')]),
    ...(nested === null ? [] : [named(boundOf(nested.upper, sign), 'andersen-broadie')]),
    named(boundOf(outer.regressed, sign), 'regressed'),
  ];
  const chosen = martingales.find(({ method }) => method === plan.upper) ?? martingales[0]!;
  const [lower, upper] = sign === 1 ? [ruled, chosen] : [chosen, ruled];
  const bracket95 = bracketOf(lower, upper, standardErrorsInRound(plan.round));
  if (!Number.isFinite(bracket95.high - bracket95.low)) throw new Error('a bound is not a finite number');
  const dates = dateFindings(findings);
  const gap = gapOf(findings, chosen.method);
  const basisIsAutomatic = model.method.basis === 'auto';
  const wantedWidth = widthAskedFor(findings);
  const hasEvent = model.contract.endingEvent !== null;
  const judgement = judge({
    plan,
    columnCount: programs.columns.length,
    basisIsAutomatic,
    sizesEnded: findings.sizesEnded,
    innerIsFixed: model.method.innerPointCount !== null,
    isComplete,
    dates,
    lower,
    upper,
    uppers: martingales,
    gap,
    bracketWidth: bracket95.high - bracket95.low,
    wantedWidth,
    decidedBy: model.contract.decidedBy,
    exercisedPathCount: total(outer.exerciseCounts),
    endedPathCount: hasEvent ? total(outer.endedCounts) : null,
  });
  const text = typeof source === 'string' ? source : JSON.stringify(source);
  return {
    schemaVersion: 1,
    status: isComplete ? 'complete' : 'stopped',
    scenario: { path, sha256: findings.hashOf(text), title: model.title, money: model.money },
    seed: model.seed,
    decidedBy: model.contract.decidedBy,
    plan,
    selection: findings.selection,
    pilot,
    rounds: findings.rounds,
    paths: findings.paths,
    lower,
    upper,
    uppers: martingales,
    gap,
    bracket95,
    crossChecks: {
      plainLower: asHeld(outer.plain, sign),
      nestedContinuationToday: nested === null ? null : asHeld(nested.continuationToday, sign),
    },
    stepBias: null,
    exact: null,
    basis: { columns: programs.columns.map(({ name }) => name), martingalePolynomials: programs.polynomialNames },
    dates,
    neverExercisedShare: outer.neverCount / outer.lower.count,
    endedByEventShare: hasEvent ? total(outer.endedCounts) / outer.lower.count : null,
    exerciseTimeQuantiles: exerciseTimeQuantiles(outer, programs),
    advice: judgement.advice,
    passedChecks: judgement.passedChecks,
    settings,
    interpreter: findings.interpreter,
    timing: findings.timing,
    versions: findings.versions,
  };
}

/** Gap of the bracket's own two bounds: path by path where both stand on the same paths. */
function gapOf({ outer, nested }: RunFindings, method: BoundMethod): Estimate {
  if (method === 'andersen-broadie' && nested !== null) {
    const [upper, lower] = [estimateOf(nested.upper), estimateOf(outer.lower)];
    return estimateFrom(upper.value - lower.value, jointError(upper, lower));
  }
  return estimateOf(method === 'regressed' ? outer.regressedGap : outer.gap);
}

function dateFindings({ programs, fits, outer }: RunFindings): DateFinding[] {
  const { times, todayIsDecisionDate, columns, sign, layout } = programs;
  const last = times.length - 1;
  return times.flatMap((time, date) => {
    if (date === 0 && !todayIsDecisionDate) return [];
    const exerciseShare = outer.exerciseCounts[date]! / outer.lower.count;
    const fit = date === last ? undefined : fits[date];
    return {
      time,
      exerciseShare,
      endedShare: layout.ended === null ? null : outer.endedCounts[date]! / outer.lower.count,
      keptColumnCount: fit?.kept.length ?? 0,
      droppedColumns: fit?.dropped.map((column) => columns[column]!.name) ?? [],
      explainedShare: fit?.explainedShare ?? null,
      continuationMean: fit === undefined ? null : sign * fit.continuationMean,
    };
  });
}

const total = (counts: readonly number[]) => counts.reduce((sum, count) => sum + count, 0);

/** Representatives that stand for all exercised paths in a quantile; enough for a ten-thousandth. */
const mostRepresentatives = 10_000;

/** Quantiles of the exercise time among the paths that exercise at all; null if none does. */
function exerciseTimeQuantiles(outer: OuterSums, { times }: Programs): RunRecord['exerciseTimeQuantiles'] {
  const exercisedCount = total(outer.exerciseCounts);
  if (exercisedCount === 0) return null;
  const scale = Math.min(1, mostRepresentatives / exercisedCount);
  const exercised = outer.exerciseCounts.flatMap((count, date) =>
    new Array<number>(Math.ceil(count * scale)).fill(times[date]!),
  );
  return {
    p05: quantileSorted(exercised, 0.05),
    p50: quantileSorted(exercised, 0.5),
    p95: quantileSorted(exercised, 0.95),
  };
}

/** The width that was asked for, in money; null when fixed counts or a budget were asked for instead. */
function widthAskedFor({ scenario, pilot, outer }: RunFindings): number | null {
  const { method } = scenario.model;
  if (pilot !== null) return pilot.wantedWidth;
  if (method.outerPathCount !== null || method.innerPointCount !== null) return null;
  return wantedWidthOf(method, outer.lower.mean);
}
