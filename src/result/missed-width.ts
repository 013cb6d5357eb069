import { advice } from '../messages/build.js';
import { remedyForGap } from './gap-remedy.js';
import { type Finding, type Measures, paths } from './measures.js';

/**
 * Whether the bracket is as narrow as was asked for; if not, whether gap or noise is in the way, by how much, and what
 * would help.
 */
export function missedWidth(measures: Measures): Finding | null {
  const { bracketWidth, wantedWidth, gap } = measures;
  if (wantedWidth === null) return null;
  if (bracketWidth <= wantedWidth) {
    const figures = `${bracketWidth.toPrecision(3)} where ${wantedWidth.toPrecision(3)} was wanted`;
    return { passed: `The bracket is as narrow as wanted: ${figures}.` };
  }
  // What the bracket adds to the distance of its two bounds, by the standard errors of its own round.
  const noise = bracketWidth - gap.value;
  const isGap = gap.value > noise;
  const parts = `gap ${gap.value.toPrecision(2)}, noise ${noise.toPrecision(2)}, wanted ${wantedWidth.toPrecision(2)}`;
  const stuck = isGap ? 'the gap between the bounds' : 'the noise of the estimates';
  return {
    doubt: advice('width-missed', {
      what: `The bracket is ${bracketWidth.toPrecision(3)} wide, more than was wanted; most of it is ${stuck} (${parts}).`,
      why: `The bracket is valid as it stands. ${whyNoMore(measures)}`,
      mend: isGap ? remedyForGap(measures) : remedyForNoise(measures),
      evidence: { bracketWidth, wantedWidth, gap: gap.value, noise, stuck: isGap ? 'gap' : 'noise' },
    }),
  };
}

function whyNoMore({ plan: { round } }: Measures): string {
  const repeated = 'drawn again until it looks narrow, since that would make it too often wrong';
  return round === 1
    ? `It is not ${repeated}.`
    : `It is that of round ${round}: each round draws afresh with half the probability of a miss, and no more are made; a bracket is not ${repeated}.`;
}

function remedyForNoise({ plan, lower, upper, isComplete }: Measures): string {
  if (!isComplete) return 'Let the run finish.';
  const isNested = [lower, upper].some(
    (bound) =>
      bound.method === 'andersen-broadie' &&
      (bound.halfWidth95 ?? 0) * 2 > (lower.halfWidth95 ?? 0) + (upper.halfWidth95 ?? 0),
  );
  if (isNested)
    return `Raise \`outer\` in \`upper: { method: andersen-broadie, outer: … }\` under method above ${paths(plan.nestedOuterPathCount)}.`;
  return `Give a \`--budget\` longer than this run took, or set \`counts: { outer: … }\` under method above ${paths(plan.outerPathCount)}.`;
}
