/**
 * The linear algebra of one Gauss-Newton step: a QR factorisation of the column-scaled Jacobian, then the singular values of R.
 *
 *   A = J D^-1 = Q R,   R = U diag(s) V',   c = U' Q' r
 *
 * J Jacobian (m x n, row-major), r residuals (m), D positive column scales (n), s singular values in falling order.
 * The least-squares step in scaled variables p = D delta is p = -V diag(1/s) c. Q is never formed: r rides along as one more column.
 * Source: Golub & Van Loan, Matrix Computations, sections 5.2 and 8.6; scaling after More (1978).
 */
import { Matrix, QrDecomposition, SingularValueDecomposition } from 'ml-matrix';

export interface Factorisation {
  /** D, length n: scale of each column. */
  scale: Float64Array;
  /** s, length n, falling. */
  singularValues: Float64Array;
  /** V, n x n row-major. */
  rightVectors: Float64Array;
  /** c = U' Q' r, length n: the residuals as the tangent plane sees them. */
  projected: Float64Array;
  /** Number of singular values above rounding. */
  rank: number;
}

/** Euclidean norm of each column of a row-major m x n matrix, safe against overflow of the squares. */
export function columnNorms(matrix: Float64Array, rows: number, columns: number): Float64Array {
  const norms = new Float64Array(columns);
  for (let j = 0; j < columns; j++) {
    let largest = 0;
    for (let i = 0; i < rows; i++) largest = Math.max(largest, Math.abs(matrix[i * columns + j]));
    if (!(largest > 0)) continue;
    let sum = 0;
    for (let i = 0; i < rows; i++) {
      const part = matrix[i * columns + j] / largest;
      sum += part * part;
    }
    norms[j] = largest * Math.sqrt(sum);
  }
  return norms;
}

/** Half the sum of squares. */
export function halfSumOfSquares(values: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += values[i] * values[i];
  return sum / 2;
}

/** Factorises the scaled Jacobian; `scale` must be positive and finite, the other inputs finite. */
export function factorise(
  jacobian: Float64Array,
  residuals: Float64Array,
  scale: Float64Array,
): Factorisation {
  const n = scale.length;
  const m = residuals.length;
  // Rows of zeros below leave R and c as they are and let the residual column fit when m <= n.
  const augmented = Matrix.zeros(Math.max(m, n + 1), n + 1);
  for (let i = 0; i < m; i++) {
    for (let j = 0; j < n; j++) augmented.set(i, j, jacobian[i * n + j] / scale[j]);
    augmented.set(i, n, residuals[i]);
  }
  const triangle = new QrDecomposition(augmented).upperTriangularMatrix;
  const svd = new SingularValueDecomposition(triangle.subMatrix(0, n - 1, 0, n - 1));
  return {
    scale,
    singularValues: Float64Array.from(svd.diagonal),
    rightVectors: Float64Array.from(svd.rightSingularVectors.to1DArray()),
    projected: rotate(svd.leftSingularVectors, triangle, n),
    rank: countAboveRounding(svd.diagonal, Math.max(m, n)),
  };
}

/** U' times the top of the residual column. */
function rotate(left: Matrix, triangle: Matrix, n: number): Float64Array {
  const projected = new Float64Array(n);
  for (let k = 0; k < n; k++) {
    for (let i = 0; i < n; i++) projected[k] += left.get(i, k) * triangle.get(i, n);
  }
  return projected;
}

function countAboveRounding(singularValues: number[], dimension: number): number {
  const floor = singularValues[0] * dimension * Number.EPSILON;
  return singularValues.filter((value) => value > floor).length;
}

/** Condition number of the column-scaled Jacobian; Infinity when the rank is not full. */
export function conditionNumber(factor: Factorisation): number {
  const n = factor.singularValues.length;
  return factor.rank < n ? Number.POSITIVE_INFINITY : factor.singularValues[0] / factor.singularValues[n - 1];
}

/** (J'J)^-1 as an n x n row-major array; the rank must be full. */
export function inverseNormalMatrix(factor: Factorisation): Float64Array {
  const n = factor.scale.length;
  const inverse = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = 0;
      for (let k = 0; k < n; k++) {
        const vi = factor.rightVectors[i * n + k] / factor.singularValues[k];
        const vj = factor.rightVectors[j * n + k] / factor.singularValues[k];
        sum += vi * vj;
      }
      inverse[i * n + j] = sum / (factor.scale[i] * factor.scale[j]);
      inverse[j * n + i] = inverse[i * n + j];
    }
  }
  return inverse;
}
