/**
 * When a pulse of recruits flips a market that the head start decides, against an independent integration: scipy traces the separatrix and
 * solves for the pulse that ends on it (`solve_crossings.py` beside this file). Runs wherever a Python with scipy is found; elsewhere it is
 * skipped and says so.
 */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import type { Push } from '@/lib/dynamics/push';
import type { CompetitionSystem } from '@/lib/dynamics/system';
import type { DrawSet } from '@/lib/estimate/types';
import { tracePushedPath } from '@/lib/scenario/draw-paths';
import { prepareScenario } from '@/lib/scenario/prepare-scenario';

const PYTHONS = ['python3', '/usr/bin/python3', 'python'];
const SCRIPT = fileURLToPath(new URL('./solve_crossings.py', import.meta.url));
const MONTHS = 24;
/** The path is integrated at 1e-7 a step, scipy's curve is read off between 20,000 points. */
const NEAR = 1e-5;

interface Case {
  system: CompetitionSystem;
  start: [number, number];
  firm: 1 | 2;
  length: number;
}

const CASES: Case[] = [
  // equal growth rates: the separatrix is the ray n2/n1 = 0.8
  {
    system: { r1: 0.2, r2: 0.2, k1: 1000, k2: 800, alpha: 1.5, beta: 1.5 },
    start: [300, 200],
    firm: 2,
    length: 6,
  },
  {
    system: { r1: 0.2, r2: 0.11, k1: 1000, k2: 800, alpha: 1.3, beta: 1.8 },
    start: [300, 200],
    firm: 2,
    length: 6,
  },
  {
    system: { r1: 0.09, r2: 0.31, k1: 2e6, k2: 9e5, alpha: 1.2, beta: 1.4 },
    start: [4e5, 3e5],
    firm: 1,
    length: 4,
  },
  {
    system: { r1: 0.4, r2: 0.05, k1: 500, k2: 6000, alpha: 2.5, beta: 1.1 },
    start: [60, 900],
    firm: 1,
    length: 9,
  },
];

const pulse = ({ firm, length }: Case, size: number): Push => ({
  firm,
  kind: 'recruits',
  startMonth: 0,
  lengthMonths: length,
  size,
  rampMonths: 0,
  carryOverHalfLifeMonths: 0,
});

function drawsOf(cases: Case[]): DrawSet {
  const columns = ['r1', 'r2', 'k1', 'k2', 'alpha', 'beta', 'n1', 'n2', 'size1', 'size2', 'noise1', 'noise2'];
  const values = cases.flatMap(({ system: s, start }) => [
    ...[s.r1, s.r2, s.k1, s.k2, s.alpha, s.beta, ...start],
    ...[0.05, 0.05, 0, 0],
  ]);
  return { errorModel: 'process-noise', columns, count: cases.length, values };
}

const python = PYTHONS.find((name) => spawnSync(name, ['-c', 'import scipy']).status === 0);

interface Solved {
  pulse: number;
  side: 1 | 2;
}

function solve(cases: Case[]): Solved[] {
  const run = spawnSync(python!, [SCRIPT], { input: JSON.stringify(cases), encoding: 'utf8' });
  if (run.status !== 0) throw new Error(run.stderr);
  return JSON.parse(run.stdout);
}

describe.skipIf(!python)(
  `crossings against scipy${python ? '' : ' (skipped: no Python with scipy found)'}`,
  () => {
    const found = python ? solve(CASES) : [];

    it('has an answer from scipy for every market, won by the other firm without a pulse', () => {
      expect(found.map(({ side }) => side)).toEqual(CASES.map(({ firm }) => (firm === 1 ? 2 : 1)));
      for (const one of found) expect(one.pulse).toBeGreaterThan(0);
    });

    it.each(CASES.map((one, index) => ({ ...one, index })))(
      'flips at the very pulse that ends on the separatrix, market $index',
      (one) => {
        const at = found[one.index]!.pulse;
        const below = tracePushedPath(one.system, one.start, [pulse(one, at * (1 - NEAR))], MONTHS);
        const above = tracePushedPath(one.system, one.start, [pulse(one, at * (1 + NEAR))], MONTHS);
        expect([below.hasCrossed, above.hasCrossed]).toEqual([false, true]);
        const { effect, crossing } = prepareScenario(drawsOf([one]), {
          horizonMonths: MONTHS,
          seed: 1,
        }).compare([pulse(one, at * (1 + NEAR))]);
        expect(crossing).toEqual({ draws: 1, crossed: 1 });
        expect(effect).toMatchObject({ probabilityMoves: 1, reason: 'temporary-crosses' });
      },
    );

    it('counts the draws that cross and no others', () => {
      // the same pulse of the rival on starts of the first market, some of which it flips
      const [market] = CASES;
      const size = 1.02 * found[0]!.pulse;
      const starts = [0.9, 0.95, 1, 1.04, 1.08, 1.2].map((factor) => 300 * factor);
      const draws = starts.map((n1): Case => ({ ...market!, start: [n1, 200] }));
      const expected = solve(draws).filter((one) => size > one.pulse).length;
      const { crossing } = prepareScenario(drawsOf(draws), { horizonMonths: MONTHS, seed: 1 }).compare([
        pulse(market!, size),
      ]);
      expect(expected).toBeGreaterThan(0);
      expect(expected).toBeLessThan(draws.length);
      expect(crossing).toEqual({ draws: draws.length, crossed: expected });
    });
  },
);
