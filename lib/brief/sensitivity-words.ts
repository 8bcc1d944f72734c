/** What the share and the odds hang on: one bar per parameter, and which one to learn more about first. */
import type { Sensitivity, SensitivityRow } from '../forecast/identifiability/report';
import { subjectOutcome } from './outcomes';
import { nameParameter } from './parameters';
import { capitalise, sentence, strong } from './text';
import type { FigureTable, SensitivityFigure, SensitivityLine, Sentence } from './types';
import type { Words } from './words';

/** Ends of the share axis are multiples of this. */
const AXIS_STEP = 0.1;
/** Explained parts below this say that no parameter stands out. */
const STANDS_OUT = 0.1;

export function buildSensitivity(words: Words, sensitivity: Sensitivity): SensitivityFigure {
  const rows = [...sensitivity.rows].sort((a, b) => b.shareExplained - a.shareExplained);
  const domain = shareDomain(rows);
  return {
    headline: writeHeadline(words, sensitivity),
    title: `What ${words.focal}’s share in ${monthOf(words, sensitivity)} hangs on`,
    rows: rows.map((row) => toLine(words, row)),
    domain,
    ticks: [domain[0], (domain[0] + domain[1]) / 2, domain[1]].map((value) => ({
      value,
      label: words.numbers.seenShare(value),
    })),
    caption: sentence(
      `Bar: ${words.focal}’s share in ${monthOf(words, sensitivity)} with one strength at either end of its 90\u00a0% interval and all else in the middle. Number: how much of the share’s spread would go if that strength were known.`,
    ),
    table: buildTable(words, sensitivity, rows),
  };
}

function monthOf(words: Words, { horizonMonths }: Sensitivity): string {
  return words.months.long(words.lastMonth + horizonMonths);
}

function writeHeadline(words: Words, sensitivity: Sensitivity): Sentence {
  const { rows, learnFirst, leading } = sensitivity;
  const find = (id: SensitivityRow['id']) => rows.find((row) => row.id === id)!;
  const share = find(learnFirst.share);
  if (!(share.shareExplained > STANDS_OUT)) {
    return sentence(`No single strength stands out behind the share in ${monthOf(words, sensitivity)}.`);
  }
  const lead = [
    `The share in ${monthOf(words, sensitivity)} hangs most on `,
    strong(nameParameter(words, share.id)),
    `: knowing it would take away ${words.numbers.chance(share.shareExplained)} of the spread.`,
  ];
  if (learnFirst.odds === null) return sentence(...lead, ' The odds hang on nothing that is still open.');
  const odds = find(learnFirst.odds);
  const ends = `they are ${words.numbers.chance(odds.oddsAtLow)} where it is lowest and ${words.numbers.chance(odds.oddsAtHigh)} where it is highest`;
  const what = `The odds of ${subjectOutcome(words, leading)}`;
  return learnFirst.odds === learnFirst.share
    ? sentence(...lead, ` ${what} hang on it too: ${ends}.`)
    : sentence(...lead, ` ${what} hang most on ${nameParameter(words, odds.id)}: ${ends}.`);
}

function toLine(words: Words, row: SensitivityRow): SensitivityLine {
  const { shareAtLow, shareAtHigh } = row;
  const hasBar = shareAtLow !== null && shareAtHigh !== null;
  return {
    id: row.id,
    label: capitalise(nameParameter(words, row.id)),
    tone: row.id === 'r1' || row.id === 'k1' || row.id === 'alpha' ? 'focal' : 'rival',
    bar: hasBar ? { low: Math.min(shareAtLow, shareAtHigh), high: Math.max(shareAtLow, shareAtHigh) } : null,
    text: hasBar
      ? `${words.numbers.chance(shareAtLow)} to ${words.numbers.chance(shareAtHigh)}`
      : 'not known',
    explained: words.numbers.chance(row.shareExplained),
  };
}

/** Round ends that hold all bars. */
function shareDomain(rows: readonly SensitivityRow[]): [number, number] {
  const ends = rows
    .flatMap(({ shareAtLow, shareAtHigh }) => [shareAtLow, shareAtHigh])
    .filter((end) => end !== null);
  const low = Math.floor(Math.min(1 - AXIS_STEP, ...ends) / AXIS_STEP);
  const high = Math.ceil(Math.max(AXIS_STEP, ...ends) / AXIS_STEP);
  const last = Math.min(Math.round(1 / AXIS_STEP), Math.max(high, low + 2));
  // products of a tenth, rounded, so that 0.3 stays 0.3
  const round = (steps: number) => Number((steps * AXIS_STEP).toPrecision(6));
  return [round(Math.min(low, last - 2)), round(last)];
}

function buildTable(words: Words, { leading }: Sensitivity, rows: readonly SensitivityRow[]): FigureTable {
  const { chance, decimals } = words.numbers;
  const share = (value: number | null) => (value === null ? '–' : chance(value));
  const interval = ({ id, low, high }: SensitivityRow) => {
    const width = { q05: low, q95: high };
    if (id === 'k1' || id === 'k2') return words.numbers.usersInterval(width);
    return words.numbers.percentInterval(width);
  };
  return {
    title: 'What share and odds hang on',
    columns: [
      'Strength',
      '90\u00a0% interval',
      'Share at its low end',
      'Share at its high end',
      'Percent of share per percent',
      'Part of the share’s spread',
      `Odds of ${subjectOutcome(words, leading)}, lowest fifth`,
      'Highest fifth',
      'Percent of odds per percent',
      'Part of the odds’ spread',
    ],
    rows: rows.map((row) => [
      capitalise(nameParameter(words, row.id)),
      interval(row),
      share(row.shareAtLow),
      share(row.shareAtHigh),
      decimals(row.elasticity, 2),
      chance(row.shareExplained),
      chance(row.oddsAtLow),
      chance(row.oddsAtHigh),
      decimals(row.oddsElasticity, 2),
      chance(row.oddsExplained),
    ]),
    raw: rows.map((row) => [
      row.id,
      row.low,
      row.shareAtLow,
      row.shareAtHigh,
      row.elasticity,
      row.shareExplained,
      row.oddsAtLow,
      row.oddsAtHigh,
      row.oddsElasticity,
      row.oddsExplained,
    ]),
  };
}
