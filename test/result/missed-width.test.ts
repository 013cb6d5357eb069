import { describe, expect, it, test } from 'vitest';
import { remedyForGap } from '#built/result/gap-remedy.js';
import type { Measures } from '#built/result/measures.js';
import { missedWidth } from '#built/result/missed-width.js';
import type { SizesEnded } from '#built/result/record.js';
import { smallPlan } from '../small-plan.js';

const bound = (value: number, halfWidth95: number) => ({
  value,
  standardError: halfWidth95 / 1.96,
  halfWidth95,
  pathCount: 4000,
});

/** A run whose gap is .012 and whose noise is .004, where .010 was wanted. */
const gapStuck: Measures = {
  plan: { ...smallPlan, innerPointCount: 64, outerPathCount: 4000, fitPathCount: 40_000 },
  columnCount: 10,
  basisIsAutomatic: true,
  sizesEnded: 'no larger size',
  innerIsFixed: false,
  isComplete: true,
  dates: [],
  lower: { ...bound(14, 0.002), method: 'rule' },
  upper: { ...bound(14.012, 0.002), method: 'one-step' },
  uppers: [],
  gap: bound(0.012, 0.001),
  bracketWidth: 0.016,
  wantedWidth: 0.01,
  decidedBy: 'holder',
  exercisedPathCount: 3000,
  endedPathCount: null,
};
const noiseStuck: Measures = { ...gapStuck, gap: bound(0.004, 0.001) };

function doubtOf(measures: Measures) {
  const found = missedWidth(measures);
  if (found === null || !('doubt' in found)) throw new Error('no doubt');
  return found.doubt;
}

describe('a width that was missed', () => {
  it('says by how much gap and noise are in the way', () => {
    const { what, evidence } = doubtOf(gapStuck);
    expect(what).toContain('most of it is the gap between the bounds (gap 0.012, noise 0.0040, wanted 0.010).');
    expect(evidence).toMatchObject({ stuck: 'gap', gap: 0.012, wantedWidth: 0.01 });
    expect(doubtOf(noiseStuck).what).toContain('most of it is the noise of the estimates (gap 0.0040, noise 0.012,');
  });

  it('asks for what narrows the gap', () => {
    expect(doubtOf(gapStuck).mend).toBe(remedyForGap(gapStuck));
  });

  it('asks for more paths against noise', () => {
    expect(doubtOf(noiseStuck).mend).toContain('`--budget` longer than this run took, or set `counts: { outer: … }`');
    expect(doubtOf(noiseStuck).mend).toContain('above 4,000');
    expect(doubtOf({ ...noiseStuck, isComplete: false }).mend).toBe('Let the run finish.');
  });

  it('asks for more outer paths of the nested bound where they make the noise', () => {
    const plan = { ...noiseStuck.plan, upper: 'andersen-broadie', nestedOuterPathCount: 1024 } as const;
    const nested = { ...noiseStuck, plan, upper: { ...bound(14.004, 0.011), method: 'andersen-broadie' } as const };
    expect(doubtOf(nested).mend).toBe(
      'Raise `outer` in `upper: { method: andersen-broadie, outer: … }` under method above 1,024.',
    );
    const ruled = { ...nested, lower: { ...bound(14, 0.02), method: 'rule' } as const };
    expect(doubtOf(ruled).mend).toContain('--budget');
  });

  it('says that a bracket is not drawn until it looks narrow, and what further rounds were', () => {
    expect(doubtOf(gapStuck).why).toContain('It is not drawn again until it looks narrow');
    const { why } = doubtOf({ ...gapStuck, plan: { ...gapStuck.plan, round: 3 } });
    expect(why).toContain('It is that of round 3: each round draws afresh with half the probability of a miss');
  });

  it('is no doubt where the width is reached, and no question where none was asked for', () => {
    expect(missedWidth({ ...gapStuck, bracketWidth: 0.01 })).toEqual({
      passed: 'The bracket is as narrow as wanted: 0.0100 where 0.0100 was wanted.',
    });
    expect(missedWidth({ ...gapStuck, wantedWidth: null })).toBeNull();
  });
});

test.each<[SizesEnded | null, RegExp]>([
  [
    'no larger size',
    /^No larger basis is built in: raise `counts: { fit: … }` under method above 40,000, or state col/,
  ],
  ['no gain', /^Larger sizes of the basis brought nothing: raise `counts: { fit: … }` under method above 40,000/],
  ['larger size too costly', /^Give a `--budget` longer than this run took/],
  ['width in reach', /^Ask for a narrower `bracket width`/],
  ['too few paths', /^Raise `counts: { fit: … }` under method above 40,000 or leave it out; larger sizes/],
  ['too little memory', /--fit-memory/],
  [null, /^Leave out `counts` under method and `--plan`, so that the size of the basis is chosen; or raise/],
])('against a gap after "%s"', (sizesEnded, words) => {
  expect(remedyForGap({ ...gapStuck, sizesEnded })).toMatch(words);
});

test('against a gap that the upper bound, the inner points or a stated basis make', () => {
  const withUpper = (upper: 'regressed' | 'andersen-broadie', innerPointCount: number) =>
    remedyForGap({ ...gapStuck, plan: { ...gapStuck.plan, upper, innerPointCount, nestedInnerPathCount: 7 } });
  expect(withUpper('regressed', 8)).toContain('Take `upper: regressed` out of method');
  expect(withUpper('regressed', 0)).toContain('Take `upper: regressed` and `inner: 0` out of method');
  expect(withUpper('andersen-broadie', 8)).toContain('under method above 7, or try `upper: one-step`.');
  expect(remedyForGap({ ...gapStuck, innerIsFixed: true })).toContain(
    'Raise `inner` in `counts` under method above 64',
  );
  const plenty = { ...gapStuck, innerIsFixed: true, plan: { ...gapStuck.plan, innerPointCount: 1024 } };
  expect(remedyForGap(plenty)).toContain('No larger basis is built in');
  expect(remedyForGap({ ...gapStuck, basisIsAutomatic: false, sizesEnded: null })).toContain('Use `basis: auto`');
});
