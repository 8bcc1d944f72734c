/** What the data cannot tell, in plain sentences: what, why, and what would help. */
import type { Unknown } from '../forecast/report';
import { nameParameter } from './parameters';
import { capitalise, possessive, sentence } from './text';
import type { UnknownLine } from './types';
import { type FirmRole, otherFirm, type Words } from './words';

export function writeUnknowns(words: Words): UnknownLine[] {
  const lines = words.facts.report.unknowns.map((unknown) => ({
    code: unknown.code,
    sentence: sentence(describeUnknown(words, unknown)),
  }));
  if (lines.length > 0) return lines;
  const none = 'Nothing stands out: the history shows enough growth, bending and contest to learn from.';
  return [{ code: 'none', sentence: sentence(none) }];
}

function describeUnknown(words: Words, unknown: Unknown): string {
  const firm: FirmRole | null = unknown.firm === null ? null : unknown.firm === 1 ? 'focal' : 'rival';
  const name = firm ? words.name(firm) : 'One firm';
  const months = words.facts.report.months;
  switch (unknown.code) {
    case 'saturation-unseen':
      return describeUnseen(words, firm, name);
    case 'competition-unidentified':
      return describeCompetition(words, unknown, firm);
    case 'short-series':
      return `${months} months are few for this question. Every further month narrows the odds.`;
    case 'share-only':
      return 'The two counts add up to nearly the same total every month, like shares. Shares alone do not tell growth from crowding; true counts would.';
    case 'prior-conflict':
      return describeConflict(words, unknown, firm);
    case 'persistent-errors':
      return `Good and bad months of ${firm ? name : 'both firms'} come in runs, so ${months} months tell less than they seem to. The bands are wider for it.`;
    case 'flat-incumbent':
      return `${name} only falls in these months, so how far it would grow alone cannot be told. Earlier months would help.`;
    case 'late-launch':
      return describeLateLaunch(words, firm);
    case 'not-converged':
      return 'The sampler had not settled when it reached its limit, so every number here is rough. Run the fit again, or with more months.';
  }
}

function describeUnseen(words: Words, firm: FirmRole | null, name: string): string {
  const stated = firm && words.facts.report.beliefs?.addressable?.[firm];
  return stated
    ? `The counts add little to what was stated of ${possessive(name)} addressable market, so its saturation level is mostly that. They show it once growth slows.`
    : `${possessive(name)} growth has not bent yet, so its saturation level is a guess. It shows once growth slows.`;
}

function describeCompetition(words: Words, unknown: Unknown, firm: FirmRole | null): string {
  const isCoefficient = unknown.parameter === 'alpha' || unknown.parameter === 'beta';
  const what = isCoefficient
    ? nameParameter(words, unknown.parameter!)
    : firm
      ? `the room that ${words.name(otherFirm(firm))} takes from ${words.name(firm)}`
      : 'how much room the firms take from each other';
  return `${capitalise(what)} is hardly told by the data: the answer is mostly what was assumed before. It shows once one firm slows while the other grows.`;
}

function describeConflict(words: Words, unknown: Unknown, firm: FirmRole | null): string {
  const what = unknown.parameter
    ? nameParameter(words, unknown.parameter)
    : `a parameter of ${firm ? words.name(firm) : 'this market'}`;
  return `The data pull ${what} far from what was assumed before. Check the counts, or the assumption.`;
}

function describeLateLaunch(words: Words, firm: FirmRole | null): string {
  const { series, report } = words.facts;
  if (!firm) return 'One firm came late, so the months with both are few.';
  const launch = series[firm].findIndex((count) => count !== null && count > 0);
  if (launch <= 0) return `${words.name(firm)} came late, so the months with both are few.`;
  const joint = report.months - launch;
  return `${words.name(firm)} came in ${words.months.long(series.firstMonth + launch)}, so only ${joint} of ${report.months} months show both firms.`;
}
