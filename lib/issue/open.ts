/** What the page of a forecast link shows: the very brief that was issued, made from the frozen numbers alone. */
import { type BriefOptions, buildBrief } from '../brief/build-brief';
import type { BriefFacts } from '../brief/facts';
import { writeMoney } from '../brief/money-words';
import { buildPushBrief } from '../brief/push-brief';
import { describePush } from '../brief/push-words';
import { buildSideBySide, type SideBySide } from '../brief/side-by-side';
import type { Brief, PushBrief, Sentence } from '../brief/types';
import { createWords, DEFAULT_LOCALE, type Words } from '../brief/words';
import type { Trial } from '../scenario/trial-draws';
import type { IssuedForecast, IssuedScenario } from './format';
import { type OpenedAnswers, openAnswers } from './open-answers';

export interface OpenedScenario {
  name: string;
  /** Each push in words. */
  pushes: string[];
  push: PushBrief;
  /** Empty where no money was counted. */
  money: Sentence[];
  answers: OpenedAnswers;
}

export interface OpenedForecast {
  brief: Brief;
  /** The first of `scenarios`. */
  scenario: OpenedScenario | null;
  scenarios: OpenedScenario[];
  /** Null with fewer than two scenarios. */
  sideBySide: SideBySide | null;
  /** What a reader may try pushes on; null: only what was frozen is shown. */
  trial: Trial | null;
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
  const frozen = listScenarios(issued);
  const scenarios = frozen.map((scenario) => openScenario(words, scenario));
  const months = issued.series.focal.length;
  return {
    brief: buildBrief(facts, { locale, hasScenario: scenarios.length > 0 }),
    scenario: scenarios[0] ?? null,
    scenarios,
    sideBySide: frozen.length > 1 ? buildSideBySide(frozen, facts, locale) : null,
    trial: issued.trial ?? null,
    issuedBy: issued.issuedBy,
    issuedAt: issued.issuedAt,
    stamp: `Issued on ${spellDay(issued.issuedAt, locale)} by ${issued.issuedBy}, from ${months} months to ${words.months.long(words.lastMonth)}.`,
  };
}

/** Whichever way they were stored. */
export function listScenarios({ scenario, scenarios }: IssuedForecast): IssuedScenario[] {
  return scenarios ?? (scenario ? [scenario] : []);
}

function openScenario(words: Words, { name, pushes, comparison, answers }: IssuedScenario): OpenedScenario {
  const currency = comparison.money?.assumed.currency;
  return {
    name,
    pushes: pushes.map((push) => describePush(words, push)),
    push: buildPushBrief(comparison, words.facts, words.locale),
    money: comparison.money ? writeMoney(words, comparison.money) : [],
    answers: openAnswers(words, answers ?? {}, currency),
  };
}

/** The day in UTC, so that every reader sees the same. */
function spellDay(iso: string, locale: string): string {
  return new Intl.DateTimeFormat(locale, { dateStyle: 'long', timeZone: 'UTC' }).format(new Date(iso));
}
