import { standardErrorsInRound } from '#built/bounds/bracket.js';
import { runOuterPaths } from '#built/bounds/outer-paths.js';
import { aim } from '#built/bounds/plan.js';
import { estimateOf, standardErrorsIn95 } from '#built/numeric/estimate.js';
import { type Moments, mergeMoments, noMoments, varianceOf } from '#built/numeric/moments.js';
import type { Fitted } from '../fitted.js';
import { momentsOf } from '../statistics.js';
import { openOuterBlock } from './brackets-of-blocks.js';
import { type Interval, intervalOf } from './misses.js';

/** An endless sample of independent values; each is handed out once. */
export interface Draws {
  take(count: number): Moments;
}

/** What the rule brings on path after path, without any martingale. */
export function plainDraws(whole: Fitted): Draws {
  const { block, outer } = openOuterBlock(whole);
  const work = { purpose: 'outer', round: 1, pathCount: Number.MAX_SAFE_INTEGER, innerPointCount: 0 } as const;
  let firstBlock = 0;
  let values = new Float64Array(0);
  let used = 0;
  const one = () => {
    if (used === values.length) {
      runOuterPaths(block, outer, whole.rule, work, { firstBlock, blockCount: 1 });
      values = Float64Array.from(block.column(outer.columns.plain));
      firstBlock++;
      used = 0;
    }
    return values[used++]!;
  };
  return { take: (count) => momentsOf(Float64Array.from({ length: count }, one), 0, count) };
}

const widthOf = ({ low, high }: Interval) => high - low;
const enoughFor = (moments: Moments, width: number, standardErrors: number) =>
  Math.max(2, Math.ceil((varianceOf(moments) * (2 * standardErrors) ** 2) / width ** 2));

/** What must not be done: adds parcels to one sample and looks after each, until the interval is narrow. */
export function stopWhenNarrow(draws: Draws, parcel: number, width: number): Interval {
  let moments = noMoments;
  for (;;) {
    moments = mergeMoments(moments, draws.take(parcel));
    const interval = intervalOf(estimateOf(moments), standardErrorsIn95);
    if (widthOf(interval) < width) return interval;
  }
}

/** Rounds as a run draws them: counts from a pilot, then from the round before; each round afresh, its ends farther out. */
export function freshRounds(draws: Draws, pilotCount: number, width: number): { interval: Interval; rounds: number } {
  let before = draws.take(pilotCount);
  for (let round = 1; ; round++) {
    const standardErrors = standardErrorsInRound(round);
    const moments = draws.take(Math.max(pilotCount, enoughFor(before, aim * width, standardErrors)));
    const interval = intervalOf(estimateOf(moments), standardErrors);
    if (widthOf(interval) <= width || round === 3) return { interval, rounds: round };
    before = moments;
  }
}
