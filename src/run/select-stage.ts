import { aim } from '../bounds/plan.js';
import type { SelectionFinding, SizesEnded, SizeTried } from '../result/record.js';
import { stepOperations } from '../rule/operations.js';
import type { Method } from '../scenario/model.js';
import type { Candidate, CandidatesOutcome } from './candidates.js';
import type { FitBench, Fitted } from './fitted.js';
import { runTrial, type Trial } from './trial.js';

/** The rule that a run goes on with, and how it was chosen; no finding where there was no choice. */
export interface Selected {
  readonly fitted: Fitted;
  readonly selection: SelectionFinding | null;
  /** Why no larger size was tried, even where one alone could be; null where nothing was left to choose. */
  readonly ended: SizesEnded | null;
}

/** A larger size gains if it brings the expected width below this share of the best so far. */
const gainShare = 0.9;
/** Sizes in a row that gain nothing, after which none larger is tried: a trial errs, and some size fits badly. */
const mostWithoutGain = 2;
/** Bounds that cost more than so many times the next fit are worth trying it for. */
const boundsPerFit = 1.3;
/** Share of a budget's rest that the next fit may take. */
const budgetShare = 0.4;

/**
 * Chooses the size of the automatic basis: fits and tries sizes from small to large until one reaches the wanted width
 * for less than the next fit would cost, or brings nothing.
 *
 * The trial is drawn on the select stream, which serves nothing else: the chosen rule's bracket is drawn afresh, so that
 * choosing cannot flatter it. What decides are counted operations and sampled variances; only a time budget looks at
 * the clock, and the plan that results replays without one.
 */
export async function selectFit(
  bench: FitBench,
  { candidates, ended: endOfCandidates }: Extract<CandidatesOutcome, { kind: 'open' }>,
  method: Method,
  started: number,
): Promise<Selected> {
  const [first, ...larger] = candidates;
  let best = await bench.fit(first!);
  if (larger.length === 0 || endOfCandidates === null) return { fitted: best, selection: null, ended: endOfCandidates };
  const trials: { size: SizeTried; trial: Trial }[] = [];
  const tryOut = async (fitted: Fitted) => {
    const trial = await runTrial(fitted, method, 'select', bench.options, bench.environment, started);
    const size = describe(fitted.candidate, trial);
    trials.push({ size, trial });
    return { size, trial };
  };
  let bestTrial = await tryOut(best);
  let latest = best;
  let ended = endOfCandidates;
  let withoutGain = 0;
  for (const candidate of larger) {
    const verdict = worthTrying(bench, candidate, latest, bestTrial, started);
    if (verdict !== null) {
      ended = verdict;
      break;
    }
    const fitted = await bench.fit(candidate);
    latest = fitted;
    const trial = await tryOut(fitted);
    const isBetter = betterThan(trial, bestTrial);
    const gains = trial.size.expectedWidth < gainShare * bestTrial.size.expectedWidth;
    if (isBetter) {
      await bench.dismiss(best);
      [best, bestTrial] = [fitted, trial];
    } else await bench.dismiss(fitted);
    withoutGain = gains ? 0 : withoutGain + 1;
    if (withoutGain >= mostWithoutGain) {
      ended = 'no gain';
      break;
    }
  }
  const { counts } = bestTrial.trial;
  return {
    fitted: best,
    selection: {
      ...counts,
      tried: trials.map(({ size }) => size),
      chosenSize: best.candidate.programs.basisSize,
      ended,
    },
    ended,
  };
}

interface Tried {
  readonly size: SizeTried;
  readonly trial: Trial;
}

/** Why the next size is not worth a fit; null if it is. */
function worthTrying(
  { environment, options }: FitBench,
  next: Candidate,
  latest: Fitted,
  tried: Tried,
  started: number,
): SizesEnded | null {
  if (options.budgetSeconds !== undefined) {
    const secondsLeft = options.budgetSeconds - (environment.now() - started) / 1000;
    const seconds = (next.operations * latest.milliseconds) / latest.candidate.operations / 1000;
    const isAffordable = seconds <= budgetShare * secondsLeft;
    return isAffordable ? null : 'larger size too costly';
  }
  const isEnough = reaches(tried) && tried.size.boundsOperations <= boundsPerFit * next.operations;
  return isEnough ? 'width in reach' : null;
}

/** Reaching the width counts first, then the cost of it; out of reach, the narrower is better. */
function betterThan(a: Tried, b: Tried): boolean {
  if (reaches(a) !== reaches(b)) return reaches(a);
  if (reaches(a)) return a.size.boundsOperations < b.size.boundsOperations;
  return a.size.expectedWidth < b.size.expectedWidth;
}

function reaches({ size, trial: { effort, wantedWidth } }: Tried): boolean {
  return !effort.spendAll && size.expectedWidth <= aim * wantedWidth * (1 + 1e-6);
}

function describe(
  { programs, counts, operations }: Candidate,
  { model, sums, chosen, expectedWidth }: Trial,
): SizeTried {
  const steps = chosen.outerPathCount * (programs.times.length - 1) * (chosen.innerPointCount + 1);
  return {
    basisSize: programs.basisSize,
    columnCount: programs.columns.length,
    fitPathCount: counts.fitPathCount,
    lowerStandardDeviation: model.lowerStandardDeviation,
    upperStandardDeviation: model.upperStandardDeviation,
    gap: sums.gap.count === 0 ? sums.regressedGap.mean : sums.gap.mean,
    expectedWidth,
    fitOperations: operations,
    boundsOperations: steps * stepOperations(programs),
  };
}
