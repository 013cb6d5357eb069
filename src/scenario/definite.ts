import { EigenvalueDecomposition, Matrix } from 'ml-matrix';

/** Two drivers with their share in what makes a correlation matrix impossible; more negative is worse. */
export interface OffendingPair {
  readonly first: number;
  readonly second: number;
  readonly contribution: number;
}

/** Why a matrix is not positive semidefinite. */
export interface Indefinite {
  /** The smallest eigenvalue, or a negative value that the quadratic form takes on a unit vector. */
  readonly form: number;
  /** The worst pairs, the worst first, at most three. */
  readonly pairs: readonly OffendingPair[];
}

/** An eigenvalue down to here is rounding, not a mistake. */
export const tolerance = 1e-10;

const largestForEigenvalues = 200;

/**
 * Whether a symmetric matrix with ones on its diagonal is positive semidefinite to {@link tolerance}; null if it is.
 *
 * The Cholesky factor of the matrix plus the tolerance exists just then, and costs a third of a multiplication. Only if it
 * fails is a direction of negative variance looked for: the eigenvector of the smallest eigenvalue, or, where that would
 * take too long, the direction in which the factor failed.
 *
 * @cost n³ / 3 operations; n ≤ 200 adds one eigenvalue decomposition on failure
 */
export function indefiniteness(matrix: readonly Float64Array[]): Indefinite | null {
  if (matrix.every((row, i) => row.every((value, j) => i === j || value === 0))) return null;
  const failed = failingDirection(matrix);
  if (failed === null) return null;
  const direction = matrix.length <= largestForEigenvalues ? worstEigenvector(matrix) : failed;
  const judged = judgeDirection(matrix, direction);
  return judged.form < -tolerance ? judged : null;
}

function worstEigenvector(matrix: readonly Float64Array[]): number[] {
  const decomposition = new EigenvalueDecomposition(new Matrix(matrix.map((row) => [...row])), {
    assumeSymmetric: true,
  });
  const values = decomposition.realEigenvalues;
  const worst = values.indexOf(Math.min(...values));
  return decomposition.eigenvectorMatrix.getColumn(worst);
}

/** A vector on which the quadratic form is negative, found where the Cholesky factorisation breaks down; null if it does not. */
function failingDirection(matrix: readonly Float64Array[]): number[] | null {
  const factor: Float64Array[] = [];
  for (let i = 0; i < matrix.length; i += 1) {
    const row = new Float64Array(i + 1);
    for (let j = 0; j <= i; j += 1) {
      let rest = matrix[i]![j]! + (i === j ? tolerance : 0);
      const other = j === i ? row : factor[j]!;
      for (let k = 0; k < j; k += 1) rest -= row[k]! * other[k]!;
      if (j < i) row[j] = rest / factor[j]![j]!;
      else if (rest > 0) row[j] = Math.sqrt(rest);
      else return backSubstituted(factor, row, matrix.length);
    }
    factor.push(row);
  }
  return null;
}

/** Solves L′ v = -row for the leading block; with a one behind it v is the direction in which the form is negative. */
function backSubstituted(factor: readonly Float64Array[], row: Float64Array, size: number): number[] {
  const block = factor.length;
  const direction = new Array<number>(size).fill(0);
  direction[block] = 1;
  for (let i = block - 1; i >= 0; i -= 1) {
    let rest = -row[i]!;
    for (let k = i + 1; k < block; k += 1) rest -= factor[k]![i]! * direction[k]!;
    direction[i] = rest / factor[i]![i]!;
  }
  return direction;
}

function judgeDirection(matrix: readonly Float64Array[], direction: readonly number[]): Indefinite {
  const squares = direction.reduce((sum, value) => sum + value * value, 0);
  let form = 0;
  const pairs: OffendingPair[] = [];
  for (let i = 0; i < matrix.length; i += 1) {
    form += (direction[i]! * direction[i]!) / squares;
    for (let j = i + 1; j < matrix.length; j += 1) {
      const contribution = (2 * direction[i]! * direction[j]! * matrix[i]![j]!) / squares;
      form += contribution;
      if (contribution < 0) keepWorst(pairs, { first: i, second: j, contribution });
    }
  }
  return { form, pairs };
}

function keepWorst(pairs: OffendingPair[], pair: OffendingPair): void {
  const last = pairs.at(-1);
  if (pairs.length === 3 && last!.contribution <= pair.contribution) return;
  pairs.push(pair);
  pairs.sort((a, b) => a.contribution - b.contribution);
  if (pairs.length > 3) pairs.pop();
}
