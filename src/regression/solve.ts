import { Matrix } from 'ml-matrix';
import MultivariateLinearRegression from 'ml-regression-multivariate-linear';

/** A column is dropped when less than this share of its squared length is new. */
const rankTolerance = 1e-10;

/** The triangle that stands for all rows: Gram matrix = Rᵀ R on the kept columns. */
export interface CompressedColumns {
  readonly columnCount: number;
  readonly scales: Float64Array;
  /** Indices of the columns that were kept, in falling order of what each adds. */
  readonly kept: readonly number[];
  /** Indices of the columns that the others already span, rising. */
  readonly dropped: readonly number[];
  /** Upper triangle with one row for each kept column. */
  readonly triangle: readonly (readonly number[])[];
  /** Inverse of the triangle: the regression package's answer to one response for each row. */
  readonly inverse: readonly (readonly number[])[];
}

/**
 * Compresses normal equations to one row for each independent column, by Cholesky's factor with pivoting on columns
 * scaled to length 1.
 *
 * @param gram lower triangle of Σ column × column, row by row; only the first `columnCount` rows are read
 * @source Higham (1990), "Analysis of the Cholesky decomposition of a semi-definite matrix", in Reliable Numerical
 * Computation, 161-185
 */
export function compressColumns(gram: Float64Array, columnCount: number): CompressedColumns {
  const at = (i: number, k: number) => (i >= k ? gram[(i * (i + 1)) / 2 + k]! : gram[(k * (k + 1)) / 2 + i]!);
  const scales = Float64Array.from({ length: columnCount }, (_, i) => (at(i, i) > 0 ? 1 / Math.sqrt(at(i, i)) : 0));
  const left = Float64Array.from(scales, (scale) => (scale > 0 ? 1 : 0));
  const open = new Set(scales.keys());
  const kept: number[] = [];
  const rows: Float64Array[] = [];
  for (;;) {
    let pivot = -1;
    for (const i of open) if (pivot < 0 || left[i]! > left[pivot]!) pivot = i;
    if (pivot < 0 || !(left[pivot]! > rankTolerance)) break;
    open.delete(pivot);
    const row = new Float64Array(columnCount);
    const root = Math.sqrt(left[pivot]!);
    row[pivot] = root;
    for (const i of open) {
      let sum = at(i, pivot) * scales[i]! * scales[pivot]!;
      for (const earlier of rows) sum -= earlier[i]! * earlier[pivot]!;
      row[i] = sum / root;
      left[i] = left[i]! - row[i]! * row[i]!;
    }
    kept.push(pivot);
    rows.push(row);
  }
  const triangle = rows.map((row) => kept.map((column) => row[column]!));
  const dropped = [...open].sort((a, b) => a - b);
  return { columnCount, scales, kept, dropped, triangle, inverse: invert(triangle) };
}

/** Regresses the unit vectors on the triangle: the coefficients are its inverse, once for all responses to come. */
function invert(triangle: readonly (readonly number[])[]): number[][] {
  if (triangle.length === 0) return [];
  const units = Matrix.eye(triangle.length);
  const options = { intercept: false, statistics: false };
  return new MultivariateLinearRegression(new Matrix(triangle as number[][]), units, options).weights;
}

/**
 * Solves for the coefficients of every response on the compressed columns.
 *
 * The triangle R stands for all rows of the tall matrix, and R⁻ᵀ (column × response) for the responses; R⁻¹ times that
 * are the coefficients, refined once.
 *
 * @param products Σ response × column. @shape responses × columns
 * @returns coefficients, those of dropped columns 0. @shape responses × columns
 */
export function solveResponses(
  { columnCount, scales, kept, triangle, inverse }: CompressedColumns,
  products: Float64Array,
  responseCount: number,
): Float64Array {
  const coefficients = new Float64Array(responseCount * columnCount);
  const reduced = new Float64Array(kept.length);
  for (let first = 0; first < coefficients.length; first += columnCount) {
    for (let i = 0; i < kept.length; i++) {
      let sum = products[first + kept[i]!]! * scales[kept[i]!]!;
      for (let k = 0; k < i; k++) sum -= triangle[k]![i]! * reduced[k]!;
      reduced[i] = sum / triangle[i]![i]!;
    }
    const solution = multiply(inverse, reduced);
    // One step of refinement: the package squares the condition of the triangle, and so loses up to four digits.
    const image = multiply(triangle, solution);
    const correction = multiply(
      inverse,
      reduced.map((value, i) => value - image[i]!),
    );
    for (let i = 0; i < kept.length; i++)
      coefficients[first + kept[i]!] = (solution[i]! + correction[i]!) * scales[kept[i]!]!;
  }
  return coefficients;
}

function multiply(rows: readonly (readonly number[])[], vector: Float64Array): Float64Array {
  return Float64Array.from(rows, (row) => {
    let sum = 0;
    for (let k = 0; k < vector.length; k++) sum += row[k]! * vector[k]!;
    return sum;
  });
}
