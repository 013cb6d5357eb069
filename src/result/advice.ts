import { advice } from '../messages/build.js';
import type { Message } from '../messages/message.js';
import { jointError } from '../numeric/estimate.js';
import { remedyForGap } from './gap-remedy.js';
import { type Finding, type Measures, paths } from './measures.js';
import { missedWidth } from './missed-width.js';
import type { BoundEstimate } from './record.js';

/** What the judge says: doubts, each with its number, and the checks that found nothing. */
export interface Judgement {
  readonly advice: readonly Message[];
  readonly passedChecks: readonly string[];
}

const percent = (share: number) => `${(100 * share).toPrecision(2)}%`;

/** Fit paths for each column below which the regression error alone is a visible part of the gap; common practice. */
export const fitPathsPerColumn = 100;
/** Gap, as a share of the value, beyond which a better basis is worth more than more paths; common practice. */
const wideGapShare = 0.01;
/** Outer paths below which the normal interval is not to be trusted; common practice. */
const fewestOuterPaths = 500;
const fewestInnerPoints = 8;
/** Exercised paths below which a mean over them is far from normal; common practice. */
const fewestExercisedPaths = 100;
/** Standard errors between crossed bounds that noise does not explain: about one false alarm in 15,000 runs. */
const crossingErrors = 4;

/** Judges a finished run. */
export function judge(measures: Measures): Judgement {
  const findings = [thinFit, rankLoss, wideGap, crossedBounds, effort, rareExercise, missedWidth]
    .map((question) => question(measures))
    .filter((found) => found !== null);
  return {
    advice: findings.flatMap((finding) => ('doubt' in finding ? [finding.doubt] : [])),
    passedChecks: findings.flatMap((finding) => ('passed' in finding ? [finding.passed] : [])),
  };
}

function thinFit({ plan, columnCount }: Measures): Finding {
  const share = plan.fitPathCount / columnCount;
  if (share >= fitPathsPerColumn) return { passed: `The fit has ${paths(Math.floor(share))} paths for each column.` };
  return {
    doubt: advice('thin-fit', {
      what: `The rule was fitted with ${paths(plan.fitPathCount)} paths for ${columnCount} columns: ${Math.floor(share)} for each.`,
      why: `Below ${fitPathsPerColumn} paths for each column the coefficients follow noise, the rule loses value and the bracket widens; it stays valid.`,
      mend: `Raise \`counts: { fit: … }\` under method to ${paths(fitPathsPerColumn * columnCount)} or more, or state fewer columns.`,
      evidence: { fitPathCount: plan.fitPathCount, columnCount },
    }),
  };
}

function rankLoss({ basisIsAutomatic, dates }: Measures): Finding | null {
  if (basisIsAutomatic) return null;
  const losing = dates.filter(({ time, droppedColumns }) => time > 0 && droppedColumns.length > 0);
  if (losing.length === 0) return { passed: 'No column of the basis repeats the others at any decision date.' };
  const names = [...new Set(losing.flatMap(({ droppedColumns }) => droppedColumns))];
  return {
    doubt: advice('rank-loss', {
      what: `At ${losing.length} of ${dates.filter(({ time }) => time > 0).length} dates the regression dropped columns that the others already span: ${names.join(', ')}.`,
      why: 'The fit is the same without them; but a column that was meant to tell something new does not.',
      mend: 'Look at these columns of `basis`; take out what repeats, or state what was meant.',
      evidence: { columns: names, dates: losing.map(({ time }) => time) },
    }),
  };
}

function wideGap(measures: Measures): Finding {
  const { gap, lower } = measures;
  const share = gap.value === 0 ? 0 : gap.value / Math.abs(lower.value);
  const text = `The gap between the bounds is ${percent(share)} of the value.`;
  if (!(share > wideGapShare)) return { passed: share < 0 ? 'The bounds lie closer than their error.' : text };
  return {
    doubt: advice('wide-gap', {
      what: text,
      why: 'The gap is what the fitted rule and martingale miss. More outer paths do not close it.',
      mend: remedyForGap(measures),
      evidence: { gap: gap.value, share },
    }),
  };
}

function crossedBounds({ lower, upper, uppers, decidedBy }: Measures): Finding {
  const ruled = decidedBy === 'holder' ? lower : upper;
  const ordered = (bound: BoundEstimate) =>
    decidedBy === 'holder' ? ruled.value - bound.value : bound.value - ruled.value;
  const crossed = uppers.filter((bound) => ordered(bound) > crossingErrors * (jointError(bound, ruled) ?? 0));
  if (crossed.length === 0) return { passed: 'No bound crosses another beyond noise.' };
  return {
    doubt: advice('crossed-bounds', {
      what: `The lower bound lies above the upper bound by more than ${crossingErrors} standard errors (${crossed.map(({ method }) => method).join(', ')}).`,
      why: 'Noise does not explain this: the estimates contradict each other and the bracket must not be used.',
      mend: 'Run again with another `seed`. If it stays, this is a defect of the program: keep the scenario and the record, and report it.',
      evidence: { lower: lower.value, uppers: uppers.map(({ method, value }) => ({ method, value })) },
    }),
  };
}

function effort({ plan, lower, upper }: Measures): Finding {
  const smallest = Math.min(lower.pathCount, upper.pathCount);
  const { innerPointCount } = plan;
  const enough = smallest >= fewestOuterPaths && (innerPointCount === 0 || innerPointCount >= fewestInnerPoints);
  if (enough) return { passed: `The error bars rest on ${paths(smallest)} paths or more.` };
  return {
    doubt: advice('effort-too-small', {
      what: `The bounds rest on ${paths(smallest)} outer paths with ${innerPointCount} inner ${innerPointCount === 1 ? 'point' : 'points'} each.`,
      why: `Below ${fewestOuterPaths} paths a 95% interval may cover less than 95%; below ${fewestInnerPoints} inner points the upper bound is mostly noise.`,
      mend: 'Leave `counts` under method out, so that a pilot chooses them, or raise `outer` and `inner`.',
      evidence: { outerPathCount: smallest, innerPointCount },
    }),
  };
}

/**
 * A payoff that few paths ever reach: what the others would have shown is unknown, and the normal interval too short.
 * An event that n paths never showed may still have a probability of 3/n (95%, "rule of three").
 */
function rareExercise({ lower, upper, decidedBy, exercisedPathCount, endedPathCount }: Measures): Finding {
  const { pathCount } = decidedBy === 'holder' ? lower : upper;
  // Where every path ends by the event, there is nothing left that a path could show.
  if (endedPathCount === pathCount) return { passed: 'The ending event ends the contract on every outer path.' };
  if (exercisedPathCount >= fewestExercisedPaths) {
    return {
      passed: `The rule exercises on ${paths(exercisedPathCount)} of the ${paths(pathCount)} outer paths.`,
    };
  }
  return {
    doubt: advice('effort-too-small', {
      what: `The rule exercises on only ${paths(exercisedPathCount)} of the ${paths(pathCount)} outer paths.`,
      why: `The value rests on rare paths: a payoff with a probability up to ${percent(Math.min(1, 3 / pathCount))} may not have shown at all, and the 95% interval may be too narrow and too low.`,
      mend: 'Raise `counts: { outer: … }` under method until some hundred paths exercise.',
      evidence: { exercisedPathCount, outerPathCount: pathCount },
    }),
  };
}
