/** The lattice of inner points: its generating vector made again, and what the order of its points promises. */
import { expect, test } from 'vitest';
import { latticeOffsets } from '#built/paths/lattice.js';
import { generatingVector } from '#built/paths/lattice-tables.js';
import { firstDifference } from '../program/special-numbers.js';
import { constructVector, highestLevel, lowestLevel, weight } from './lattice-construction.js';

test('the table is what the construction gives, never far behind a vector made for one count of points', () => {
  const { vector, worstRatios } = constructVector(generatingVector.length);
  expect(generatingVector).toEqual(vector);
  expect(Math.max(...worstRatios)).toBeLessThan(1.6);
  expect(worstRatios.at(-1)!).toBeLessThan(1.02);
}, 60_000);

/**
 * Squared worst-case error from its definition alone: γ^|h| / Π h² over all h in the dual lattice, h with as many parts as
 * z, each from -reach to reach (0 counts as no factor).
 */
function dualSum(z: readonly number[], count: number, reach: number): number {
  const sumFrom = (dimension: number, product: number, term: number): number => {
    if (dimension === z.length) return product % count === 0 ? term : 0;
    let sum = 0;
    for (let h = -reach; h <= reach; h++)
      sum += sumFrom(dimension + 1, product + h * z[dimension]!, h === 0 ? term : (term * weight) / (h * h));
    return sum;
  };
  return sumFrom(0, 0, 1) - 1;
}

/** The same from the points of `latticeOffsets`, with the kernel's closed form. */
function pointSum(z: readonly number[], count: number): number {
  const offsets = new Float64Array(z.length);
  let sum = 0;
  for (let point = 0; point < count; point++) {
    latticeOffsets(point, offsets);
    let product = 1;
    for (const x of offsets) product *= 1 + weight * 2 * Math.PI ** 2 * (x * x - x + 1 / 6);
    sum += product;
  }
  return sum / count - 1;
}

test.each([16, 32])(
  '%i points, three dimensions: the error from the dual lattice is the one from the points',
  (count) => {
    const z = generatingVector.slice(0, 3);
    const [dual, points] = [dualSum(z, count, 128), pointSum(z, count)];
    // All terms are positive; in one dimension those beyond the reach are 7% with 16 points, 14% with 32.
    expect(dual).toBeLessThan(points);
    expect(dual / points).toBeGreaterThan(0.85);
    // Control: a vector of ones has another error.
    expect(dualSum([1, 1, 1], count, 128) / points).toBeGreaterThan(1.02);
  },
);

test('the third number is among the good ones by a search that knows only the definition', () => {
  const candidates = Array.from({ length: 8 }, (_, i) => 2 * i + 1);
  const [first, second, third] = generatingVector;
  const errorOf = (z: number) => dualSum([first!, second!, z], 32, 48);
  const errors = candidates.map(errorOf);
  expect(errorOf(third!)).toBeLessThan(1.6 * Math.min(...errors));
  expect(Math.max(...errors)).toBeGreaterThan(1.6 * Math.min(...errors));
});

test.each([1, 4, 7, 11])('the first 2^%i points are the whole lattice of so many points, each once', (level) => {
  const count = 2 ** level;
  const offsets = new Float64Array(generatingVector.length);
  const seen = new Set<string>();
  for (let point = 0; point < count; point++) {
    latticeOffsets(point, offsets);
    const multiple = offsets[0]! * count;
    const expected = generatingVector.map((z) => ((multiple * z) % count) / count);
    expect(firstDifference(offsets, expected)).toBeNull();
    seen.add(offsets.join());
  }
  expect(seen.size).toBe(count);
});

test('every number of the vector is odd, so that each coordinate alone is evenly spread', () => {
  for (const z of generatingVector) expect(z % 2).toBe(1);
  expect([lowestLevel, highestLevel]).toEqual([4, 11]);
});
