import { standardErrorsIn95 } from '../numeric/estimate.js';
import { varianceOf } from '../numeric/moments.js';
import type { UpperMethod } from '../scenario/model.js';
import type { OuterSums } from './outer-sums.js';

/** Inner points of the pilot; the first half of them is looked at apart. */
export const pilotInnerPointCount = 32;

const smallestOuterPathCount = 2048;
const largestOuterPathCount = 4_000_000;
/** From the pilot's own count up: fewer points were not tried, and their noise cannot be read off those that were. */
const innerPointCounts = [32, 64, 128, 256, 512, 1024, 2048];

/** Share of the wanted width that a plan aims at: the pilot's own figures are uncertain. */
export const aim = 0.85;

/** Width that is given away for less work where the wanted width, or all of a budget, is out of reach anyway. */
const waste = 0.05;
const rounding = 1e-9;

/** What the pilot tells about a bracket made with any counts. */
export interface PilotModel {
  readonly lowerStandardDeviation: number;
  readonly upperStandardDeviation: number;
  /** Gap with endless inner points, and how much one over the inner count to the power 1.5 adds to it. */
  readonly limitGap: number;
  readonly gapPerInnerShare: number;
  readonly value: number;
}

/** The counts that a pilot decides. */
export interface Counts {
  readonly outerPathCount: number;
  readonly innerPointCount: number;
}

/**
 * Reads spreads and gap off a pilot for the upper bound that makes the bracket. The nested bound is not part of a pilot: it
 * is taken to lie no farther from the lower bound than the one-step bound or, without inner points, the regressed one.
 *
 * Inner noise is taken to raise the one-step bound as one over the inner count to the power 1.5; the regressed bound has
 * none. Measured powers of evenly spread points are 1.5 (five lots) to 1.8 (two); a power of 2 made plans for twice the
 * paths that were needed.
 */
export function modelOfPilot(sums: OuterSums, innerPointCount: number, method: UpperMethod): PilotModel {
  const lowerStandardDeviation = Math.sqrt(varianceOf(sums.lower));
  if (method === 'regressed' || innerPointCount === 0) {
    return {
      lowerStandardDeviation,
      upperStandardDeviation: Math.sqrt(varianceOf(sums.regressed)),
      limitGap: sums.regressedGap.mean,
      gapPerInnerShare: 0,
      value: (sums.lower.mean + sums.regressed.mean) / 2,
    };
  }
  const halfCount = Math.ceil(innerPointCount / 2);
  const difference = halfCount < innerPointCount ? Math.max(0, sums.halfInner.mean - sums.upper.mean) : 0;
  const slope = difference === 0 ? 0 : difference / (innerShare(halfCount) - innerShare(innerPointCount));
  return {
    lowerStandardDeviation,
    upperStandardDeviation: Math.sqrt(varianceOf(sums.upper)),
    limitGap: Math.max(0, sums.gap.mean - slope * innerShare(innerPointCount)),
    gapPerInnerShare: slope,
    value: (sums.lower.mean + sums.upper.mean) / 2,
  };
}

/**
 * Width of the bracket that counts are expected to give, in money.
 *
 * @param standardErrors from each bound to its end of the bracket
 */
export function expectedWidth(model: PilotModel, counts: Counts, standardErrors = standardErrorsIn95): number {
  const noise = standardErrors * (model.lowerStandardDeviation + model.upperStandardDeviation);
  return expectedGap(model, counts.innerPointCount) + noise / Math.sqrt(counts.outerPathCount);
}

function expectedGap({ limitGap, gapPerInnerShare }: PilotModel, innerPointCount: number): number {
  return gapPerInnerShare === 0 ? limitGap : limitGap + gapPerInnerShare * innerShare(innerPointCount);
}

function innerShare(innerPointCount: number): number {
  return 1 / (innerPointCount * Math.sqrt(innerPointCount));
}

/** What a plan must keep to. */
export interface PlanRequest {
  readonly wantedWidth: number;
  /** From each bound to its end of the bracket. */
  readonly standardErrors: number;
  /** Steps allowed, over all outer paths, dates and inner points. */
  readonly stepLimit: number;
  readonly dateCount: number;
  /** Counts that the scenario fixes. */
  readonly outerPathCount: number | null;
  readonly innerPointCount: number | null;
  /** Spend the whole limit instead of stopping at the wanted width. */
  readonly spendAll: boolean;
}

/**
 * The cheapest counts that are expected to reach the wanted width; where the gap or the limit forbids it, counts whose
 * noise is small beside the gap.
 */
export function chooseCounts(model: PilotModel, request: PlanRequest): Counts {
  const innerCounts = request.innerPointCount === null ? innerPointCounts : [request.innerPointCount];
  const candidates = innerCounts.map((innerPointCount) => {
    const affordable = Math.floor(request.stepLimit / (request.dateCount * (innerPointCount + 1)));
    const wanted = request.spendAll ? affordable : outerPathsFor(model, innerPointCount, request);
    const bounded = Math.min(largestOuterPathCount, Math.max(smallestOuterPathCount, Math.min(affordable, wanted)));
    const counts = { outerPathCount: request.outerPathCount ?? bounded, innerPointCount };
    const work = counts.outerPathCount * (innerPointCount + 1);
    return {
      counts,
      width: expectedWidth(model, counts, request.standardErrors),
      work,
      isAffordable: affordable >= counts.outerPathCount,
    };
  });
  const affordable = candidates.filter(({ isAffordable }) => isAffordable);
  const open = affordable.length > 0 ? affordable : candidates.slice(0, 1);
  const goal = request.spendAll ? 0 : request.wantedWidth * aim * (1 + rounding);
  const narrowest = least(open, ({ width }) => width).width;
  const enough = Math.max(goal, narrowest * (1 + waste));
  return least(
    open.filter(({ width }) => width <= enough),
    ({ work }) => work,
  ).counts;
}

/**
 * Outer paths that bring the noise down to what the gap leaves of the aim, but not below a quarter of the gap: near the
 * edge of what the gap allows, paths without end would gain next to nothing.
 */
function outerPathsFor(
  model: PilotModel,
  innerPointCount: number,
  { wantedWidth, standardErrors }: PlanRequest,
): number {
  const gap = expectedGap(model, innerPointCount);
  const noise = standardErrors * (model.lowerStandardDeviation + model.upperStandardDeviation);
  if (noise === 0) return smallestOuterPathCount;
  const room = Math.max(aim * wantedWidth - gap, gap / 4);
  return Math.ceil((noise / room) * (noise / room));
}

function least<T>(items: readonly T[], by: (item: T) => number): T {
  return items.reduce((best, item) => (by(item) < by(best) ? item : best));
}
