import { describe, expect, test } from 'vitest';
import { classifyOutcome } from '@/lib/dynamics/outcome';
import { toCsv } from '@/lib/series/export-series';
import { readTable } from '@/lib/series/parse-table';
import { canFit, readSeries } from '@/lib/series/read-series';
import { DEMO_MARKETS, readDemoCsv } from '@/seed/demo-markets';
import { simulateMarket } from '@/seed/simulate-market';

test('the four markets head for coexistence, exclusion, a head start that decides, and one that nobody could tell yet', () => {
  expect(DEMO_MARKETS.map(({ id, truth }) => [id, classifyOutcome(truth.system)])).toEqual([
    ['demo-ferry-passes', 'coexistence'],
    ['demo-cargo-bikes', 'exclusionBySecond'],
    ['demo-parcel-lockers', 'headStartDecides'],
    ['demo-night-buses', 'exclusionByFirst'],
  ]);
  const early = DEMO_MARKETS[3].truth.months;
  expect(early).toBeGreaterThanOrEqual(12);
  expect(early).toBeLessThanOrEqual(16);
});

test('no id is used twice', () => {
  const ids = DEMO_MARKETS.flatMap(({ id, revisionId, fitId }) => [id, revisionId, fitId]);
  expect(new Set(ids).size).toBe(ids.length);
});

describe.each(DEMO_MARKETS.map((market) => [market.id, market] as const))('%s', (_, market) => {
  const csv = readDemoCsv(market);

  test('the committed counts are those that the kept script simulates', () => {
    const { focalName, rivalName, truth } = market;
    expect(csv).toBe(toCsv({ series: simulateMarket(truth), focalName, rivalName }));
  });

  test('the file is read without a problem and with the right columns guessed', () => {
    const { month, focal, rival } = readTable(csv).guess;
    expect({ month, focal, rival }).toEqual({
      month: 'Month',
      focal: market.focalName,
      rival: market.rivalName,
    });
    const reading = readSeries(csv, { month: month!, focal: focal!, rival: rival! });
    expect(reading.problems).toEqual([]);
    expect(canFit(reading)).toBe(true);
  });
});
