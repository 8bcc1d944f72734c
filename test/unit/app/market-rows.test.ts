/** The lines of the markets' list: outcome, age of the data, state, and what comes first. */
import { describe, expect, it } from 'vitest';
import { sortByAttention, wordData, wordOutcome, wordState } from '@/app/_components/markets/market-rows';
import type { MarketSummary } from '@/lib/services/list-markets';

type FitSummary = NonNullable<MarketSummary['fit']>;

const FIT: FitSummary = {
  id: 'f',
  state: 'done',
  odds: { coexistence: 0.95, exclusionByFocal: 0.01, exclusionByRival: 0.03, headStartDecides: 0.01 },
  decided: 'coexistence',
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
  it('puts failed, stale and cancelled markets first, then those on their way, then the others by name', () => {
    const markets = [
      market('fine b'),
      market('fine a'),
      market('running', { state: 'running' }),
      market('cancelled', { state: 'cancelled' }),
      market('stale', { isStale: true }),
      market('failed', { state: 'failed', failureCode: 'failed' }),
    ];
    const names = sortByAttention(markets).map(({ name }) => name);
    expect(names).toEqual(['failed', 'stale', 'cancelled', 'running', 'fine a', 'fine b']);
  });
});
