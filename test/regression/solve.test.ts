import { Matrix, solve } from 'ml-matrix';
import seedrandom from 'seedrandom';
import { expect, test } from 'vitest';
import { compressColumns, solveResponses } from '#built/regression/solve.js';

const rowCount = 200;

function sums(columns: readonly number[][], responses: readonly number[][]) {
  const dot = (a: readonly number[], b: readonly number[]) => a.reduce((sum, value, row) => sum + value * b[row]!, 0);
  const gram = columns.flatMap((a, i) => columns.slice(0, i + 1).map((b) => dot(a, b)));
  const products = responses.flatMap((response) => columns.map((column) => dot(column, response)));
  return { gram: Float64Array.from(gram), products: Float64Array.from(products) };
}

function randomColumns(count: number, seed: string): number[][] {
  const random = seedrandom(seed);
  return Array.from({ length: count }, () => Array.from({ length: rowCount }, () => random() * 2 - 1));
}

test('several responses at once agree with a QR solution of the tall matrix (ml-matrix, general-purpose)', () => {
  const columns = randomColumns(7, 'columns').map((column, k) => column.map((value) => value * 10 ** (k - 3)));
  const responses = randomColumns(3, 'responses');
  const { gram, products } = sums(columns, responses);
  const ours = solveResponses(compressColumns(gram, 7), products, 3);
  const tall = solve(new Matrix(columns).transpose(), new Matrix(responses).transpose());
  for (let r = 0; r < 3; r++) for (let k = 0; k < 7; k++) expect(ours[r * 7 + k]! / tall.get(k, r)).toBeCloseTo(1, 9);
});

test('a column that repeats others is dropped and reported, and the fit stays the same', () => {
  const columns = randomColumns(5, 'columns');
  const [response] = randomColumns(1, 'response');
  const repeated = [
    ...columns,
    columns[0]!.map((value, row) => 2 * value - columns[3]![row]!),
    columns[0]!.map(() => 0),
  ];
  const { gram, products } = sums(repeated, [response!]);
  const compressed = compressColumns(gram, 7);
  expect(compressed.dropped).toHaveLength(2);
  expect(compressed.dropped).toContain(6);
  const coefficients = solveResponses(compressed, products, 1);
  for (const column of compressed.dropped) expect(coefficients[column]).toBe(0);
  const plain = sums(columns, [response!]);
  const best = solveResponses(compressColumns(plain.gram, 5), plain.products, 1);
  for (let row = 0; row < rowCount; row++) {
    const fitted = (list: readonly number[][], weights: Float64Array) =>
      list.reduce((sum, column, k) => sum + weights[k]! * column[row]!, 0);
    expect(fitted(repeated, coefficients)).toBeCloseTo(fitted(columns, best), 9);
  }
});

test('one constant column alone gives the mean; an empty problem gives zeros', () => {
  const { gram, products } = sums([new Array(4).fill(1)], [[1, 2, 3, 6]]);
  expect(solveResponses(compressColumns(gram, 1), products, 1)[0]).toBeCloseTo(3, 12);
  const nothing = compressColumns(new Float64Array(3), 2);
  expect(nothing.kept).toEqual([]);
  expect([...solveResponses(nothing, new Float64Array(2), 1)]).toEqual([0, 0]);
});

test('nearly dependent columns are solved to the digits of back substitution', () => {
  const count = 8;
  const [first, ...noise] = randomColumns(count, 'near');
  // Column k differs from the first by a few parts in 100,000: pivots near the tolerance.
  const columns = [first!, ...noise.map((column) => column.map((value, row) => first![row]! + 4e-5 * value))];
  const responses = randomColumns(2, 'responses');
  const { gram, products } = sums(columns, responses);
  const compressed = compressColumns(gram, count);
  expect(compressed.dropped).toEqual([]);
  const ours = solveResponses(compressed, products, 2);
  const { triangle, kept, scales } = compressed;
  for (let r = 0; r < 2; r++) {
    const right = kept.map((column) => products[r * count + column]! * scales[column]!);
    const forward: number[] = [];
    right.forEach((value, i) => {
      const sum = forward.reduce((total, known, k) => total - triangle[k]![i]! * known, value);
      forward.push(sum / triangle[i]![i]!);
    });
    const solution = new Array<number>(count).fill(0);
    for (let i = count - 1; i >= 0; i--) {
      const sum = solution.reduce((total, known, k) => (k > i ? total - triangle[i]![k]! * known : total), forward[i]!);
      solution[i] = sum / triangle[i]![i]!;
    }
    const largest = Math.max(...solution.map(Math.abs));
    kept.forEach((column, i) => {
      expect(Math.abs(ours[r * count + column]! / scales[column]! - solution[i]!) / largest).toBeLessThan(1e-9);
    });
  }
});
