/** What one scenario does, ready to draw beside the brief: sentences, odds before and after, overlay rows, difference rows, a table. */
import { OUTCOMES } from '../forecast/outcomes';
import type { Bands } from '../forecast/report';
import type { ScenarioComparison } from '../scenario/comparison';
import { axisAroundZero, monthTicks } from './axis-ticks';
import type { BriefFacts } from './facts';
import { spellOdds } from './odds-strip';
import { labelOutcome, toneOfOutcome } from './outcomes';
import { writeEffect } from './push-effect';
import { alignOdds } from './push-odds';
import { namePushes } from './push-words';
import { plainText, possessive, sentence } from './text';
import type {
  DifferenceRow,
  DifferenceView,
  FigureTable,
  ForecastSeriesKey,
  PushBrief,
  PushOddsRow,
  PushRow,
  Sentence,
} from './types';
import { createWords, DEFAULT_LOCALE, intervalAt, type Words } from './words';

/** Least half-height of a difference figure, as part of the whole. */
const LEAST_REACH = 0.01;

export function buildPushBrief(
  sampled: ScenarioComparison,
  facts: BriefFacts,
  locale: string = DEFAULT_LOCALE,
): PushBrief {
  const words = createWords(facts, locale);
  const comparison = { ...sampled, odds: alignOdds(facts.report.outlook.odds, sampled.odds) };
  const sentences = writeEffect(words, comparison);
  return {
    sentences,
    plain: sentences.map(plainText).join(' '),
    odds: compareOdds(words, comparison),
    users: buildPushRows(words, comparison, ['focal', 'rival']),
    share: buildPushRows(words, comparison, ['share']),
    difference: {
      users: buildDifference(words, comparison, ['focal', 'rival']),
      share: buildDifference(words, comparison, ['share']),
    },
    checkpoints: tabulateCheckpoints(words, comparison),
    caption: captionDifference(words, comparison),
  };
}

function compareOdds(words: Words, { odds }: ScenarioComparison): PushOddsRow[] {
  const [before, after] = [spellOdds(words, odds.before), spellOdds(words, odds.after)];
  return OUTCOMES.map((outcome) => ({
    outcome,
    tone: toneOfOutcome(outcome),
    label: labelOutcome(words, outcome),
    before: before[outcome],
    after: after[outcome],
    beforeWidth: 100 * odds.before[outcome],
    afterWidth: 100 * odds.after[outcome],
  }));
}

/** From the last observed month on, where both paths stand on the count itself. */
function buildPushRows(words: Words, comparison: ScenarioComparison, keys: ForecastSeriesKey[]): PushRow[] {
  const rows = monthsAhead(comparison).map((h): PushRow => {
    const points: PushRow['points'] = {};
    for (const key of keys) {
      const pushed = intervalAt(comparison.pushed[key], h - 1);
      points[key] = {
        baseline: comparison.baseline[key].q50[h - 1]!,
        pushed: pushed.q50,
        band90: [pushed.q05, pushed.q95],
      };
    }
    return { ...labelMonth(words, h), points };
  });
  const start: PushRow = { ...labelMonth(words, 0), points: {} };
  for (const key of keys) {
    const seen = lastSeen(words, key);
    if (seen !== null) start.points[key] = { baseline: seen, pushed: seen, band90: [seen, seen] };
  }
  return [start, ...rows];
}

function lastSeen(words: Words, key: ForecastSeriesKey): number | null {
  const focal = words.facts.series.focal.at(-1) ?? null;
  const rival = words.facts.series.rival.at(-1) ?? null;
  if (key !== 'share') return key === 'focal' ? focal : rival;
  return focal === null || rival === null || !(focal + rival > 0) ? null : focal / (focal + rival);
}

function buildDifference(
  words: Words,
  comparison: ScenarioComparison,
  keys: ForecastSeriesKey[],
): DifferenceView {
  const spell = (key: ForecastSeriesKey, value: number, width?: { q05: number; q95: number }) =>
    key === 'share' ? words.numbers.points(value, width) : words.numbers.usersDifference(value, width);
  const rows = [0, ...monthsAhead(comparison)].map((h): DifferenceRow => {
    const points: DifferenceRow['points'] = {};
    for (const key of keys)
      points[key] = differencePoint(comparison.difference[key], h, (...args) => spell(key, ...args));
    return { ...labelMonth(words, h), points };
  });
  const ends = keys.flatMap((key) => [...comparison.difference[key].q05, ...comparison.difference[key].q95]);
  const least = leastReach(comparison, keys);
  const axis = axisAroundZero(Math.min(-least, ...ends), Math.max(least, ...ends), (value) =>
    spellTick(words, keys, value),
  );
  const monthDomain: [number, number] = [words.lastMonth, words.lastMonth + comparison.horizonMonths];
  return {
    series: keys.map((key) => ({
      key,
      name: key === 'share' ? `${possessive(words.focal)} share` : words.name(key),
      tone: key === 'rival' ? 'rival' : 'focal',
      isDashed: key === 'rival',
    })),
    rows,
    domain: axis.domain,
    ticks: axis.ticks,
    monthDomain,
    monthTicks: monthTicks(...monthDomain, words.months),
    table: tabulateDifference(words, keys, rows),
  };
}

/** The axis shows at least a point of share, or a hundredth of the users, either way: a trifle must not look like a landslide. */
function leastReach({ baseline }: ScenarioComparison, keys: ForecastSeriesKey[]): number {
  if (keys.includes('share')) return LEAST_REACH;
  return LEAST_REACH * Math.max(...keys.flatMap((key) => baseline[key].q50));
}

/** No push has done anything in the last observed month: the difference starts from 0. */
function differencePoint(
  bands: Bands,
  h: number,
  spell: (value: number, width?: { q05: number; q95: number }) => string,
): NonNullable<DifferenceRow['points'][ForecastSeriesKey]> {
  if (h === 0) return { mid: 0, band50: [0, 0], band90: [0, 0], text: spell(0) };
  const { q05, q50, q95 } = intervalAt(bands, h - 1);
  return {
    mid: q50,
    band50: [bands.q25[h - 1]!, bands.q75[h - 1]!],
    band90: [q05, q95],
    text: spell(q50, { q05, q95 }),
  };
}

/** Signed; shares in points without their unit. */
function spellTick(words: Words, keys: ForecastSeriesKey[], value: number): string {
  const shown = keys.includes('share') ? words.numbers.number(value * 100) : words.numbers.axis(value);
  return value > 0 ? `+${shown}` : shown;
}

function tabulateDifference(words: Words, keys: ForecastSeriesKey[], rows: DifferenceRow[]): FigureTable {
  const names = keys.map((key) => (key === 'share' ? `${possessive(words.focal)} share` : words.name(key)));
  return {
    title: 'Difference to no push, by month',
    columns: [
      'Month',
      ...names.flatMap((name) => [name, `${name}, 90\u00a0% from`, `${name}, 90\u00a0% to`]),
    ],
    rows: rows.map((row) => [
      row.label,
      ...keys.flatMap((key) => {
        const point = row.points[key]!;
        const spell = (value: number) =>
          key === 'share' ? words.numbers.points(value) : words.numbers.usersDifference(value);
        return [point.mid, ...point.band90].map(spell);
      }),
    ]),
    raw: rows.map((row) => [
      row.label,
      ...keys.flatMap((key) => [row.points[key]!.mid, ...row.points[key]!.band90]),
    ]),
  };
}

function tabulateCheckpoints(words: Words, comparison: ScenarioComparison): FigureTable {
  const keys = ['focal', 'rival', 'share'] as const;
  const spell = (key: (typeof keys)[number], at: { q05: number; q50: number; q95: number }) =>
    key === 'share'
      ? `${words.numbers.points(at.q50, at)} (${words.numbers.pointsInterval(at)})`
      : `${words.numbers.usersDifference(at.q50, at)} (${words.numbers.usersDifferenceInterval(at)})`;
  return {
    title: 'Difference to no push',
    columns: ['Month', words.focal, words.rival, `${possessive(words.focal)} share`],
    rows: comparison.checkpoints.map(({ monthsAhead: h, difference }) => [
      `${words.months.short(words.lastMonth + h)} (${h} months)`,
      ...keys.map((key) => spell(key, difference[key])),
    ]),
    raw: comparison.checkpoints.map(({ monthsAhead: h, difference }) => [
      words.months.short(words.lastMonth + h),
      ...keys.map((key) => difference[key].q50),
    ]),
  };
}

function captionDifference(words: Words, comparison: ScenarioComparison): Sentence {
  return sentence(
    `${namePushes(words, comparison.pushes)} against no push, on the same ${words.numbers.users(comparison.draws)} draws and the same luck. ` +
      'Line: middle; dark band: half of the draws; light band: nine in ten.',
  );
}

function monthsAhead({ horizonMonths }: ScenarioComparison): number[] {
  return Array.from({ length: horizonMonths }, (_, i) => i + 1);
}

function labelMonth(words: Words, ahead: number): { month: number; label: string } {
  const month = words.lastMonth + ahead;
  return { month, label: words.months.short(month) };
}
