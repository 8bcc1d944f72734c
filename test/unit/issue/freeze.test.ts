import { describe, expect, it } from 'vitest';
import { ISSUE_FORMAT_VERSION, issuedForecastSchema } from '@/lib/issue/format';
import { freezeForecast } from '@/lib/issue/freeze';
import { factsOfIssued } from '@/lib/issue/open';
import { readIssuedForecast } from '@/lib/issue/read';
import { sampleBacktest } from '../brief/sample-backtest';
import { sampleIdentifiability } from '../brief/sample-identifiability';
import { comparison, issuedOf, sample } from './issued-cases';

/** What storing as JSON does to a value. */
const store = (value: unknown): unknown => JSON.parse(JSON.stringify(value));

describe('freezeForecast', () => {
  it('keeps every number of the facts and the comparison', () => {
    const issued = issuedOf(true);
    expect(issued.formatVersion).toBe(ISSUE_FORMAT_VERSION);
    const { market, series, revision, report } = issued;
    expect({ market, series, revision, report }).toEqual(sample.facts);
    expect(issued.scenario).toEqual({ name: 'Their autumn campaign', pushes: comparison.pushes, comparison });
  });

  it('takes the analyses with it where there are any; a forecast without them reads as before', () => {
    const analyses = { backtest: sampleBacktest(), identifiability: sampleIdentifiability() };
    const facts = { ...sample.facts, ...analyses };
    const frozen = freezeForecast({
      facts,
      scenario: null,
      issuedAt: '2026-01-08T09:00:00Z',
      issuedBy: 'Ada',
    });
    const read = readIssuedForecast(store(frozen));
    if (!read.ok) throw new Error(read.code);
    expect(factsOfIssued(read.value)).toMatchObject(analyses);
    const without = readIssuedForecast(store(issuedOf(false)));
    if (!without.ok) throw new Error(without.code);
    const bare = factsOfIssued(without.value);
    expect([bare.backtest, bare.identifiability]).toEqual([undefined, undefined]);
  });

  it('keeps events and left-out months, so that an opened forecast shows them', () => {
    const marks = {
      events: [{ month: 24_300, note: 'price change', changesParameters: true }],
      leftOut: [{ month: 24_301, focal: 3, rival: null, reason: 'strike' }],
    };
    const facts = { ...sample.facts, ...marks };
    const read = readIssuedForecast(
      store(freezeForecast({ facts, scenario: null, issuedAt: '2026-01-08T09:00:00Z', issuedBy: 'Ada' })),
    );
    expect(read.ok && factsOfIssued(read.value)).toMatchObject(marks);
  });

  it('is untouched by what happens to the facts afterwards', () => {
    const facts = structuredClone(sample.facts);
    const issued = freezeForecast({
      facts,
      scenario: null,
      issuedAt: '2026-01-08T09:00:00Z',
      issuedBy: 'Ada',
    });
    facts.market.name = 'renamed';
    facts.series.focal[0] = -1;
    facts.report.outlook.odds.coexistence = 0;
    facts.report.cloud.length = 0;
    expect(issued).toEqual({ ...issuedOf(false), issuedAt: issued.issuedAt, issuedBy: 'Ada' });
  });

  it('refuses a date without time zone and facts that no fit produces', () => {
    const input = { facts: sample.facts, scenario: null, issuedAt: '2026-01-08T09:00:00Z', issuedBy: 'Ada' };
    expect(() => freezeForecast({ ...input, issuedAt: '8 January 2026' })).toThrow();
    expect(() => freezeForecast({ ...input, issuedAt: '2026-01-08T09:00:00' })).toThrow();
    const facts = structuredClone(sample.facts);
    facts.report.outlook.odds.coexistence = Number.NaN;
    expect(() => freezeForecast({ ...input, facts })).toThrow();
    const uneven = structuredClone(sample.facts);
    uneven.series.focal.pop();
    expect(() => freezeForecast({ ...input, facts: uneven })).toThrow();
  });
});

describe('readIssuedForecast', () => {
  it('reads back to the last digit what was stored', () => {
    for (const hasScenario of [true, false]) {
      const issued = issuedOf(hasScenario);
      expect(readIssuedForecast(store(issued))).toEqual({ ok: true, value: issued });
    }
  });

  it('keeps gaps in the series', () => {
    const issued = issuedOf(false);
    issued.series.rival[3] = null;
    const reading = readIssuedForecast(store(issued));
    expect(reading.ok && reading.value.series.rival[3]).toBeNull();
  });

  it('tells a later version by its code and number', () => {
    expect(readIssuedForecast({ ...issuedOf(false), formatVersion: 7 })).toEqual({
      ok: false,
      code: 'unknown-version',
      version: 7,
    });
  });

  it.each([
    null,
    undefined,
    'text',
    3,
    [],
    {},
    { formatVersion: 'one' },
    { formatVersion: 1 },
    { formatVersion: 0 },
  ])('calls %j unreadable', (json) =>
    expect(readIssuedForecast(json)).toEqual({ ok: false, code: 'unreadable' }),
  );

  it('calls a damaged forecast unreadable', () => {
    const issued = store(issuedOf(true)) as { report: { outlook: { odds: unknown } } };
    issued.report.outlook.odds = { coexistence: 2 };
    expect(readIssuedForecast(issued)).toEqual({ ok: false, code: 'unreadable' });
  });

  it('shows nothing that the format does not name', () => {
    const reading = readIssuedForecast({ ...issuedOf(false), workspaceId: 'secret' });
    expect(JSON.stringify(reading)).not.toContain('secret');
  });
});

describe('issuedForecastSchema', () => {
  it('takes negative counts for damage', () => {
    const issued = issuedOf(false);
    issued.series.focal[0] = -1;
    expect(issuedForecastSchema.safeParse(issued).success).toBe(false);
  });
});
