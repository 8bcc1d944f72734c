/**
 * Monthly paths against an independent integrator, scipy's DOP853 (`solve_trajectories.py` beside this file). Runs wherever a Python with
 * scipy is found; elsewhere it is skipped and says so.
 */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { fillForcedTrajectory } from '@/lib/dynamics/forced-trajectory';
import { createForcing } from '@/lib/dynamics/forcing';
import { integrate } from '@/lib/dynamics/integrate';
import type { Push } from '@/lib/dynamics/push';
import { type CompetitionSystem, fillGrowth, type State } from '@/lib/dynamics/system';

const PYTHONS = ['python3', '/usr/bin/python3', 'python'];
const SCRIPT = fileURLToPath(new URL('./solve_trajectories.py', import.meta.url));
const MONTHS = 48;
/** 1e-7 in each of 48 monthly steps, doubled for errors that grow on the way. */
const MONTHLY_TOLERANCE = 1e-5;
/** Both integrators at 1e-12. */
const ADAPTIVE_TOLERANCE = 1e-9;

interface Case {
  system: CompetitionSystem;
  start: State;
  pushes: Push[];
  months: number;
}

const SYSTEMS: [CompetitionSystem, State][] = [
  [{ r1: 0.25, r2: 0.2, k1: 1000, k2: 800, alpha: 0.56, beta: 1.125 }, [50, 20]],
  [{ r1: 0.12, r2: 0.4, k1: 2e6, k2: 5e5, alpha: 0.4, beta: 0.7 }, [9e5, 1000]],
  [{ r1: 0.3, r2: 0.15, k1: 1000, k2: 800, alpha: 1.28, beta: 1.5 }, [100, 300]],
  [{ r1: 0.45, r2: 0.05, k1: 40, k2: 9000, alpha: 2.4, beta: 0 }, [39, 12]],
];

const BASE: Push = {
  firm: 2,
  kind: 'growth-lift',
  startMonth: 2.5,
  lengthMonths: 9,
  size: 0.35,
  rampMonths: 1.25,
  carryOverHalfLifeMonths: 2,
};

function listCases(): Case[] {
  return SYSTEMS.flatMap(([system, start]) => {
    const pushSets: Push[][] = [
      [],
      [BASE],
      [{ ...BASE, firm: 1, kind: 'pull', rampMonths: 0, carryOverHalfLifeMonths: 0 }],
      [{ ...BASE, kind: 'room', lengthMonths: null, startMonth: 0 }],
      [
        { ...BASE, kind: 'recruits', size: system.k2 / 50 },
        { ...BASE, firm: 1, startMonth: 5, rampMonths: 20, lengthMonths: 7 },
      ],
    ];
    return pushSets.map((pushes) => ({ system, start, pushes, months: MONTHS }));
  });
}

const python = PYTHONS.find((name) => spawnSync(name, ['-c', 'import scipy']).status === 0);

describe.skipIf(!python)(
  `against scipy.integrate${python ? '' : ' (skipped: no Python with scipy found)'}`,
  () => {
    const cases = listCases();
    const answer = python
      ? spawnSync(python, [SCRIPT], { input: JSON.stringify(cases), encoding: 'utf8' })
      : null;
    const paths: number[][][] = answer?.status === 0 ? JSON.parse(answer.stdout) : [];

    it('has an answer from scipy for every case', () => {
      expect(answer?.stderr).toBe('');
      expect(paths).toHaveLength(cases.length);
      for (const path of paths) expect(path).toHaveLength(MONTHS + 1);
    });

    it.each(cases.map((one, index) => ({ ...one, index })))('monthly path, case $index', (one) => {
      const out = new Float64Array(2 * (MONTHS + 1));
      const forcing = createForcing(one.pushes);
      expect(fillForcedTrajectory(one.system, one.start, forcing, MONTHS, out)).toBe('complete');
      paths[one.index].flat().forEach((users, i) => {
        expect(Math.abs(out[i] / users - 1)).toBeLessThan(MONTHLY_TOLERANCE);
      });
    });

    it('adaptive integrator, cases without pushes', () => {
      const free = cases.map((one, index) => ({ ...one, index })).filter((one) => one.pushes.length === 0);
      expect(free).toHaveLength(SYSTEMS.length);
      for (const { system, start, index } of free) {
        const run = integrate((_, y, growth) => fillGrowth(system, y, growth), 0, start, MONTHS, {
          relativeTolerance: 1e-12,
          absoluteTolerance: 0,
        });
        paths[index][MONTHS].forEach((users, i) => {
          expect(Math.abs(run.y[i] / users - 1)).toBeLessThan(ADAPTIVE_TOLERANCE);
        });
      }
    });
  },
);
