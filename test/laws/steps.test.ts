import { expect, test } from 'vitest';
import { builtLaws } from '#built/laws/built-laws.js';
import { evaluateAt } from '../program/evaluate-at.js';

const duration = 0.7;
const parameters: Record<string, number> = { 'growth of mean': 0.08, drift: 1.5, volatility: 0.35 };

/** Mean of f over one step from a start, by the trapezoidal rule over the standard normal shock. */
function stepMean(name: string, start: number, f: (next: number) => number): number {
  const law = builtLaws.get(name)!;
  const width = 0.005;
  let sum = 0;
  for (let shock = -12; shock <= 12; shock += width) {
    const next = evaluateAt(
      (graph, at) =>
        law.step(graph, {
          state: graph.constant(start),
          shock: at,
          duration: graph.constant(duration),
          parameter: (key) => graph.constant(parameters[key]!),
        }),
      shock,
    );
    sum += f(next) * Math.exp((-shock * shock) / 2);
  }
  return (sum * width) / Math.sqrt(2 * Math.PI);
}

// Closed forms of the two laws (standard).
test('a lognormal step has the mean and variance of its closed form', () => {
  const growth = Math.exp(0.08 * duration);
  const expectedVariance = (40 * growth) ** 2 * (Math.exp(0.35 ** 2 * duration) - 1);
  const mean = stepMean('lognormal', 40, (x) => x);
  expect(mean).toBeCloseTo(40 * growth, 8);
  expect(stepMean('lognormal', 40, (x) => (x - mean) ** 2)).toBeCloseTo(expectedVariance, 7);
});

test('a normal step has the mean and variance of its closed form', () => {
  const mean = stepMean('normal', -3, (x) => x);
  expect(mean).toBeCloseTo(-3 + 1.5 * duration, 10);
  expect(stepMean('normal', -3, (x) => (x - mean) ** 2)).toBeCloseTo(0.35 ** 2 * duration, 10);
});
