/** Captions of the figures, written from the results: what the figure shows in this market. */

import { decideOutcome } from '../forecast/odds';
import type { MapOutcome, MapSystem } from './map-system';
import { spellOdds } from './odds-strip';
import { subjectOutcome } from './outcomes';
import { capitalise, joinSentences, possessive, sentence } from './text';
import type { PhaseMap, Sentence } from './types';
import { spellShare } from './verdict-support';
import { type FirmRole, horizonMonthOf, intervalAt, type Words } from './words';

/** Which numbers of the users view leave the figure at its top. */
export interface CutBand {
  isCut: boolean;
  /** Largest upper end of a 90 % band. */
  top: number;
}

export function captionUsers(words: Words, cut: CutBand): Sentence {
  const parts = [
    sentence(`${capitalise(words.facts.market.unit)}. ${bandKey()}`),
    sentence(
      `By ${words.months.long(horizonMonthOf(words))}: ${atHorizon(words, 'focal')}, ${atHorizon(words, 'rival')}.`,
    ),
    ...gapSentences(words),
    ...errorSentences(words),
  ];
  if (cut.isCut)
    parts.push(sentence(`The light band leaves the figure and reaches ${words.numbers.users(cut.top)}.`));
  return joinSentences(parts);
}

export function captionShare(words: Words): Sentence {
  const { share } = words.facts.report.outlook.observations;
  const last = intervalAt(share, share.q50.length - 1);
  return joinSentences([
    sentence(`${possessive(words.focal)} part of both firms’ ${words.facts.market.unit}. ${bandKey()}`),
    sentence(`By ${words.months.long(horizonMonthOf(words))} it is ${spellShare(words, last)}.`),
    ...errorSentences(words),
  ]);
}

function bandKey(): string {
  return 'Marks: counted. Line: middle of the forecast; dark band: half of what may be counted; light band: nine in ten.';
}

function atHorizon(words: Words, firm: FirmRole): string {
  const bands = words.facts.report.outlook.observations[firm];
  const last = intervalAt(bands, bands.q50.length - 1);
  return `${words.name(firm)} near ${words.numbers.users(last.q50, last)} (${words.numbers.usersInterval(last)})`;
}

function gapSentences(words: Words): Sentence[] {
  const { focal, rival } = words.facts.series;
  return (
    [
      ['focal', focal],
      ['rival', rival],
    ] as const
  ).flatMap(([firm, counts]) => {
    const missing = counts.filter((count) => count === null).length;
    if (missing === 0) return [];
    return [
      sentence(
        `${missing === 1 ? 'One month' : `${missing} months`} without a count of ${words.name(firm)} ${missing === 1 ? 'is' : 'are'} left open.`,
      ),
    ];
  });
}

function errorSentences(words: Words): Sentence[] {
  const stated = words.facts.market.measurementError;
  if (!stated) return [];
  return (['focal', 'rival'] as const)
    .filter((firm) => stated[firm] > 0)
    .map((firm) =>
      sentence(
        `${possessive(words.name(firm))} past is an estimate, ±${words.numbers.percent(stated[firm])}.`,
      ),
    );
}

export function captionPhaseMap(
  words: Words,
  map: MapSystem,
  drawn: Pick<PhaseMap, 'cloud' | 'pathAhead'>,
  cloudSize: number,
): Sentence {
  const outside = cloudSize - drawn.cloud.length;
  const dots = `Small dots: where ${cloudSize} draws end${outside > 0 ? `, ${outside} of them outside the map` : ''}.`;
  const ahead = drawn.pathAhead.length > 1 ? '; dotted: the path ahead' : '';
  return joinSentences([
    sentence(`Beyond its line a firm shrinks, short of it it grows. ${linesSentence(words, map.outcome)}`),
    ...sourceSentence(words, map),
    sentence(`Solid: the path so far, to ${words.months.short(words.lastMonth)}${ahead}.`),
    sentence(`Filled mark: the market settles there; open rings: it leaves. ${dots}`),
  ]);
}

/** What the position of the two lines means; about the drawn system only. */
function linesSentence(words: Words, outcome: MapOutcome): string {
  switch (outcome) {
    case 'coexistence':
      return 'Here the lines cross so that the market is drawn to the crossing, with both firms in it.';
    case 'exclusionByFocal':
      return `Here ${possessive(words.focal)} line lies outside: it still grows where ${words.rival} already shrinks.`;
    case 'exclusionByRival':
      return `Here ${possessive(words.rival)} line lies outside: it still grows where ${words.focal} already shrinks.`;
    case 'headStartDecides':
      return `Here the crossing is a tipping point: below the tipping line ${words.focal} ends alone, above it ${words.rival}.`;
    case 'boundary':
      return 'Here the two lines meet on an axis: the border between two outcomes, on which nothing is decided.';
  }
}

/** Which system is drawn, and that the draws say otherwise where they do. */
function sourceSentence(words: Words, map: MapSystem): Sentence[] {
  const source = map.source === 'best-fit' ? 'the best single fit' : 'the medians of the draws';
  const decided = decideOutcome(words.facts.report.outlook.odds);
  if (map.outcome === decided)
    return map.source === 'medians' ? [sentence(`Lines and path: ${source}.`)] : [];
  if (decided === null) {
    return [sentence(`Lines and path: ${source} only; the draws are divided between outcomes.`)];
  }
  return [
    sentence(
      `Lines and path: ${source} only; most draws stand for ${subjectOutcome(words, decided)} instead.`,
    ),
  ];
}

export function captionOddsMap(words: Words): Sentence {
  const { odds } = words.facts.report.outlook;
  const decided = decideOutcome(odds);
  const spelt = spellOdds(words, odds);
  const key =
    `Each dot is one pair of strengths that fits the history; 100\u00a0% is all of the other’s room. ` +
    `Left of the upright line ${words.rival} leaves ${words.focal} some room; below the level line ${words.focal} leaves ${words.rival} some.`;
  const where = decided
    ? `The shaded quarter, ${subjectOutcome(words, decided)}, holds ${spelt[decided]} of the draws.`
    : 'No quarter holds two thirds of the draws.';
  return joinSentences([sentence(key), sentence(where)]);
}
