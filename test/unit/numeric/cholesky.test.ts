import { describe, expect, it } from 'vitest';
import { choleskyOrNull, invertFromCholesky, sampleCovariance } from '@/lib/numeric/cholesky';
import { createStream } from '@/lib/numeric/random';

describe('Cholesky factors', () => {
  it('multiply back to the matrix, and the inverse to the identity', () => {
    const n = 5;
    const stream = createStream(3, 0);
    const a = new Float64Array(n * n).map(() => stream.normal());
    const matrix = new Float64Array(n * n);
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++)
        for (let k = 0; k < n; k++) matrix[i * n + j] += a[i * n + k] * a[j * n + k] + (i === j ? 0.1 : 0);
    const lower = choleskyOrNull(matrix, n)!;
    const inverse = invertFromCholesky(lower, n);
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        let back = 0;
        let identity = 0;
        for (let k = 0; k < n; k++) {
          back += lower[i * n + k] * lower[j * n + k];
          identity += matrix[i * n + k] * inverse[k * n + j];
        }
        expect(Math.abs(back - matrix[i * n + j])).toBeLessThan(1e-12);
        expect(Math.abs(identity - (i === j ? 1 : 0))).toBeLessThan(1e-10);
      }
    }
  });

  it('do not exist for a matrix that is not positive definite or not finite', () => {
    expect(choleskyOrNull(Float64Array.of(1, 2, 2, 1), 2)).toBeNull();
    expect(choleskyOrNull(Float64Array.of(1, 0, 0, Number.NaN), 2)).toBeNull();
    expect(choleskyOrNull(Float64Array.of(0, 0, 0, 0), 2)).toBeNull();
  });
});

describe('sample covariance', () => {
  it('is that of the textbook formula', () => {
    const rows = [Float64Array.of(1, 2), Float64Array.of(3, 1), Float64Array.of(5, 6)];
    // means 3 and 3; sums of squares 8, 14 and of products 2*(-1)... = (-2)(-1) + 0 + (2)(3) = 8, divided by 2
    expect(Array.from(sampleCovariance(rows, 2))).toEqual([4, 4, 4, 7]);
  });
});
