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

/** Markets that ask for something come first, then by name. */
export function sortByAttention(markets: MarketSummary[]): MarketSummary[] {
  return [...markets].sort((a, b) => attentionOf(a) - attentionOf(b) || a.name.localeCompare(b.name, LOCALE));
}

function attentionOf({ fit }: MarketSummary): number {
  if (fit?.state === 'failed') return 0;
  if (fit?.isStale) return 1;
  if (!fit || fit.state === 'cancelled') return 2;
  return fit.state === 'done' ? 4 : 3;
}
