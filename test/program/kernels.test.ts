import { expect, test } from 'vitest';
import { createPlainInterpreter } from '#built/program/plain-interpreter.js';
import { blockLanes } from '#built/program/program.js';

const lanes = 203;
const columnCount = 6;

function filled() {
  const interpreter = createPlainInterpreter(12, 0);
  for (let column = 0; column < columnCount; column++)
    interpreter.drawNormals({ low: column, high: 1 }, 0, 0, 0, column, blockLanes);
  return interpreter;
}

const at = (columns: Float64Array, column: number, lane: number) => columns[column * blockLanes + lane]!;

test('Gram matrix and products are the plain sums over the lanes in use', () => {
  const interpreter = filled();
  const gram = new Float64Array(10).fill(1);
  interpreter.accumulateGram(0, 4, lanes, gram);
  const products = new Float64Array(8).fill(2);
  interpreter.accumulateProducts(0, 4, 4, 2, lanes, products);
  const sum = (a: number, b: number) =>
    Array.from(
      { length: lanes },
      (_, lane) => at(interpreter.columns, a, lane) * at(interpreter.columns, b, lane),
    ).reduce((x, y) => x + y);
  let position = 0;
  for (let row = 0; row < 4; row++)
    for (let column = 0; column <= row; column++) expect(gram[position++]).toBeCloseTo(1 + sum(row, column), 10);
  for (let response = 0; response < 2; response++) {
    for (let column = 0; column < 4; column++)
      expect(products[response * 4 + column]).toBeCloseTo(2 + sum(column, 4 + response), 10);
  }
});

test('reductions follow the stated order of four running sums', () => {
  const interpreter = filled();
  const gram = new Float64Array(1);
  interpreter.accumulateGram(0, 1, lanes, gram);
  const sums = [0, 0, 0, 0];
  for (let lane = 0; lane < lanes; lane++) sums[lane % 4]! += at(interpreter.columns, 0, lane) ** 2;
  expect(gram[0]).toBe(sums[0]! + sums[2]! + (sums[1]! + sums[3]!));
});

test('combine adds coefficient × column in the order of the columns', () => {
  const interpreter = filled();
  interpreter.combine(1, 3, Float64Array.of(9, 0.5, -2, 0.25), 1, 8, lanes);
  for (const lane of [0, 100, lanes - 1]) {
    const expected =
      0.5 * at(interpreter.columns, 1, lane) +
      -2 * at(interpreter.columns, 2, lane) +
      0.25 * at(interpreter.columns, 3, lane);
    expect(at(interpreter.columns, 8, lane)).toBe(expected);
  }
});

test.each([Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY])(
  '%s is found, and only in the lanes in use',
  (bad) => {
    const interpreter = filled();
    interpreter.columns[3 * blockLanes + 17] = bad;
    expect(interpreter.findNotFinite(0, columnCount, lanes)).toEqual({ column: 3, lane: 17 });
    expect(interpreter.findNotFinite(0, columnCount, 17)).toBeNull();
  },
);
