/** What the page of a forecast link shows: the very brief that was issued, made from the frozen numbers alone. */
import { type BriefOptions, buildBrief } from '../brief/build-brief';
import type { BriefFacts } from '../brief/facts';
import { buildPushBrief } from '../brief/push-brief';
import { describePush } from '../brief/push-words';
import type { Brief, PushBrief } from '../brief/types';
import { createWords, DEFAULT_LOCALE } from '../brief/words';
import type { IssuedForecast } from './format';

export interface OpenedForecast {
  brief: Brief;
  scenario: { name: string; pushes: string[]; push: PushBrief } | null;
  issuedBy: string;
  /** ISO 8601, for a `time` element. */
  issuedAt: string;
  /** "Issued on 8 January 2026 by Ada Berg, from 42 months to December 2025." */
  stamp: string;
}

export function factsOfIssued({
  market,
  revision,
  series,
  events,
  leftOut,
  report,
  backtest,
  identifiability,
}: IssuedForecast): BriefFacts {
  return { market, revision, series, events, leftOut, report, backtest, identifiability };
}

export function openIssued(
  issued: IssuedForecast,
  { locale = DEFAULT_LOCALE }: Pick<BriefOptions, 'locale'> = {},
): OpenedForecast {
  const facts = factsOfIssued(issued);
  const words = createWords(facts, locale);
  const { scenario } = issued;
  const months = issued.series.focal.length;
  return {
    brief: buildBrief(facts, { locale, hasScenario: scenario !== null }),
    scenario: scenario && {
      name: scenario.name,
      pushes: scenario.pushes.map((push) => describePush(words, push)),
      push: buildPushBrief(scenario.comparison, facts, locale),
    },
    issuedBy: issued.issuedBy,
    issuedAt: issued.issuedAt,
    stamp: `Issued on ${spellDay(issued.issuedAt, locale)} by ${issued.issuedBy}, from ${months} months to ${words.months.long(words.lastMonth)}.`,
  };
}

/** The day in UTC, so that every reader sees the same. */
function spellDay(iso: string, locale: string): string {
  return new Intl.DateTimeFormat(locale, { dateStyle: 'long', timeZone: 'UTC' }).format(new Date(iso));
}
