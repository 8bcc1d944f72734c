import { describe, expect, it } from 'vitest';
import { climb, negativeHessian } from '@/lib/numeric/bfgs';

/** Minus Rosenbrock's function, top at (1, 1). */
function banana(point: Float64Array, gradient: Float64Array | null): number {
  const [x, y] = point;
  if (gradient) {
    gradient[0] = 2 * (1 - x) + 400 * x * (y - x * x);
    gradient[1] = -200 * (y - x * x);
  }
  return -((1 - x) ** 2) - 100 * (y - x * x) ** 2;
}

describe('the climb', () => {
  it('finds the top of a bent ridge', () => {
    const { point, value } = climb(banana, Float64Array.of(-1.2, 1), Float64Array.of(0.1, 0.1));
    // it stops when no gain above 1e-3 is promised
    expect(value).toBeGreaterThan(-2e-3);
    expect(Math.abs(point[0] - 1)).toBeLessThan(0.05);
  });

  it('steps back from where the function does not exist', () => {
    const half = (point: Float64Array, gradient: Float64Array | null) => {
      if (!(point[0] > 0)) return Number.NEGATIVE_INFINITY;
      if (gradient) gradient[0] = 1 / point[0] - 1;
      return Math.log(point[0]) - point[0];
    };
    const { point } = climb(half, Float64Array.of(20), Float64Array.of(10));
    expect(Math.abs(point[0] - 1)).toBeLessThan(0.05);
  });

  it('stays at a start where nothing is better', () => {
    const { point, iterations } = climb(banana, Float64Array.of(1, 1), Float64Array.of(1, 1));
    expect(Array.from(point)).toEqual([1, 1]);
    expect(iterations).toBe(0);
  });
});

describe('minus the Hessian', () => {
  it('is that of the second derivatives', () => {
    const hessian = negativeHessian(banana, Float64Array.of(1, 1), Float64Array.of(0.01, 0.01));
    // 802, -400, -400, 200 at the top; central differences over 0.001 err by the fourth derivative
    expect(Math.abs(hessian[0] / 802 - 1)).toBeLessThan(1e-4);
    expect(Math.abs(hessian[1] / -400 - 1)).toBeLessThan(1e-4);
    expect(hessian[2]).toBe(hessian[1]);
    expect(Math.abs(hessian[3] / 200 - 1)).toBeLessThan(1e-4);
  });
});
