/** The lines of the markets' list: outcome, age of the data, state, and what comes first. */
import { describe, expect, it } from 'vitest';
import {
  sortByAttention,
  wordData,
  wordOutcome,
  wordShare,
  wordState,
} from '@/app/_components/markets/market-rows';
import type { MarketSummary } from '@/lib/services/list-markets';

type FitSummary = NonNullable<MarketSummary['fit']>;

const FIT: FitSummary = {
  id: 'f',
  state: 'done',
  odds: { coexistence: 0.95, exclusionByFocal: 0.01, exclusionByRival: 0.03, headStartDecides: 0.01 },
  decided: 'coexistence',
  share: {
    first: { q05: 0.57, q50: 0.58, q95: 0.59 },
    last: { q05: 0.38, q50: 0.43, q95: 0.49 },
    lastMonth: 2027 * 12 + 8,
  },
  progress: null,
  isStale: false,
  failureCode: null,
};

/** December 2025. */
const LAST_MONTH = 2025 * 12 + 11;

function market(name: string, fit: Partial<FitSummary> | null = {}): MarketSummary {
  const counted = { lastMonth: LAST_MONTH, months: 42, isDemo: false };
  return {
    id: name,
    name,
    unit: 'users',
    focalName: 'Quillfern',
    rivalName: 'Marrowby',
    ...counted,
    fit: fit && { ...FIT, ...fit },
  };
}

const plain = (text: string | null) => text?.replace(/\u00a0/g, ' ');

describe('wordOutcome', () => {
  it('names the decided outcome with its odds in words and in percent', () => {
    expect(plain(wordOutcome(market('a')))).toBe('Both stay: very likely, 95 %');
  });

  it('names the winner of an exclusion', () => {
    const odds = { coexistence: 0.1, exclusionByFocal: 0.1, exclusionByRival: 0.75, headStartDecides: 0.05 };
    expect(plain(wordOutcome(market('a', { odds, decided: 'exclusionByRival' })))).toBe(
      'Marrowby alone: likely, 75 %',
    );
  });

  it('says that the data do not decide, with the two best odds', () => {
    const odds = {
      coexistence: 0.46,
      exclusionByFocal: 0.38,
      exclusionByRival: 0.02,
      headStartDecides: 0.14,
    };
    expect(plain(wordOutcome(market('a', { odds, decided: null })))).toBe(
      'The data do not decide yet: both stay 46 %, Quillfern alone 38 %',
    );
  });

  it('says nothing without an outlook', () => {
    expect(wordOutcome(market('a', { odds: null, decided: null }))).toBeNull();
    expect(wordOutcome(market('a', null))).toBeNull();
  });
});

describe('wordShare', () => {
  const share = (first: number, last: [number, number, number]) => ({
    first: { q05: first, q50: first, q95: first },
    last: { q05: last[0], q50: last[1], q95: last[2] },
    lastMonth: LAST_MONTH,
  });

  it('tells where the share of the focal firm comes from and goes, with its band and month', () => {
    expect(plain(wordShare(market('a')))).toBe(
      'Quillfern’s share: from 58 % down to 43 % (38 to 49 %) by Sep 2027',
    );
  });

  it('is careful when the band holds the share of now', () => {
    expect(plain(wordShare(market('a', { share: share(0.5, [0.4, 0.55, 0.7]) })))).toBe(
      'Quillfern’s share: perhaps from 50 % up to 55 % (40 to 70 %) by Dec 2025',
    );
  });

  it('names no direction when the share hardly moves, and nothing without an outlook', () => {
    expect(plain(wordShare(market('a', { share: share(0.5, [0.45, 0.501, 0.55]) })))).toBe(
      'Quillfern’s share: near 50 % (45 to 55 %) by Dec 2025',
    );
    expect(wordShare(market('a', { share: null }))).toBeNull();
  });
});

describe('wordData', () => {
  it('tells the age only when it is more than a month', () => {
    expect(wordData(market('a'), LAST_MONTH + 1)).toBe('42 months to Dec 2025');
    expect(wordData(market('a'), LAST_MONTH + 3)).toBe('42 months to Dec 2025, 3 months ago');
  });
});

describe('wordState', () => {
  it.each([
    [null, 'Not fitted yet'],
    [{ state: 'queued' }, 'Waiting to be fitted'],
    [{ state: 'running' }, 'Being fitted'],
    [{ state: 'failed', failureCode: 'too-short' }, 'Too few months to fit'],
    [{ state: 'failed', failureCode: 'failed' }, 'The fit ended without a result'],
    [{ state: 'cancelled' }, 'The fit was cancelled'],
    [{ isStale: true }, 'Out of date: fit again'],
    [{}, null],
  ] as const)('of %j is %s', (fit, words) => {
    expect(wordState(market('a', fit))).toBe(words);
  });
});

describe('sortByAttention', () => {
  it('puts failed, stale and cancelled markets first, then those on their way, then old counts, then the others by name', () => {
    const markets = [
      { ...market('old'), lastMonth: LAST_MONTH - 3 },
      { ...market('old demonstration'), lastMonth: LAST_MONTH - 30, isDemo: true },
      market('fine b'),
      market('fine a'),
      market('running', { state: 'running' }),
      market('cancelled', { state: 'cancelled' }),
      market('stale', { isStale: true }),
      market('failed', { state: 'failed', failureCode: 'failed' }),
    ];
    const names = sortByAttention(markets, LAST_MONTH + 1).map(({ name }) => name);
    expect(names).toEqual([
      'failed',
      'stale',
      'cancelled',
      'running',
      'old',
      'fine a',
      'fine b',
      'old demonstration',
    ]);
  });
});
