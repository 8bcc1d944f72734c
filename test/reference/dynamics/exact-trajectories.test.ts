/**
 * Trajectories computed with 20 digits (mpmath Taylor series; see `test/reference/data/README.md`), met by the adaptive integrator and, where
 * the times are whole months, by the monthly paths that the forecasts use.
 */
import { describe, expect, it } from 'vitest';
import { fillForcedTrajectory } from '@/lib/dynamics/forced-trajectory';
import { createForcing } from '@/lib/dynamics/forcing';
import { integrate } from '@/lib/dynamics/integrate';
import { fillGrowth } from '@/lib/dynamics/system';
import { findSystem, readReferenceFile } from './read-cases';

const file = readReferenceFile();
/** Local tolerance 1e-13; near a saddle (strogatz from 0.5, 0.61) errors grow some hundred times on the way. */
const ADAPTIVE_TOLERANCE = 1e-9;
/** The monthly paths hold 1e-7 in each step, summed over at most 60 and grown where paths part. */
const MONTHLY_TOLERANCE = 2e-5;

describe.each(file.trajectories)('$case from $N0', (trajectory) => {
  const system = findSystem(file, trajectory.case);

  it('is met by the adaptive integrator at every tabled time', () => {
    for (const [t, n1, n2] of trajectory.t_N1_N2) {
      const run = integrate((_, y, out) => fillGrowth(system, y, out), 0, trajectory.N0, t, {
        relativeTolerance: 1e-13,
        absoluteTolerance: 0,
      });
      expect(run.status).toBe('reached-end');
      expect(Math.abs(run.y[0] / n1 - 1)).toBeLessThan(ADAPTIVE_TOLERANCE);
      expect(Math.abs(run.y[1] / n2 - 1)).toBeLessThan(ADAPTIVE_TOLERANCE);
    }
  });

  it('is met by the dense output of one run at every tabled time', () => {
    const [end] = trajectory.t_N1_N2[trajectory.t_N1_N2.length - 1];
    const run = integrate((_, y, out) => fillGrowth(system, y, out), 0, trajectory.N0, end, {
      relativeTolerance: 1e-13,
      absoluteTolerance: 0,
      isDense: true,
    });
    const at = new Float64Array(2);
    for (const [t, n1, n2] of trajectory.t_N1_N2) {
      run.path!.evaluateAt(t, at);
      expect(Math.abs(at[0] / n1 - 1)).toBeLessThan(ADAPTIVE_TOLERANCE);
      expect(Math.abs(at[1] / n2 - 1)).toBeLessThan(ADAPTIVE_TOLERANCE);
    }
  });

  it('is met by the monthly path', () => {
    const months = Math.max(...trajectory.t_N1_N2.map(([t]) => t));
    const out = new Float64Array(2 * (months + 1));
    expect(fillForcedTrajectory(system, trajectory.N0, createForcing([]), months, out)).toBe('complete');
    for (const [t, n1, n2] of trajectory.t_N1_N2) {
      expect(Math.abs(out[2 * t] / n1 - 1)).toBeLessThan(MONTHLY_TOLERANCE);
      expect(Math.abs(out[2 * t + 1] / n2 - 1)).toBeLessThan(MONTHLY_TOLERANCE);
    }
  });
});
