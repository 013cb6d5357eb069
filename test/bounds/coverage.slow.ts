import { expect, test } from 'vitest';
import { recordOf } from '../run-value.js';
import { type LotsChange, lots } from '../scenario-texts.js';

const runCount = 200;

/** Largest count of misses among n runs that a miss rate of 5% exceeds only once in a thousand (binomial law). */
function mostMisses(n: number): number {
  let probability = 0.95 ** n;
  let total = probability;
  let misses = 0;
  while (total < 0.999) {
    misses++;
    probability *= ((n - misses + 1) / misses) * (0.05 / 0.95);
    total += probability;
  }
  return misses;
}

const cases: readonly { name: string; change: LotsChange; exact: number; method: readonly string[] }[] = [
  {
    // One date: no gap, so that the interval has no slack. One integral (Stulz 1982; Johnson 1987), error 1e-5.
    name: 'two lots, one date',
    change: { dates: '[3]' },
    exact: 11.19568,
    method: ['counts: { fit: 4000 }', 'bracket width: { relative: 1% }'],
  },
  {
    // Independent quadrature, error at most 0.0001.
    name: 'two lots, nine dates',
    change: {},
    exact: 13.9018,
    method: ['counts: { fit: 8000 }', 'bracket width: { relative: 2% }'],
  },
];

test.each(cases)(
  '$name: brackets made to a wanted width contain the exact value',
  async ({ name, change, exact, method }) => {
    let [low, high] = [0, 0];
    const widths: number[] = [];
    for (let run = 0; run < runCount; run++) {
      const { bracket95 } = await recordOf(lots({ ...change, method, seed: `coverage ${run}` }));
      if (bracket95.high < exact) low++;
      if (bracket95.low > exact) high++;
      widths.push((bracket95.high - bracket95.low) / exact);
    }
    widths.sort((a, b) => a - b);
    const median = `${(100 * widths[runCount / 2]!).toFixed(2)}%`;
    console.log(
      `${name}: ${runCount} runs, ${low} brackets too low, ${high} too high, at most ${mostMisses(runCount)} allowed, median width ${median}`,
    );
    expect(low + high).toBeLessThanOrEqual(mostMisses(runCount));
  },
);

test('control: an interval of one standard error is caught', async () => {
  let misses = 0;
  for (let run = 0; run < 60; run++) {
    const { lower } = await recordOf(
      lots({ dates: '[3]', method: ['counts: { fit: 1000, outer: 1024, inner: 8 }'], seed: `control ${run}` }),
    );
    if (Math.abs(lower.value - 11.19568) > lower.standardError!) misses++;
  }
  expect(misses).toBeGreaterThan(mostMisses(60));
});
