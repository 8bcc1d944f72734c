import { describe, expect, it } from 'vitest';
import { createTrajectory } from '@/lib/dynamics/trajectory';
import { computeSensitivity } from '@/lib/forecast/identifiability/sensitivity';
import { CENTRE, drawSetAround } from './draw-sets';

const HORIZON = 12;

function shareWith(change: Partial<typeof CENTRE>): number {
  const path = createTrajectory({ months: HORIZON + 1, entry1: 0, entry2: 0 });
  path.run(Object.values({ ...CENTRE, ...change }).map(Math.log));
  return 1 / (1 + Math.exp(path.logLevel2[HORIZON] - path.logLevel1[HORIZON]));
}

describe('sensitivity', () => {
  it('has the elasticities that differences of the path give', () => {
    const { rows } = computeSensitivity(drawSetAround({ r1: 1e-6 }, 50), HORIZON)!;
    // short enough for the curvature, long enough for the jumps where the integrator changes its number of steps
    const step = 3e-3;
    for (const { id, elasticity } of rows) {
      const up = Math.log(shareWith({ [id]: CENTRE[id] * Math.exp(step) }));
      const down = Math.log(shareWith({ [id]: CENTRE[id] * Math.exp(-step) }));
      expect(elasticity).toBeCloseTo((up - down) / (2 * step), 3);
    }
  });

  it('finds the one parameter that everything hangs on, and that the others explain nothing', () => {
    const { rows, learnFirst, leading } = computeSensitivity(
      drawSetAround({ alpha: 0.3, r1: 1e-4 }, 2000),
      HORIZON,
    )!;
    expect(learnFirst).toEqual({ share: 'alpha', odds: 'alpha' });
    expect(['coexistence', 'exclusionByRival']).toContain(leading);
    for (const { id, shareExplained, oddsExplained } of rows) {
      if (id === 'alpha') {
        expect(shareExplained).toBeGreaterThan(0.95);
        expect(oddsExplained).toBeGreaterThan(0.9);
        // four standard errors of an explained part that is none
      } else expect(Math.max(shareExplained, oddsExplained)).toBeLessThan(0.03);
    }
  });

  it('turns the odds with the coefficient that decides them, in the right direction', () => {
    const { rows, leading } = computeSensitivity(drawSetAround({ alpha: 0.3 }, 2000), HORIZON)!;
    const alpha = rows.find(({ id }) => id === 'alpha')!;
    const sign = leading === 'coexistence' ? -1 : 1;
    expect(sign * alpha.oddsElasticity).toBeGreaterThan(0);
    expect(sign * (alpha.oddsAtHigh - alpha.oddsAtLow)).toBeCloseTo(1, 2);
    // more room taken, smaller share
    expect(alpha.shareAtHigh!).toBeLessThan(alpha.shareAtLow!);
    expect(alpha.elasticity).toBeLessThan(0);
  });

  it('leaves nothing to learn about settled odds', () => {
    const draws = drawSetAround({ k1: 0.1, beta: 0.05 }, 500);
    expect(computeSensitivity(draws, HORIZON)!.learnFirst.odds).toBeNull();
  });
});
