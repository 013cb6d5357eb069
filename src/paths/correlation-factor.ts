import { EigenvalueDecomposition, Matrix } from 'ml-matrix';

/**
 * Factors a correlation matrix R = F Fᵀ by blocks, one block for each family: block Cholesky with the *symmetric*
 * square root of each diagonal block.
 *
 * The symmetric root treats the members of an exchangeable family alike: permuting the independent innovations permutes
 * the correlated ones. A sorted family can then carry its innovations along in sorted order.
 *
 * @param blockSizes members of each family, in order
 * @shape result: drivers × innovations, zero above the block diagonal
 * @fails needs R positive semidefinite, which the scenario's check has made sure of
 */
export function factorCorrelation(
  correlation: readonly (readonly number[])[],
  blockSizes: readonly number[],
): number[][] {
  const size = correlation.length;
  const remaining = correlation.map((row) => [...row]);
  const factor = Array.from({ length: size }, () => new Array<number>(size).fill(0));
  let start = 0;
  for (const blockSize of blockSizes) {
    const end = start + blockSize;
    const { root, inverse } = symmetricRoot(remaining.slice(start, end).map((row) => row.slice(start, end)));
    for (let i = 0; i < blockSize; i++)
      for (let k = 0; k < blockSize; k++) factor[start + i]![start + k] = root[i]![k]!;
    const linked: number[] = [];
    for (let row = end; row < size; row++) {
      if (remaining[row]!.slice(start, end).some((value) => value !== 0)) linked.push(row);
    }
    for (const row of linked) {
      for (let k = 0; k < blockSize; k++) {
        let sum = 0;
        for (let i = 0; i < blockSize; i++) sum += remaining[row]![start + i]! * inverse[i]![k]!;
        factor[row]![start + k] = sum;
      }
    }
    for (const row of linked) {
      for (const column of linked) {
        for (let k = start; k < end; k++)
          remaining[row]![column] = remaining[row]![column]! - factor[row]![k]! * factor[column]![k]!;
      }
    }
    start = end;
  }
  return factor;
}

const smallestEigenvalue = 1e-12;

/** Symmetric square root of a positive semidefinite matrix and the pseudo-inverse of that root. */
function symmetricRoot(matrix: number[][]): { root: number[][]; inverse: number[][] } {
  const size = matrix.length;
  const diagonal = matrix[0]![0]!;
  const off = size > 1 ? matrix[0]![1]! : 0;
  const isExchangeable = matrix.every((row, i) => row.every((value, k) => value === (i === k ? diagonal : off)));
  if (isExchangeable) {
    const common = Math.sqrt(Math.max(0, diagonal + (size - 1) * off));
    const single = Math.sqrt(Math.max(0, diagonal - off));
    return {
      root: exchangeable(size, common, single),
      inverse: exchangeable(size, pseudoInverse(common), pseudoInverse(single)),
    };
  }
  const { realEigenvalues, eigenvectorMatrix: vectors } = new EigenvalueDecomposition(new Matrix(matrix), {
    assumeSymmetric: true,
  });
  const roots = realEigenvalues.map((value) => Math.sqrt(Math.max(0, value)));
  const compose = (values: number[]) => vectors.mmul(Matrix.diag(values)).mmul(vectors.transpose()).to2DArray();
  return { root: compose(roots), inverse: compose(roots.map(pseudoInverse)) };
}

/** The matrix with eigenvalue `common` on the vector of ones and `single` on all that is orthogonal to it. */
function exchangeable(size: number, common: number, single: number): number[][] {
  const off = (common - single) / size;
  return Array.from({ length: size }, (_, i) => Array.from({ length: size }, (_, k) => (i === k ? single + off : off)));
}

function pseudoInverse(root: number): number {
  return root * root > smallestEigenvalue ? 1 / root : 0;
}
