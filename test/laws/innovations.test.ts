import { expect, test } from 'vitest';
import { builtLaws } from '#built/laws/built-laws.js';
import { evaluateAt } from '../program/evaluate-at.js';

const highestDegree = 8;
const range = 14;
const nodeCount = 700;

/** Integral of f × density by the trapezoidal rule: exact to rounding for smooth functions that vanish at the ends. */
function mean(density: (x: number) => number, f: (x: number) => number): number {
  const width = (2 * range) / nodeCount;
  let sum = 0;
  for (let i = 0; i <= nodeCount; i++) {
    const x = -range + i * width;
    sum += f(x) * density(x);
  }
  return sum * width;
}

const innovations = [...new Set([...builtLaws.values()].map((law) => law.innovation))];

test.each(innovations.map((innovation) => [innovation.name, innovation] as const))(
  'the polynomials of the %s innovation have mean 0, variance 1 and no correlation',
  (_, innovation) => {
    const polynomials = Array.from(
      { length: highestDegree + 1 },
      (__, degree) => (x: number) => evaluateAt((graph, at) => innovation.polynomial(graph, degree, at), x),
    );
    expect(mean(innovation.density, () => 1)).toBeCloseTo(1, 12);
    for (let a = 0; a <= highestDegree; a++) {
      if (a > 0) expect(mean(innovation.density, polynomials[a]!)).toBeCloseTo(0, 11);
      for (let b = 0; b <= a; b++) {
        const product = mean(innovation.density, (x) => polynomials[a]!(x) * polynomials[b]!(x));
        expect(product).toBeCloseTo(a === b ? 1 : 0, 10);
      }
    }
  },
);

test('the same integral catches a polynomial that is not scaled', () => {
  const { density } = innovations[0]!;
  expect(Math.abs(mean(density, (x) => (x * x - 1) ** 2) - 1)).toBeGreaterThan(0.9);
});
