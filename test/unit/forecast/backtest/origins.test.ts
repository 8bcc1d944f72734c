import { describe, expect, it } from 'vitest';
import { cutSeries, planOrigins } from '@/lib/forecast/backtest/origins';
import { straightMarket } from './backtest-cases';

const plan = (months: number) => planOrigins(straightMarket(months));

describe('the origins of a backtest', () => {
  it.each([
    [15, [1], 3],
    [20, [1, 3], 6],
    [24, [1, 3, 6], 7],
    [29, [1, 3, 6, 12], 6],
    [60, [1, 3, 6, 12], 37],
  ])('of %i months allow the horizons %j from %i past months', (months, horizons, possible) => {
    expect(plan(months)).toMatchObject({ ok: true, horizons, possible });
  });

  it('are refused below three, with their number', () => {
    expect(plan(14)).toEqual({ ok: false, code: 'too-few-origins', possible: 2 });
    expect(plan(5)).toEqual({ ok: false, code: 'too-few-origins', possible: 0 });
  });

  it('never hide the month that is checked, never train on fewer than twelve months, and are at most twelve', () => {
    for (let months = 15; months <= 120; months += 3) {
      const made = plan(months);
      if (!made.ok) throw new Error(made.code);
      const { trainings, horizons } = made;
      expect(trainings[0]).toBeGreaterThanOrEqual(12);
      expect(trainings.at(-1)! + horizons.at(-1)!).toBe(months);
      expect(trainings.length).toBeLessThanOrEqual(12);
      expect(trainings.length).toBeGreaterThanOrEqual(3);
      expect(trainings.every((training, i) => i === 0 || training > trainings[i - 1])).toBe(true);
    }
  });

  it('wait for two years of history where six origins are left', () => {
    expect(plan(60)).toMatchObject({ trainings: expect.arrayContaining([24, 48]) });
    expect(plan(41)).toMatchObject({ trainings: [24, 25, 26, 27, 28, 29] });
    expect(plan(35)).toMatchObject({ trainings: [18, 19, 20, 21, 22, 23] });
  });

  it('of a market with a late second firm wait until both firms can be fitted', () => {
    const series = straightMarket(40);
    const late = { ...series, rival: series.rival.map((count, t) => (t < 20 ? 0 : count)) };
    const made = planOrigins(late);
    if (!made.ok) throw new Error(made.code);
    expect(made.trainings[0]).toBeGreaterThan(20);
    expect(cutSeries(late, 22).rival).toHaveLength(22);
  });
});
