/** What a martingale takes off the variance of the lower bound, on the five lots: three controls, one rule, the same paths. */
import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import type { Estimate, Plan, RunRecord } from '#built/result/record.js';
import { recordOf } from '../run-value.js';

const pathCount = 16_384;
const text = readFileSync(new URL('../../scenarios/02-five-lots.yaml', import.meta.url), 'utf8');

/** The run with so many inner points; without any, the regressed martingale is taken off. */
function runWith(innerPointCount: number): Promise<RunRecord> {
  const plan: Plan = {
    basisSize: 1,
    round: 1,
    fitPathCount: 131_072,
    outerPathCount: pathCount,
    innerPointCount,
    nestedOuterPathCount: 0,
    nestedInnerPathCount: 0,
    upper: innerPointCount === 0 ? 'regressed' : 'one-step',
  };
  return recordOf(text, { plan, workers: 2 });
}

const variance = ({ standardError }: Estimate) => standardError! ** 2 * pathCount;

test('the one-step control leaves a thousandth of the variance that the lower bound has without one', async () => {
  const regressed = await runWith(0);
  const oneStep = await runWith(64);
  const variances = {
    plain: variance(oneStep.crossChecks.plainLower),
    regressed: variance(regressed.lower),
    oneStep: variance(oneStep.lower),
  };
  console.log('| control of the lower bound | variance of a path | of plain |\n| --- | --- | --- |');
  for (const [name, found] of Object.entries(variances))
    console.log(`| ${name} | ${found.toPrecision(3)} | 1 / ${(variances.plain / found).toFixed(0)} |`);

  // The same rule on the same paths: the digits differ by the order of sums only.
  expect(regressed.crossChecks.plainLower.value).toBeCloseTo(oneStep.crossChecks.plainLower.value, 9);
  expect(variances.plain).toBeGreaterThan(300);
  expect(variances.regressed).toBeLessThan(25);
  expect(variances.oneStep).toBeLessThan(0.5);
});
