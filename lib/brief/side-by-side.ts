/**
 * Up to four scenarios side by side, all on the same draws and the same luck: rows for one figure per quantity and one table. Lines are
 * medians of future counts with their 90 % bands; "no push" comes first.
 */
import { OUTCOMES } from '../forecast/outcomes';
import type { Interval } from '../forecast/report';
import type { ScenarioComparison } from '../scenario/comparison';
import { MAX_SIDE_BY_SIDE } from '../scenario/push-bounds';
import type { BriefFacts } from './facts';
import { spellMoney } from './money-words';
import { spellOdds } from './odds-strip';
import { labelOutcome } from './outcomes';
import { alignOdds } from './push-odds';
import { possessive, sentence } from './text';
import type { FigureTable, ForecastSeriesKey, Sentence } from './types';
import { createWords, DEFAULT_LOCALE, intervalAt, type Words } from './words';

export interface NamedComparison {
  name: string;
  comparison: ScenarioComparison;
}

export interface SideBySideRow {
  month: number;
  label: string;
  /** In the order of `series`: no push, then the scenarios. */
  points: { mid: number; band90: [number, number]; text: string }[];
}

export interface SideBySide {
  /** Names of the lines: "No push", then the scenarios. */
  series: string[];
  /** Per future month. */
  figures: Record<ForecastSeriesKey, SideBySideRow[]>;
  /** One column per line: share and users at 6, 12 and 24 months, odds, who is left, money. */
  table: FigureTable;
  caption: Sentence;
}

const KEYS: ForecastSeriesKey[] = ['focal', 'rival', 'share'];

/** @throws RangeError for no scenario, more than MAX_SIDE_BY_SIDE, or comparisons of different draws */
export function buildSideBySide(
  scenarios: readonly NamedComparison[],
  facts: BriefFacts,
  locale: string = DEFAULT_LOCALE,
): SideBySide {
  if (!(scenarios.length >= 1 && scenarios.length <= MAX_SIDE_BY_SIDE)) {
    throw new RangeError(`scenarios must be 1 to ${MAX_SIDE_BY_SIDE}, got ${scenarios.length}`);
  }
  const [first] = scenarios;
  const { draws, horizonMonths } = first!.comparison;
  if (scenarios.some(({ comparison: one }) => one.draws !== draws || one.horizonMonths !== horizonMonths)) {
    throw new RangeError('scenarios must be compared on the same draws as far as the same month');
  }
  const words = createWords(facts, locale);
  const aligned = scenarios.map(({ name, comparison }) => ({
    name,
    comparison: { ...comparison, odds: alignOdds(facts.report.outlook.odds, comparison.odds) },
  }));
  return {
    series: ['No push', ...scenarios.map(({ name }) => name)],
    figures: {
      focal: buildRows(words, aligned, 'focal'),
      rival: buildRows(words, aligned, 'rival'),
      share: buildRows(words, aligned, 'share'),
    },
    table: tabulate(words, aligned),
    caption: sentence(
      `Each scenario on the same ${words.numbers.users(draws)} draws and the same luck. Line: middle; band: nine in ten.`,
    ),
  };
}

function buildRows(words: Words, scenarios: NamedComparison[], key: ForecastSeriesKey): SideBySideRow[] {
  const { baseline, horizonMonths } = scenarios[0]!.comparison;
  const lines = [baseline[key], ...scenarios.map(({ comparison }) => comparison.pushed[key])];
  return Array.from({ length: horizonMonths }, (_, h) => {
    const month = words.lastMonth + h + 1;
    const points = lines.map((bands) => {
      const at = intervalAt(bands, h);
      return { mid: at.q50, band90: [at.q05, at.q95] as [number, number], text: spellLevel(words, key, at) };
    });
    return { month, label: words.months.short(month), points };
  });
}

function spellLevel(words: Words, key: ForecastSeriesKey, at: Interval): string {
  return key === 'share' ? words.numbers.chance(at.q50) : words.numbers.users(at.q50, at);
}

interface Line {
  label: string;
  /** No push, then the scenarios. */
  cells: { text: string; raw: number | string | null }[];
}

function tabulate(words: Words, scenarios: NamedComparison[]): FigureTable {
  const lines = [
    ...listLevels(words, scenarios),
    ...listOdds(words, scenarios),
    ...listEnds(words, scenarios),
    ...listMoney(words, scenarios),
  ];
  return {
    title: 'Scenarios side by side',
    columns: ['', 'No push', ...scenarios.map(({ name }) => name)],
    rows: lines.map(({ label, cells }) => [label, ...cells.map(({ text }) => text)]),
    raw: lines.map(({ label, cells }) => [label, ...cells.map(({ raw }) => raw)]),
  };
}

/** Underlying level with its 90 % interval, and in brackets the difference to no push. */
function listLevels(words: Words, scenarios: NamedComparison[]): Line[] {
  return KEYS.flatMap((key) =>
    scenarios[0]!.comparison.checkpoints.map((first, k): Line => {
      const name = key === 'share' ? `${possessive(words.focal)} share` : words.name(key);
      const base = first.baseline[key];
      return {
        label: `${name}, ${words.months.short(words.lastMonth + first.monthsAhead)}`,
        cells: [
          { text: spellLevel(words, key, base), raw: base.q50 },
          ...scenarios.map(({ comparison }) => {
            const { pushed, difference } = comparison.checkpoints[k]!;
            const change = spellChange(words, key, difference[key]);
            return { text: `${spellLevel(words, key, pushed[key])} (${change})`, raw: pushed[key].q50 };
          }),
        ],
      };
    }),
  );
}

function spellChange(words: Words, key: ForecastSeriesKey, at: Interval): string {
  return key === 'share' ? words.numbers.points(at.q50, at) : words.numbers.usersDifference(at.q50, at);
}

function listOdds(words: Words, scenarios: NamedComparison[]): Line[] {
  const columns = [
    scenarios[0]!.comparison.odds.before,
    ...scenarios.map(({ comparison }) => comparison.odds.after),
  ];
  const spelt = columns.map((odds) => spellOdds(words, odds));
  return OUTCOMES.map((outcome) => ({
    label: `Odds: ${labelOutcome(words, outcome)}`,
    cells: columns.map((odds, i) => ({ text: spelt[i]![outcome], raw: odds[outcome] })),
  }));
}

/** Chance that the pushes change who is left in the end. */
function listEnds(words: Words, scenarios: NamedComparison[]): Line[] {
  return [
    {
      label: 'Chance that it moves the destination',
      cells: [
        { text: '–', raw: null },
        ...scenarios.map(({ comparison: { effect } }) => ({
          text: words.numbers.chance(effect.probabilityMoves),
          raw: effect.probabilityMoves,
        })),
      ],
    },
  ];
}

function listMoney(words: Words, scenarios: NamedComparison[]): Line[] {
  if (!scenarios.some(({ comparison }) => comparison.money)) return [];
  const cellsOf = (spell: (money: NonNullable<ScenarioComparison['money']>) => Line['cells'][number]) => [
    { text: '–', raw: null },
    ...scenarios.map(({ comparison: { money } }) => (money ? spell(money) : { text: '–', raw: null })),
  ];
  return [
    {
      label: `Worth to ${words.focal}, on average`,
      cells: cellsOf(({ focal, assumed }) => ({
        text: spellMoney(words, focal.expectedValue, assumed.currency, focal.value),
        raw: focal.expectedValue,
      })),
    },
    {
      label: 'Chance that this is positive',
      cells: cellsOf(({ focal }) => ({
        text: words.numbers.chance(focal.chancePositive),
        raw: focal.chancePositive,
      })),
    },
  ];
}
