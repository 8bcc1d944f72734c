import { describe, expect, it } from 'vitest';
import { type IntegrateOptions, integrate, type RightHandSide } from '@/lib/dynamics/integrate';

const logistic: RightHandSide = (_, y, out) => {
  out[0] = y[0] * (1 - y[0]);
};
const circle: RightHandSide = (_, y, out) => {
  out[0] = -y[1];
  out[1] = y[0];
};

/** y(t) of the logistic from 0.1. */
function exactLogistic(t: number): number {
  return 1 / (1 + 9 * Math.exp(-t));
}

/** Fixed steps: one call per step, with a tolerance so wide that nothing is rejected. */
function integrateFixed(rhs: RightHandSide, y0: number[], tEnd: number, steps: number): Float64Array {
  let y: ArrayLike<number> = y0;
  const h = tEnd / steps;
  for (let i = 0; i < steps; i++) {
    const run = integrate(rhs, i * h, y, (i + 1) * h, { relativeTolerance: 1e6, firstStep: h });
    expect(run.accepted).toBe(1);
    y = run.y;
  }
  return Float64Array.from(y);
}

describe('integrate', () => {
  it('has the observed order five when the step is halved', () => {
    const errorWith = (steps: number) => {
      const y = integrateFixed(circle, [1, 0], 4, steps);
      return Math.hypot(y[0] - Math.cos(4), y[1] - Math.sin(4));
    };
    for (const steps of [16, 32, 64]) {
      // Asymptotic only in the limit: 0.15 is the distance still left at 16 steps.
      expect(Math.abs(Math.log2(errorWith(steps) / errorWith(2 * steps)) - 5)).toBeLessThan(0.15);
    }
  });

  it('has a dense output of the observed order four or better between the steps', () => {
    const errorWith = (h: number) => {
      const run = integrate(circle, 0, [1, 0], h, { relativeTolerance: 1e6, firstStep: h, isDense: true });
      const at = new Float64Array(2);
      run.path!.evaluateAt(0.4 * h, at);
      return Math.hypot(at[0] - Math.cos(0.4 * h), at[1] - Math.sin(0.4 * h));
    };
    for (const h of [0.4, 0.2]) {
      // A local error of order h^5: halving h divides it by 32.
      expect(Math.log2(errorWith(h) / errorWith(h / 2))).toBeGreaterThan(4.7);
    }
  });

  it.each([1e-4, 1e-7, 1e-10])(
    'meets the exact logistic within a few times the tolerance %d',
    (tolerance) => {
      const options = { relativeTolerance: tolerance, absoluteTolerance: tolerance };
      for (const t of [0.5, 3, 12]) {
        const run = integrate(logistic, 0, [0.1], t, options);
        expect(run.status).toBe('reached-end');
        expect(run.t).toBe(t);
        // Errors of single steps add up along the path: 20 is generous for the few dozen steps taken here.
        expect(Math.abs(run.y[0] - exactLogistic(t))).toBeLessThan(20 * tolerance);
      }
    },
  );

  it('takes fewer steps with a wider tolerance', () => {
    const steps = [1e-4, 1e-7, 1e-10].map(
      (relativeTolerance) => integrate(circle, 0, [1, 0], 20, { relativeTolerance }).accepted,
    );
    expect(steps[0]).toBeLessThan(steps[1]);
    expect(steps[1]).toBeLessThan(steps[2]);
  });

  it('runs backwards to where it came from', () => {
    const there = integrate(logistic, 0, [0.1], 5, { relativeTolerance: 1e-12 });
    const back = integrate(logistic, 5, there.y, 0, { relativeTolerance: 1e-12 });
    expect(back.t).toBe(0);
    // Going back, an error grows with exp(5) = 148.
    expect(Math.abs(back.y[0] - 0.1)).toBeLessThan(1e-9);
  });

  it('gives the path between the steps, forwards and backwards, to the tolerance', () => {
    const at = new Float64Array(2);
    for (const tEnd of [7, -7]) {
      const run = integrate(circle, 0, [1, 0], tEnd, { relativeTolerance: 1e-10, isDense: true });
      for (let i = 0; i <= 50; i++) {
        const t = (tEnd * i) / 50;
        run.path!.evaluateAt(t, at);
        expect(Math.hypot(at[0] - Math.cos(t), at[1] - Math.sin(t))).toBeLessThan(1e-8);
      }
      run.path!.evaluateAt(2 * tEnd, at);
      expect(Array.from(at)).toEqual(Array.from(run.y));
    }
  });

  it('depends on time where the right-hand side does', () => {
    const run = integrate(
      (t, _, out) => {
        out[0] = 3 * t * t;
      },
      1,
      [1],
      2,
    );
    expect(run.y[0]).toBeCloseTo(8, 10);
  });

  it('stops where it is told to', () => {
    const run = integrate(logistic, 0, [0.1], 100, { shouldStop: (_, y) => y[0] > 0.5 });
    expect(run.status).toBe('stopped');
    expect(run.y[0]).toBeGreaterThan(0.5);
    expect(run.t).toBeLessThan(10);
  });

  it('counts its calls of the right-hand side', () => {
    let calls = 0;
    const run = integrate(
      (t, y, out) => {
        calls++;
        circle(t, y, out);
      },
      0,
      [1, 0],
      5,
    );
    expect(run.evaluations).toBe(calls);
  });

  it('returns too-many-steps with the point reached', () => {
    const run = integrate(circle, 0, [1, 0], 1000, { maxSteps: 20 });
    expect(run.status).toBe('too-many-steps');
    expect(run.t).toBeGreaterThan(0);
    expect(Math.hypot(run.y[0], run.y[1])).toBeCloseTo(1, 6);
  });

  it('returns step-too-small before a singularity', () => {
    const run = integrate(
      (_, y, out) => {
        out[0] = y[0] * y[0];
      },
      0,
      [1],
      2,
    );
    expect(run.status).toBe('step-too-small');
    expect(run.t).toBeCloseTo(1, 6);
  });

  it('returns not-finite when there is no value at the start', () => {
    const run = integrate(logistic, 0, [Number.NaN], 1);
    expect(run.status).toBe('not-finite');
    expect(run.t).toBe(0);
  });

  it('shrinks the step at a non-finite trial and goes on', () => {
    const run = integrate(
      (_, y, out) => {
        out[0] = y[0] < 0 ? Number.NaN : -y[0];
      },
      0,
      [1],
      3,
      { firstStep: 3, relativeTolerance: 1e-8 },
    );
    expect(run.status).toBe('reached-end');
    expect(run.y[0]).toBeCloseTo(Math.exp(-3), 7);
  });

  it('keeps a component that is exactly zero at zero without any absolute tolerance', () => {
    const run = integrate(
      (_, y, out) => {
        out[0] = y[0];
        out[1] = y[1];
      },
      0,
      [1, 0],
      1,
      { absoluteTolerance: 0 },
    );
    expect(run.status).toBe('reached-end');
    expect(run.y[1]).toBe(0);
  });

  it.each<[string, number, Partial<IntegrateOptions>]>([
    ['tEnd', Number.NaN, {}],
    ['relativeTolerance', 1, { relativeTolerance: 0 }],
    ['absoluteTolerance', 1, { absoluteTolerance: [1, 2] }],
  ])('throws on a wrong call, naming %s', (name, tEnd, options) => {
    expect(() => integrate(logistic, 0, [0.1], tEnd, options)).toThrow(name);
  });
});
