import { expect, test } from 'vitest';
import { chooseCounts, expectedWidth, type PilotModel, type PlanRequest } from '#built/bounds/plan.js';

const model: PilotModel = {
  lowerStandardDeviation: 1,
  upperStandardDeviation: 1,
  limitGap: 0.05,
  gapPerInnerShare: 32,
  value: 14,
};
const request: PlanRequest = {
  wantedWidth: 0.14,
  standardErrors: 1.96,
  stepLimit: 1e9,
  dateCount: 9,
  outerPathCount: null,
  innerPointCount: null,
  spendAll: false,
};
const steps = (counts: { outerPathCount: number; innerPointCount: number }) =>
  9 * counts.outerPathCount * (counts.innerPointCount + 1);

test('the plan aims below the wanted width, with no cheaper counts that reach as far', () => {
  const counts = chooseCounts(model, request);
  const width = expectedWidth(model, counts);
  expect(width).toBeLessThanOrEqual(0.85 * 0.14 * 1.001);
  for (const innerPointCount of [8, 16, 32, 64, 128, 256, 512]) {
    for (
      let outerPathCount = 1024;
      steps({ outerPathCount, innerPointCount }) < 0.99 * steps(counts);
      outerPathCount *= 1.01
    ) {
      expect(expectedWidth(model, { outerPathCount, innerPointCount })).toBeGreaterThan(0.85 * 0.14 * 0.999);
    }
  }
});

test('a gap that forbids the width costs a sensible effort, not all there is', () => {
  const counts = chooseCounts({ ...model, limitGap: 0.2 }, request);
  expect(expectedWidth({ ...model, limitGap: 0.2 }, counts)).toBeLessThan(0.2 * 1.4);
  expect(steps(counts)).toBeLessThan(1e8);
});

test.each([1e6, 1e7, 1e8])('a budget of %d steps is kept and spent', (stepLimit) => {
  const counts = chooseCounts(model, { ...request, stepLimit, spendAll: true });
  expect(steps(counts)).toBeLessThanOrEqual(stepLimit);
  expect(steps(counts)).toBeGreaterThan(0.5 * stepLimit);
});

test('counts that the scenario fixes are kept', () => {
  expect(chooseCounts(model, { ...request, innerPointCount: 5 }).innerPointCount).toBe(5);
  expect(chooseCounts(model, { ...request, outerPathCount: 777 }).outerPathCount).toBe(777);
});

test('the effort grows without a cliff as the gap nears the wanted width', () => {
  const spread = { ...model, gapPerInnerShare: 0 };
  const effort = [];
  for (let limitGap = 0.02; limitGap < 0.2; limitGap += 0.002)
    effort.push(steps(chooseCounts({ ...spread, limitGap }, request)));
  expect(Math.max(...effort)).toBeLessThan(80 * Math.min(...effort));
  for (let i = 1; i < effort.length; i++) expect(effort[i]! / effort[i - 1]!).toBeGreaterThan(0.5);
});
