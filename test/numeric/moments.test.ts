import { mean, sampleVariance } from 'simple-statistics';
import { expect, test } from 'vitest';
import { estimateOf } from '#built/numeric/estimate.js';
import { mergeMoments, momentsWithoutZeros, noMoments, standardErrorOf, varianceOf } from '#built/numeric/moments.js';
import { momentsOf } from '../statistics.js';

const values = Float64Array.from({ length: 101 }, (_, i) => ((i * 37) % 101) / 7 + 1e6);

test('mean and variance agree with a general-purpose library (simple-statistics), in one piece or merged', () => {
  const list = [...values];
  const pieces = [momentsOf(values, 0, 1), momentsOf(values, 1, 40), noMoments, momentsOf(values, 41, 60)];
  for (const moments of [momentsOf(values, 0, 101), pieces.reduce(mergeMoments)]) {
    expect(moments.count).toBe(101);
    expect(moments.mean).toBeCloseTo(mean(list), 8);
    expect(varianceOf(moments)).toBeCloseTo(sampleVariance(list), 6);
  }
});

test('the error of a single path is unknown, not 0', () => {
  const single = momentsOf(values, 5, 1);
  expect(standardErrorOf(single)).toBeNull();
  expect(estimateOf(single)).toEqual({ value: values[5], standardError: null, halfWidth95: null });
});

test('± is 1.96 standard errors', () => {
  const { standardError, halfWidth95 } = estimateOf(momentsOf(values, 0, 101));
  expect(halfWidth95).toBe(1.96 * standardError!);
});

test('zeros that do not count leave the moments of the others', () => {
  const others = values.map((value) => value - 1e6);
  const padded = new Float64Array(130);
  padded.set(others, 29);
  const { count, mean: found, squares } = momentsWithoutZeros(momentsOf(padded, 0, 130), 29);
  const expected = momentsOf(others, 0, 101);
  expect(count).toBe(101);
  expect(found).toBeCloseTo(expected.mean, 12);
  expect(squares).toBeCloseTo(expected.squares, 9);
  expect(momentsWithoutZeros(momentsOf(padded, 0, 29), 29)).toEqual(noMoments);
  expect(momentsWithoutZeros(expected, 0)).toEqual(expected);
});
