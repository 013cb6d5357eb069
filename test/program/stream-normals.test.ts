/** The law of the draws as the stages see them: standard normals through the fast interpreter, keys by purpose and name. */
import { beforeAll, expect, test } from 'vitest';
import { type Purpose, streamKeys } from '#built/paths/stream-keys.js';
import { blockLanes, columnStride } from '#built/program/program.js';
import { drawUniforms } from '#built/program/stream.js';
import { limit, meanSquareBand } from '../statistics.js';
import { createWasmInterpreter } from './interpreters.js';

const columnCount = 16;
const interpreter = createWasmInterpreter({ columnCount, programs: [], numberCount: 2 * columnCount });
const names = Array.from({ length: columnCount }, (_, i) => `lot[${i + 1}]`);

/** Hands on the draws of all names for some blocks, one column after the other. */
function forEachColumn(purpose: Purpose, blockCount: number, work: (draws: Float64Array) => void): void {
  const keys = streamKeys('oak', purpose, names);
  for (let block = 0; block < blockCount; block++) {
    interpreter.drawNormals(keys, block, block % 5, block % 3, 0, blockLanes);
    for (let at = 0; at < columnCount * columnStride; at += columnStride)
      work(interpreter.columns.subarray(at, at + blockLanes));
  }
}

const order = 8;

/** Sums of the Hermite polynomials of orders 1 to 8, each of variance 1 and uncorrelated with the others. */
function addHermites(sums: Float64Array, draws: Float64Array): void {
  for (const x of draws) {
    let [before, now] = [0, 1];
    for (let n = 1; n <= order; n++) {
      [before, now] = [now, (x * now - Math.sqrt(n - 1) * before) / Math.sqrt(n)];
      sums[n - 1]! += now;
    }
  }
}

/** Standardised errors of the moments to order 8, as Hermite polynomials, over 1.3 million draws. */
function momentErrors(purpose: Purpose, change = (draws: Float64Array) => draws): Float64Array {
  const sums = new Float64Array(order);
  const blockCount = 160;
  forEachColumn(purpose, blockCount, (draws) => addHermites(sums, change(draws)));
  return sums.map((sum) => sum / Math.sqrt(blockCount * columnCount * blockLanes));
}

const purposes: Purpose[] = ['fit', 'pilot', 'pilot inner', 'outer', 'inner', 'nested outer', 'nested inner'];

// 56 errors within 3.6: one false alarm in 3,000 each, one in 55 in all; their mean square: one in a thousand.
test('moments to order 8 are those of the standard normal, for every purpose', () => {
  const errors = purposes.flatMap((purpose) => [...momentErrors(purpose)]);
  for (const error of errors) expect(Math.abs(error)).toBeLessThan(limit);
  const meanSquare = errors.reduce((sum, error) => sum + error * error, 0) / errors.length;
  const { low, high } = meanSquareBand(errors.length);
  expect(meanSquare).toBeGreaterThan(low);
  expect(meanSquare).toBeLessThan(high);
});

test('control: the same check catches a wrong scale, a wrong place, missing tails and a sum of twelve uniforms', () => {
  const worst = (change: (draws: Float64Array) => Float64Array) =>
    Math.max(...momentErrors('fit', change).map((error) => Math.abs(error)));
  expect(worst((draws) => draws.map((x) => x * 1.004))).toBeGreaterThan(limit);
  expect(worst((draws) => draws.map((x) => x + 0.004))).toBeGreaterThan(limit);
  expect(worst((draws) => draws.map((x) => Math.max(-3.8, Math.min(3.8, x))))).toBeGreaterThan(limit);
  const uniforms = new Float64Array(12 * blockLanes);
  let block = 0;
  const ofTwelve = (draws: Float64Array) => {
    drawUniforms({ low: 1, high: 2 }, block++, 0, 0, uniforms, 0, blockLanes);
    for (let i = 1; i < 12; i++) drawUniforms({ low: 1, high: 2 }, block, i, 0, uniforms, i * blockLanes, blockLanes);
    return draws.map((_, lane) => {
      let sum = -6;
      for (let i = 0; i < 12; i++) sum += uniforms[i * blockLanes + lane]!;
      return sum;
    });
  };
  expect(worst(ofTwelve)).toBeGreaterThan(limit);
});

const thresholds = [3, 4, 5];
/** Probability of a standard normal beyond 3, 4 and 5 on one side. */
const beyond = [1.3498980316300946e-3, 3.167124183311992e-5, 2.866515718791939e-7];

const tailBlockCount = 9800;
const farDraws: number[] = [];

beforeAll(() => {
  forEachColumn('outer', tailBlockCount, (draws) => {
    for (const x of draws) if (x > 2.9 || x < -2.9) farDraws.push(x);
  });
});

/** Standardised errors of the counts beyond the thresholds, right then left, among eighty million draws. */
function tailErrors(change = (x: number) => x): number[] {
  const sides = [1, -1].map((sign) => farDraws.map((x) => sign * change(x)));
  return sides.flatMap((side) =>
    thresholds.map((threshold, i) => {
      const expected = tailBlockCount * columnCount * blockLanes * beyond[i]!;
      return (side.filter((x) => x > threshold).length - expected) / Math.sqrt(expected);
    }),
  );
}

// Counts of the law of Poisson, whose chances beyond 3.6 standard errors come to one false alarm in 450 for all six together (their smallest mean is 23).
test('as many draws lie beyond 3, 4 and 5 on either side as the normal law has there', () => {
  for (const error of tailErrors()) expect(Math.abs(error)).toBeLessThan(limit);
});

test('control: tails wider by 0.3%, and tails cut at 5, are seen', () => {
  expect(Math.max(...tailErrors((x) => x * 1.003))).toBeGreaterThan(limit);
  expect(Math.min(...tailErrors((x) => Math.max(-5, Math.min(5, x))))).toBeLessThan(-limit);
});
