import { expect, test } from 'vitest';
import { createPlainInterpreter } from '#built/program/plain-interpreter.js';
import { columnStride } from '#built/program/program.js';
import { compressColumns, solveResponses } from '#built/regression/solve.js';

/**
 * The eight-path example of Longstaff & Schwartz (2001), section 1: put with strike 1.10, rate .06, three dates. Paths as
 * in public lecture notes that repeat the example; results from memory and by an independent computation.
 */
const paths = [
  [1.09, 1.08, 1.34],
  [1.16, 1.26, 1.54],
  [1.22, 1.07, 1.03],
  [0.93, 0.97, 0.92],
  [1.11, 1.56, 1.52],
  [0.76, 0.77, 0.9],
  [0.92, 0.84, 1.01],
  [0.88, 1.22, 1.34],
];
const strike = 1.1;
const discount = Math.exp(-0.06);

/** Regresses on 1, X, X² with the project's own normal equations and solver. */
function regress(states: readonly number[], responses: readonly number[]): Float64Array {
  const interpreter = createPlainInterpreter({ columnCount: 4, programs: [], numberCount: 0 });
  states.forEach((x, lane) => {
    [1, x, x * x, responses[lane]!].forEach((value, column) => {
      interpreter.columns[column * columnStride + lane] = value;
    });
  });
  const gram = new Float64Array(6);
  const products = new Float64Array(3);
  interpreter.accumulateGram(0, 3, states.length, gram);
  interpreter.accumulateProducts(0, 3, 3, 1, states.length, products);
  return solveResponses(compressColumns(gram, 3), products, 1);
}

test('the eight-path example comes out to the digits given', () => {
  const cash = paths.map((path) => Math.max(0, strike - path[2]!));
  const time = paths.map(() => 3);
  const european = cash.reduce((sum, amount) => sum + amount * discount ** 3, 0) / 8;
  expect(european).toBeCloseTo(0.05638074, 8);

  const expected = {
    2: {
      coefficients: [-1.06998766, 2.98341063, -1.81357618],
      continuation: [0.03674056, 0.04589834, 0.11752682, 0.15196921, 0.15641792],
      exercised: [4, 6, 7],
    },
    1: {
      coefficients: [2.03751234, -3.3354434, 1.35645659],
      continuation: [0.01348511, 0.10874928, 0.28606468, 0.11700927, 0.15276213],
      exercised: [4, 6, 7, 8],
    },
  };
  for (const date of [2, 1] as const) {
    const inTheMoney = paths.flatMap((path, i) => (path[date - 1]! < strike ? [i] : []));
    const states = inTheMoney.map((i) => paths[i]![date - 1]!);
    const coefficients = regress(
      states,
      inTheMoney.map((i) => cash[i]! * discount ** (time[i]! - date)),
    );
    const continuation = states.map((x) => coefficients[0]! + coefficients[1]! * x + coefficients[2]! * x * x);
    expected[date].coefficients.forEach((value, k) => {
      expect(coefficients[k]).toBeCloseTo(value, 8);
    });
    expected[date].continuation.forEach((value, k) => {
      expect(continuation[k]).toBeCloseTo(value, 8);
    });
    const exercised = inTheMoney.filter((_, k) => strike - states[k]! > continuation[k]!);
    expect(exercised.map((i) => i + 1)).toEqual(expected[date].exercised);
    for (const i of exercised) {
      cash[i] = strike - paths[i]![date - 1]!;
      time[i] = date;
    }
  }
  expect(cash[2]).toBeCloseTo(0.07, 12);
  expect([3, 5, 6, 7].map((i) => Number(cash[i]!.toFixed(12)))).toEqual([0.17, 0.34, 0.18, 0.22]);
  const value = cash.reduce((sum, amount, i) => sum + amount * discount ** time[i]!, 0) / 8;
  expect(value).toBeCloseTo(0.11443433, 8);
});
