import { describe, expect, test } from 'vitest';
import { blockLanes, columnStride } from '#built/program/program.js';
import { interpreterKinds, plainKeys } from './interpreters.js';

const lanes = 203;
const columnCount = 6;

const at = (columns: Float64Array, column: number, lane: number) => columns[column * columnStride + lane]!;

describe.each(interpreterKinds)('%s interpreter', (_, makeInterpreter) => {
  function filled() {
    const interpreter = makeInterpreter({ columnCount: 12, programs: [], numberCount: 12 });
    interpreter.drawNormals(plainKeys(columnCount, 1), 0, 0, 0, 0, blockLanes);
    return interpreter;
  }

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

  test('reductions follow the stated order: even lanes plus odd lanes', () => {
    const interpreter = filled();
    const sumInOrder = (value: (lane: number) => number) => {
      const sums = [0, 0];
      for (let lane = 0; lane < lanes; lane++) sums[lane % 2]! += value(lane);
      return sums[0]! + sums[1]!;
    };
    const x = (lane: number) => at(interpreter.columns, 0, lane);
    const gram = new Float64Array(1);
    interpreter.accumulateGram(0, 1, lanes, gram);
    expect(gram[0]).toBe(sumInOrder((lane) => x(lane) * x(lane)));
    expect(interpreter.sum(0, lanes)).toBe(sumInOrder(x));
    const mean = sumInOrder(x) / lanes;
    const squares = sumInOrder((lane) => (x(lane) - mean) * (x(lane) - mean));
    expect(interpreter.moments(0, lanes)).toEqual({ count: lanes, mean, squares });
  });

  test('combine adds coefficient × column to each target, in the order of the columns', () => {
    const interpreter = filled();
    const coefficients = Float64Array.of(9, 0.5, -2, 0.25, 0, 3, -1);
    interpreter.combine(1, 3, coefficients, 1, 8, 2, lanes);
    for (const lane of [0, 100, lanes - 1]) {
      for (let target = 0; target < 2; target++) {
        const [a, b, c] = coefficients.subarray(1 + 3 * target);
        const [x, y, z] = [1, 2, 3].map((column) => at(interpreter.columns, column, lane));
        expect(at(interpreter.columns, 8 + target, lane)).toBe(a! * x! + b! * y! + c! * z!);
      }
    }
  });

  test('combine does not skip a coefficient of 0: what is not finite stays visible', () => {
    const interpreter = filled();
    interpreter.columns[2 * columnStride] = Number.POSITIVE_INFINITY;
    interpreter.combine(1, 3, Float64Array.of(1, 0, 1), 0, 8, 1, lanes);
    expect(at(interpreter.columns, 8, 0)).toBeNaN();
    expect(at(interpreter.columns, 8, 1)).not.toBeNaN();
  });

  test.each([1, -1] as const)('addProducts adds the products of pairs with the sign %i', (sign) => {
    const interpreter = filled();
    const before = interpreter.columns.slice();
    interpreter.addProducts(0, 2, 2, sign, 4, lanes);
    for (const lane of [0, 100, lanes - 1]) {
      const product = (pair: number) => at(before, pair, lane) * at(before, 2 + pair, lane);
      expect(at(interpreter.columns, 4, lane)).toBe(at(before, 4, lane) + sign * product(0) + sign * product(1));
    }
  });

  test('copy moves whole columns', () => {
    const interpreter = filled();
    interpreter.copy(1, 8, 2);
    for (const lane of [0, 100, blockLanes - 1]) {
      expect(at(interpreter.columns, 8, lane)).toBe(at(interpreter.columns, 1, lane));
      expect(at(interpreter.columns, 9, lane)).toBe(at(interpreter.columns, 2, lane));
    }
  });

  test.each([Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, -10])(
    '%d is not between -10 and infinity, and only the lanes in use are looked at',
    (bad) => {
      for (const lane of [16, 17]) {
        const interpreter = filled();
        expect(interpreter.areBetween(0, columnCount, -10, lanes)).toBe(true);
        interpreter.columns[3 * columnStride + lane] = bad;
        expect(interpreter.areBetween(0, columnCount, -10, lanes)).toBe(false);
        expect(interpreter.areBetween(0, columnCount, -10, lane + 1)).toBe(false);
        expect(interpreter.areBetween(0, columnCount, -10, lane)).toBe(true);
        expect(interpreter.areBetween(4, 2, -10, lanes)).toBe(true);
      }
    },
  );
});
