import { describe, expect, it } from 'vitest';
import type { BriefFacts } from '@/lib/brief/facts';
import { buildForecastFigure, spreadLabels } from '@/lib/brief/forecast-figure';
import { plainText } from '@/lib/brief/text';
import { createWords } from '@/lib/brief/words';
import { factsOf, spaced } from './brief-cases';

const figureOf = (facts: BriefFacts) => buildForecastFigure(createWords(facts));

describe('buildForecastFigure', () => {
  it('has one row a month, history then forecast, without a break', () => {
    const facts = factsOf('coexistence');
    const { users, share } = figureOf(facts);
    for (const view of [users, share]) {
      expect(view.rows).toHaveLength(42 + 36);
      view.rows.forEach((row, i) => {
        expect(row.month).toBe(facts.series.firstMonth + i);
        expect(row.isForecast).toBe(i >= 42);
      });
      expect(view.monthDomain).toEqual([view.rows[0]!.month, view.rows.at(-1)!.month]);
    }
  });

  it('shows the forecast of counts to come, median and both bands', () => {
    const facts = factsOf('coexistence');
    const { rival } = facts.report.outlook.observations;
    const point = figureOf(facts).users.rows[42 + 5]!.points.rival!;
    expect(point).toMatchObject({
      seen: null,
      mid: rival.q50[5],
      band50: [rival.q25[5], rival.q75[5]],
      band90: [rival.q05[5], rival.q95[5]],
    });
  });

  it('marks events and left-out counts of the months it shows, and makes room for them', () => {
    const facts = factsOf('coexistence');
    const { firstMonth } = facts.series;
    const top = figureOf(facts).users.domain[1];
    facts.events = [
      { month: firstMonth + 50, note: 'launch ahead', changesParameters: false },
      { month: firstMonth - 1, note: 'long ago', changesParameters: false },
    ];
    facts.leftOut = [{ month: firstMonth + 3, focal: 2 * top, rival: 0, reason: 'strike' }];
    const { users, share } = figureOf(facts);
    for (const view of [users, share]) {
      expect(view.events).toMatchObject([{ month: firstMonth + 50, letter: 'a' }]);
      expect(view.leftOut.text).toMatch(/^Left out of the fit: .*strike/);
    }
    expect(users.leftOut.counts).toEqual([
      { key: 'focal', month: firstMonth + 3, value: 2 * top },
      { key: 'rival', month: firstMonth + 3, value: 0 },
    ]);
    expect(share.leftOut.counts).toEqual([{ key: 'share', month: firstMonth + 3, value: 1 }]);
    expect(users.domain[1]).toBeGreaterThanOrEqual(2 * top);
  });

  it('leaves gaps open, in users and in share', () => {
    const facts = factsOf('coexistence');
    facts.series.rival[7] = null;
    const { users, share } = figureOf(facts);
    const empty = { seen: null, mid: null, band50: null, band90: null, text: '' };
    expect(users.rows[7]!.points.rival).toEqual(empty);
    expect(users.rows[7]!.points.focal!.seen).toBe(facts.series.focal[7]);
    expect(share.rows[7]!.points.share).toEqual(empty);
    expect(users.table.rows[7]!.slice(4)).toEqual(['', '', '']);
    expect(plainText(users.caption)).toContain('One month without a count of Marrowby is left open.');
  });

  it('starts line and bands from the last count, and from nothing where it is missing', () => {
    const facts = factsOf('coexistence');
    const last = facts.series.focal.at(-1)!;
    expect(figureOf(facts).users.rows[41]!.points.focal).toMatchObject({
      seen: last,
      mid: last,
      band90: [last, last],
    });
    facts.series.focal[41] = null;
    expect(figureOf(facts).users.rows[41]!.points.focal).toMatchObject({
      seen: null,
      mid: null,
      band90: null,
    });
  });

  it('has no share where nobody has users, and a whole one before the rival comes', () => {
    const facts = factsOf('coexistence');
    [facts.series.focal[0], facts.series.rival[0], facts.series.rival[1]] = [0, 0, 0];
    const { rows } = figureOf(facts).share;
    expect(rows[0]!.points.share!.seen).toBeNull();
    expect(spaced(rows[1]!.points.share!.text)).toBe('100 %');
  });

  it('holds everything between the axes, unless a band would flatten the rest: then it is cut and said', () => {
    const facts = factsOf('coexistence');
    const { users } = figureOf(facts);
    expect(users.isCut).toBe(false);
    for (const row of users.rows) {
      for (const point of Object.values(row.points))
        expect(point.band90?.[1] ?? 0).toBeLessThanOrEqual(users.domain[1]);
    }
    facts.report.outlook.observations.rival.q95 = facts.report.outlook.observations.rival.q95.map(() => 9e6);
    const cut = figureOf(facts).users;
    expect(cut.isCut).toBe(true);
    expect(cut.domain[1]).toBeLessThan(2e6);
    expect(plainText(cut.caption)).toContain('The light band leaves the figure and reaches 9,000,000.');
  });

  it('tells firms apart by dash, marker and hatching, not by colour alone', () => {
    const [focal, rival] = figureOf(factsOf('coexistence')).users.series;
    expect(focal).toMatchObject({ tone: 'focal', isDashed: false, marker: 'round', isHatched: false });
    expect(rival).toMatchObject({ tone: 'rival', isDashed: true, marker: 'square-open', isHatched: true });
  });

  it('says in the caption which counts are estimates and what the forecast says', () => {
    const facts = factsOf('coexistence');
    facts.market.measurementError = { focal: 0, rival: 0.1 };
    const caption = spaced(plainText(figureOf(facts).users.caption));
    expect(caption).toContain('Marrowby’s past is an estimate, ±10 %.');
    expect(caption).not.toContain('Quillfern’s past is an estimate');
    expect(caption).toMatch(/By December 2028: Quillfern near [\d,]+ \([\d,]+ to [\d,]+\)/);
  });
});

describe('spreadLabels', () => {
  const series = (values: number[]) =>
    values.map((value, i) => ({
      key: i === 0 ? ('focal' as const) : ('rival' as const),
      name: '',
      tone: 'focal' as const,
      isDashed: false,
      marker: 'round' as const,
      isHatched: false,
      end: { value, labelValue: value, text: '' },
    }));
  const labels = (values: number[]) =>
    spreadLabels(series(values), [0, 100]).map((one) => one.end.labelValue);

  it('leaves labels where they do not touch', () => {
    expect(labels([20, 80])).toEqual([20, 80]);
  });

  it('moves touching labels apart, keeps their order and stays on the axis', () => {
    for (const pair of [
      [50, 51],
      [51, 50],
      [0, 0],
      [100, 99.9],
      [-5, 2],
      [120, 110],
    ]) {
      const [a, b] = labels(pair) as [number, number];
      expect(Math.abs(a - b)).toBeGreaterThanOrEqual(7 - 1e-9);
      if (pair[0] !== pair[1]) expect(a > b).toBe(pair[0]! > pair[1]!);
      for (const value of [a, b]) {
        expect(value).toBeGreaterThanOrEqual(-1e-9);
        expect(value).toBeLessThanOrEqual(100);
      }
    }
  });
});
