import { describe, expect, it } from 'vitest';
import { analyseDecision, DECISION_MONTHS } from '@/lib/forecast/identifiability/decide-months';
import { drawSetAround } from './draw-sets';

function analyse(draws: ReturnType<typeof drawSetAround>, seed = 1) {
  const steps = analyseDecision(draws, seed);
  let step = steps.next();
  while (!step.done) step = steps.next();
  return step.value;
}

describe('months until the data decide', () => {
  it('are none when every draw has the same outcome: decided at once, and surely', () => {
    const settled = drawSetAround({ k1: 0.1, k2: 0.1 }, 300);
    // alpha is exactly 1 and counts as above; beta below: one outcome
    for (const row of analyse(settled).rows) expect([row.decided, row.sure]).toEqual([1, 1]);
  });

  it('grow fewer with time: an open market is decided more often the more months come', () => {
    const { rows, futures } = analyse(drawSetAround({ alpha: 0.2, beta: 0.05, k1: 0.05 }, 1000));
    expect(futures).toBe(300);
    expect(rows.map((row) => row.months)).toEqual([...DECISION_MONTHS]);
    expect(rows[3].decided).toBeGreaterThan(rows[0].decided);
    expect(rows[3].sure).toBeGreaterThan(rows[0].sure);
    expect(rows[0].sure).toBeLessThan(0.5);
    for (const row of rows) expect(row.sure).toBeLessThanOrEqual(row.decided);
    expect(rows[3].effectiveDraws).toBeLessThan(rows[0].effectiveDraws);
  });

  it('are the same numbers from the same seed', () => {
    const draws = drawSetAround({ alpha: 0.3, k1: 0.1 }, 300);
    expect(analyse(draws, 4)).toEqual(analyse(draws, 4));
    expect(analyse(draws, 5)).not.toEqual(analyse(draws, 4));
  });
});
