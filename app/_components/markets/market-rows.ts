/** A market of the list in words: its outcome, the age of its data, how its fit is doing, and what needs attention first. */
import { LOCALE } from '@/app/_lib/locale';
import { createMonthFormat } from '@/lib/brief/month-words';
import { createNumberFormat } from '@/lib/brief/number-format';
import { labelOutcome, rankOutcomes, toneOfOutcome } from '@/lib/brief/outcomes';
import { wordProbability } from '@/lib/brief/probability-words';
import { capitalise } from '@/lib/brief/text';
import type { Tone } from '@/lib/brief/types';
import { OUTCOMES, type Outcome } from '@/lib/forecast/outcomes';
import type { Odds } from '@/lib/forecast/report';
import type { MarketSummary } from '@/lib/services/list-markets';

export interface StripPart {
  outcome: Outcome;
  tone: Tone;
  width: number;
}

const numbers = createNumberFormat(LOCALE);
const months = createMonthFormat(LOCALE);

/** "Both stay: likely, 88 %", or that the data do not decide; null without an outlook. */
export function wordOutcome(market: MarketSummary): string | null {
  const odds = market.fit?.odds;
  if (!odds) return null;
  const label = (outcome: Outcome) => labelOutcome({ name: (firm) => nameOf(market, firm) }, outcome);
  const best = market.fit?.decided;
  if (best)
    return `${capitalise(label(best))}: ${wordProbability(odds[best])}, ${numbers.chance(odds[best])}`;
  const [first, second] = rankOutcomes(odds) as [Outcome, Outcome];
  const chances = [first, second].map((outcome) => `${label(outcome)} ${numbers.chance(odds[outcome])}`);
  return `The data do not decide yet: ${chances.join(', ')}`;
}

function nameOf(market: MarketSummary, firm: 'focal' | 'rival'): string {
  return firm === 'focal' ? market.focalName : market.rivalName;
}

export function stripParts(odds: Odds): StripPart[] {
  return OUTCOMES.map((outcome) => ({ outcome, tone: toneOfOutcome(outcome), width: 100 * odds[outcome] }));
}

/** Half a point of share: less than this is no direction. */
const LEAST_MOVE = 0.005;

/** "Ostrel’s share: from 58 % down to 43 % (38 to 49 %) by Sep 2027"; null without an outlook. */
export function wordShare(market: MarketSummary): string | null {
  const share = market.fit?.share;
  if (!share) return null;
  const { first, last, lastMonth } = share;
  const band = `${numbers.chance(last.q50)} (${numbers.chanceInterval(last)})`;
  const move = last.q50 - first.q50;
  const isUnsure = first.q50 >= last.q05 && first.q50 <= last.q95;
  const by = `by ${months.short(lastMonth)}`;
  if (Math.abs(move) < LEAST_MOVE) return `${market.focalName}’s share: near ${band} ${by}`;
  const way = move > 0 ? 'up to' : 'down to';
  const told = `from ${numbers.chance(first.q50)} ${way} ${band} ${by}`;
  return `${market.focalName}’s share: ${isUnsure ? 'perhaps ' : ''}${told}`;
}

/** "42 months to Dec 2025, 3 months old". @param thisMonth month of the reader */
export function wordData({ lastMonth, months: count }: MarketSummary, thisMonth: number): string {
  if (lastMonth === null) return 'No counts yet';
  const age = thisMonth - lastMonth;
  const old = age > 1 ? `, ${age} months ago` : '';
  return `${count} ${count === 1 ? 'month' : 'months'} to ${months.short(lastMonth)}${old}`;
}

/** What stands beside the outcome when the fit is not simply done; null when it is. */
export function wordState({ fit }: MarketSummary): string | null {
  if (!fit) return 'Not fitted yet';
  switch (fit.state) {
    case 'queued':
      return 'Waiting to be fitted';
    case 'running':
      return 'Being fitted';
    case 'failed':
      return fit.failureCode === 'too-short' ? 'Too few months to fit' : 'The fit ended without a result';
    case 'cancelled':
      return 'The fit was cancelled';
    case 'done':
      return fit.isStale ? 'Out of date: fit again' : null;
  }
}

/** Counts older than this ask for new months, except in a demonstration. */
const OLD_AFTER_MONTHS = 2;

export function hasOldCounts({ lastMonth, isDemo }: MarketSummary, thisMonth: number): boolean {
  return !isDemo && lastMonth !== null && thisMonth - lastMonth > OLD_AFTER_MONTHS;
}

/** Markets that ask for something come first, then by name. */
export function sortByAttention(markets: MarketSummary[], thisMonth: number): MarketSummary[] {
  const place = (market: MarketSummary) => attentionOf(market, thisMonth);
  return [...markets].sort((a, b) => place(a) - place(b) || a.name.localeCompare(b.name, LOCALE));
}

function attentionOf(market: MarketSummary, thisMonth: number): number {
  const { fit } = market;
  if (fit?.state === 'failed') return 0;
  if (fit?.isStale) return 1;
  if (!fit || fit.state === 'cancelled') return 2;
  if (fit.state !== 'done') return 3;
  return hasOldCounts(market, thisMonth) ? 4 : 5;
}
