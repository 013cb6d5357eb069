/** Means over randomly shifted points of a smooth function in five dimensions: no bias, and far less variance. */
import { expect, test } from 'vitest';
import type { Moments } from '#built/numeric/moments.js';
import { latticeOffsets } from '#built/paths/lattice.js';
import { exp } from '#built/program/elementary.js';
import { blockLanes, columnStride } from '#built/program/program.js';
import { createWasmInterpreter, plainKeys } from '../program/interpreters.js';
import { firstDifference } from '../program/special-numbers.js';
import { limit, momentsOf, standardisedError } from '../statistics.js';

const dimensionCount = 5;
const pointCount = 64;
const blockCount = 40;
const interpreter = createWasmInterpreter({ columnCount: 2 * dimensionCount, programs: [], numberCount: 10 });
const keys = plainKeys(dimensionCount, 11);

/** Σ over the dimensions of the draws of one lane, in columns 5 … 9. */
const total = (lane: number) => {
  let sum = 0;
  for (let i = 0; i < dimensionCount; i++) sum += interpreter.columns[(dimensionCount + i) * columnStride + lane]!;
  return sum;
};

/** Small, as what is left beside the regressed increment is: with 0.3 the variance falls by 14 instead of 140. */
const loading = 0.1;

/** A lognormal with mean 1. */
const smooth = (lane: number) => exp(loading * total(lane) - (dimensionCount * loading * loading) / 2);

/** Moments over 20,480 lanes of the mean over 64 points that `draw` writes to columns 5 … 9. */
function meansOver(draw: (block: number, point: number) => void): Moments {
  const means = new Float64Array(blockCount * blockLanes);
  for (let block = 0; block < blockCount; block++) {
    interpreter.drawUniforms(keys, block, 0, 0, 0, blockLanes);
    for (let point = 0; point < pointCount; point++) {
      draw(block, point);
      for (let lane = 0; lane < blockLanes; lane++)
        means[block * blockLanes + lane] = means[block * blockLanes + lane]! + smooth(lane) / pointCount;
    }
  }
  return momentsOf(means, 0, means.length);
}

const offsets = new Float64Array(dimensionCount);
const latticePoint = (_: number, point: number) => {
  latticeOffsets(point, offsets);
  interpreter.latticeNormals(0, offsets, dimensionCount, blockLanes);
};
const plainPoint = (block: number, point: number) =>
  interpreter.drawNormals(keys, block, 1, point, dimensionCount, blockLanes);

test('the mean over shifts is the integral, and varies a hundredth of what plain draws do', () => {
  const lattice = meansOver(latticePoint);
  const plain = meansOver(plainPoint);
  expect(Math.abs(standardisedError(plain, 1))).toBeLessThan(limit);
  expect(Math.abs(standardisedError(lattice, 1))).toBeLessThan(limit);
  expect(plain.squares / lattice.squares).toBeGreaterThan(100);
});

test('points 2 i and 2 i + 1 are opposite draws, to the last bit', () => {
  interpreter.drawUniforms(keys, 0, 0, 0, 0, blockLanes);
  for (let point = 0; point < pointCount; point += 2) {
    latticePoint(0, point);
    const draws = interpreter.columns.slice(dimensionCount * columnStride);
    latticePoint(0, point + 1);
    const opposite = interpreter.columns.slice(dimensionCount * columnStride).map((x) => -x);
    for (let at = 0; at < draws.length; at += columnStride)
      expect(firstDifference(draws.slice(at, at + blockLanes), opposite.slice(at, at + blockLanes))).toBeNull();
  }
});

test('control: the lattice with a fixed shift in one dimension, or without its first point, is biased and it shows', () => {
  const fixed = meansOver((block, point) => {
    interpreter.columns.fill(0.01, 0, blockLanes);
    latticePoint(block, point);
  });
  expect(Math.abs(standardisedError(fixed, 1))).toBeGreaterThan(limit);
  const gapped = meansOver((block, point) => {
    latticePoint(block, point);
    if (point === 0) interpreter.columns.fill(-1, dimensionCount * columnStride);
  });
  expect(Math.abs(standardisedError(gapped, 1))).toBeGreaterThan(limit);
});

test('control: with every coordinate alike the variance falls by far less', () => {
  const alike = meansOver((_, point) => {
    latticeOffsets(point, offsets);
    offsets.fill(offsets[0]!);
    interpreter.latticeNormals(0, offsets, dimensionCount, blockLanes);
  });
  expect(meansOver(plainPoint).squares / alike.squares).toBeLessThan(50);
});
