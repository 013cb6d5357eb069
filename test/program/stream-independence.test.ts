/**
 * Draws that stand beside each other in any direction are uncorrelated, and so are their squares: through the fast
 * interpreter, keys by purpose and name as the stages make them.
 */
import { expect, test } from 'vitest';
import { type Purpose, streamKeys } from '#built/paths/stream-keys.js';
import { blockLanes } from '#built/program/program.js';
import { largestLimit, meanSquareBand } from '../statistics.js';
import { createWasmInterpreter } from './interpreters.js';
import { TestNumbers } from './special-numbers.js';

const seriesCount = 40;
const streamsPerSeries = 40;

/** Draws of one stream at a time. */
const single = createWasmInterpreter({ columnCount: 1, programs: [], numberCount: 2 });

function stream(keys: Int32Array, block: number, date: number, replicate: number): Float64Array {
  single.drawNormals(keys, block, date, replicate, 0, blockLanes);
  return single.columns.subarray(0, blockLanes);
}

/** Series of some streams each. */
function seriesOf(count: number, draws: (series: number, i: number) => Float64Array): Float64Array[] {
  return Array.from({ length: count }, (_, series) => {
    const values = new Float64Array(streamsPerSeries * blockLanes);
    for (let i = 0; i < streamsPerSeries; i++) values.set(draws(series, i), i * blockLanes);
    return values;
  });
}

const purposes: Purpose[] = ['fit', 'pilot', 'pilot inner', 'outer', 'inner', 'nested outer', 'nested inner'];
const oneKey = streamKeys('oak', 'outer', ['lot[1]']);
const keysOf = (texts: readonly [string, Purpose, string][]) =>
  texts.map(([seed, purpose, name]) => streamKeys(seed, purpose, [name]));
const numbers = Array.from({ length: seriesCount }, (_, i) => i);
const keysOfNames = keysOf(numbers.map((i) => ['oak', 'outer', `lot[${i + 1}]`]));
const keysOfPurposes = keysOf(purposes.map((purpose) => ['oak', purpose, 'lot[1]']));
const keysOfSeeds = keysOf(numbers.map((i) => [`oak ${i}`, 'outer', 'lot[1]']));

/** The same lane of many blocks, for neighbouring lanes. */
function lanesOf(): Float64Array[] {
  const blockCount = streamsPerSeries * blockLanes;
  const series = numbers.map(() => new Float64Array(blockCount));
  for (let block = 0; block < blockCount; block++) {
    single.drawNormals(oneKey, block, 3, 0, 0, seriesCount);
    series.forEach((values, lane) => {
      values[block] = single.columns[lane]!;
    });
  }
  return series;
}

const directions: [string, () => Float64Array[]][] = [
  ['blocks', () => seriesOf(seriesCount, (series, i) => stream(oneKey, series, i, 0))],
  ['dates', () => seriesOf(seriesCount, (series, i) => stream(oneKey, i, series, 1))],
  ['replicates', () => seriesOf(seriesCount, (series, i) => stream(oneKey, i, 2, series))],
  ['lanes', lanesOf],
  ["innovations' names", () => seriesOf(seriesCount, (series, i) => stream(keysOfNames[series]!, i, 0, 0))],
  ['purposes', () => seriesOf(purposes.length, (series, i) => stream(keysOfPurposes[series]!, i, 0, 0))],
  ['seeds', () => seriesOf(seriesCount, (series, i) => stream(keysOfSeeds[series]!, i, 0, 0))],
];

/** Standardised correlations of every pair of series: of values, and of squares. */
function correlations(series: readonly Float64Array[]): number[] {
  const squares = series.map((values) => values.map((x) => (x * x - 1) / Math.SQRT2));
  return [series, squares].flatMap((all) =>
    all.flatMap((a, i) => all.slice(0, i).map((b) => dot(a, b) / Math.sqrt(a.length))),
  );
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}

interface Verdict {
  readonly isLargestWithin: boolean;
  readonly isMeanSquareWithin: boolean;
}

function judge(errors: readonly number[]): Verdict {
  const meanSquare = dot(Float64Array.from(errors), Float64Array.from(errors)) / errors.length;
  const { low, high } = meanSquareBand(errors.length);
  return {
    isLargestWithin: Math.max(...errors.map(Math.abs)) < largestLimit(errors.length),
    isMeanSquareWithin: meanSquare > low && meanSquare < high,
  };
}

// Two verdicts of one false alarm in a thousand each, for every row: one in 70 in all, and the seeds are fixed.
test.each(directions)('neighbouring %s: every pair of values and of squares is uncorrelated', (_, draws) => {
  const series = draws();
  expect(judge(correlations(series))).toEqual({ isLargestWithin: true, isMeanSquareWithin: true });
});

const [, blocks] = directions[0]!;

test('control: one pair with a correlation of 5% is seen', () => {
  const series = blocks();
  series[7] = series[7]!.map((x, i) => Math.sqrt(1 - 0.05 ** 2) * x + 0.05 * series[3]![i]!);
  expect(judge(correlations(series)).isLargestWithin).toBe(false);
});

test('control: one series that is another with random signs shows in the squares', () => {
  const series = blocks();
  const signs = new TestNumbers(9);
  series[7] = series[3]!.map((x) => (signs.below(2) === 0 ? x : -x));
  expect(judge(correlations(series)).isLargestWithin).toBe(false);
});

test('control: one hundredth of the variance common to all shows in the mean square', () => {
  const series = blocks();
  const common = series.pop()!;
  const mixed = series.map((values) => values.map((x, i) => Math.sqrt(1 - 0.01) * x + 0.1 * common[i]!));
  expect(judge(correlations(mixed)).isMeanSquareWithin).toBe(false);
});
