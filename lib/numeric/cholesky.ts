/**
 * Cholesky factors of small symmetric positive definite matrices, row-major n x n: A = L L' (Golub & Van Loan, section 4.2).
 */

/** Lower factor L, or null when the matrix is not positive definite to working accuracy (NaN included). */
export function choleskyOrNull(matrix: Float64Array, n: number): Float64Array | null {
  const lower = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = matrix[i * n + j];
      for (let k = 0; k < j; k++) sum -= lower[i * n + k] * lower[j * n + k];
      if (i > j) lower[i * n + j] = sum / lower[j * n + j];
      else if (sum > 0 && sum < Number.POSITIVE_INFINITY) lower[i * n + i] = Math.sqrt(sum);
      else return null;
    }
  }
  return lower;
}

/** A^-1 from its lower factor. */
export function invertFromCholesky(lower: Float64Array, n: number): Float64Array {
  const inverse = new Float64Array(n * n);
  const column = new Float64Array(n);
  for (let c = 0; c < n; c++) {
    for (let i = 0; i < n; i++) {
      let sum = i === c ? 1 : 0;
      for (let k = 0; k < i; k++) sum -= lower[i * n + k] * column[k];
      column[i] = sum / lower[i * n + i];
    }
    for (let i = n - 1; i >= 0; i--) {
      let sum = column[i];
      for (let k = i + 1; k < n; k++) sum -= lower[k * n + i] * column[k];
      column[i] = sum / lower[i * n + i];
      inverse[i * n + c] = column[i];
    }
  }
  return inverse;
}

/** Sample covariance (divisor m - 1) of m >= 2 rows of length n, row-major. */
export function sampleCovariance(rows: readonly Float64Array[], n: number): Float64Array {
  const mean = new Float64Array(n);
  for (const row of rows) for (let j = 0; j < n; j++) mean[j] += row[j] / rows.length;
  const covariance = new Float64Array(n * n);
  for (const row of rows) {
    for (let i = 0; i < n; i++) {
      const distance = (row[i] - mean[i]) / (rows.length - 1);
      for (let j = 0; j <= i; j++) covariance[i * n + j] += distance * (row[j] - mean[j]);
    }
  }
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) covariance[j * n + i] = covariance[i * n + j];
  return covariance;
}
