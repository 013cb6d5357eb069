import { expect, test } from 'vitest';
import { factorCorrelation } from '#built/paths/correlation-factor.js';

function product(factor: readonly (readonly number[])[]): number[][] {
  return factor.map((a) => factor.map((b) => a.reduce((sum, value, k) => sum + value * b[k]!, 0)));
}

function expectClose(actual: readonly (readonly number[])[], expected: readonly (readonly number[])[]) {
  actual.forEach((row, i) => {
    row.forEach((value, k) => {
      expect(value).toBeCloseTo(expected[i]![k]!, 12);
    });
  });
}

const exchangeable = (size: number, value: number) =>
  Array.from({ length: size }, (_, i) => Array.from({ length: size }, (__, k) => (i === k ? 1 : value)));

test.each([
  ['no correlation', exchangeable(4, 0), [4]],
  ['a family', exchangeable(4, 0.3), [4]],
  ['a family at its lowest correlation', exchangeable(4, -1 / 3), [4]],
  ['a family that moves as one', exchangeable(3, 1), [3]],
  [
    'single drivers',
    [
      [1, 0.5, -0.2],
      [0.5, 1, 0.1],
      [-0.2, 0.1, 1],
    ],
    [1, 1, 1],
  ],
  [
    'a single driver twice',
    [
      [1, 1, 0.4],
      [1, 1, 0.4],
      [0.4, 0.4, 1],
    ],
    [1, 1, 1],
  ],
  [
    'a family with a driver linked to all',
    [
      [1, 0.2, 0.5],
      [0.2, 1, 0.5],
      [0.5, 0.5, 1],
    ],
    [2, 1],
  ],
  [
    'an uneven family',
    [
      [1, 0.2, 0.5],
      [0.2, 1, -0.1],
      [0.5, -0.1, 1],
    ],
    [3],
  ],
] as [string, number[][], number[]][])('%s: factor times its transpose is the correlation', (_, correlation, sizes) => {
  expectClose(product(factorCorrelation(correlation, sizes)), correlation);
});

test('the factor of a family treats its members alike', () => {
  const factor = factorCorrelation(exchangeable(5, 0.4), [5]);
  for (let i = 0; i < 5; i++)
    for (let k = 0; k < 5; k++) expect(factor[i]![k]).toBe(factor[i === k ? 0 : 0]![i === k ? 0 : 1]);
});
