/**
 * What the backtest says, in plain words: who forecast this market better, whether that is more than chance, how well the bands held, and
 * the combination where it did better. Methods are judged by CRPS, which weighs middle and band together; told by their typical error,
 * exp(mean |ln error|) - 1.
 */
import type { BacktestReport, Comparison, ScoreRow } from '../forecast/backtest/report';
import { listWords, sentence, strong } from './text';
import type { BacktestPart, BacktestRow, FigureTable, Sentence } from './types';
import type { Words } from './words';

/** Names within a sentence. */
const NAMES: Record<ScoreRow['method'], string> = {
  competition: 'this model',
  'random-walk-drift': 'a straight trend',
  'seasonal-naive': 'the same month of last year',
  'independent-logistic': 'a levelling curve for each firm alone',
  'damped-trend': 'a fading trend',
  combination: 'the combination',
};

const LABELS: Record<ScoreRow['method'], string> = {
  competition: 'This model',
  'random-walk-drift': 'Straight trend',
  'seasonal-naive': 'Same month of last year',
  'independent-logistic': 'Levelling curve, each firm alone',
  'damped-trend': 'Fading trend',
  combination: 'Combination',
};

/** Below this p-value a difference is called more than chance (common practice). */
const MORE_THAN_CHANCE = 0.05;
/** Share of outcomes inside the 90 % band below which the bands are called too narrow. */
const TOO_NARROW = 0.75;
/** Weights below this read as 0 %. */
const SMALLEST_WEIGHT = 0.005;

export function describeBacktest(words: Words, report: BacktestReport): BacktestPart {
  const horizon = longestHorizon(report);
  const rows = report.scores.filter((row) => row.horizonMonths === horizon && isShown(report, row));
  return {
    verdict: writeVerdict(words, report),
    details: [
      ...writeChance(words, report),
      writeCoverage(words, rows),
      ...writeCombination(words, report),
      writeOrigins(report),
    ],
    caption: sentence(
      `Forecasts ${monthsAhead(horizon)}, both firms, against the months that then came. Typical error: how far the middle of the forecast lay from them.`,
    ),
    rows: rows.map((row) => toRow(words, report, row)),
    table: buildTable(words, report),
  };
}

/** A combination that did not do better stays in the folded table. */
function isShown({ combination }: BacktestReport, row: ScoreRow): boolean {
  return row.method !== 'combination' || combination?.isBetter === true;
}

/** For beside the main verdict: one sentence where a simple method did better, else none. */
export function warnOfSimpler(words: Words, report: BacktestReport): Sentence[] {
  const comparison = longestComparison(report);
  if (!comparison || comparison.meanDifference <= 0) return [];
  const errors = spellErrors(words, report, comparison);
  return [
    sentence(
      `In past months ${NAMES[comparison.bestSimple]} forecast this market better than this model, ${monthsAhead(comparison.horizonMonths)}: typical error ${errors.simple} against ${errors.own}.`,
    ),
  ];
}

function writeVerdict(words: Words, report: BacktestReport): Sentence {
  const comparison = longestComparison(report);
  if (!comparison) return sentence('No simple method could be set beside this model here.');
  const { bestSimple, horizonMonths, meanDifference } = comparison;
  const name = NAMES[bestSimple];
  const { own, simple, isOwnCloser } = spellErrors(words, report, comparison);
  if (meanDifference <= 0) {
    const bands = isOwnCloser ? '' : ' Its bands make the difference, not its middle.';
    return sentence(
      'On this market ',
      strong(`this model forecast ${monthsAhead(horizonMonths)} better than the simple methods`),
      `: typical error ${own} against ${simple} for the best of them, ${name}.${bands}`,
    );
  }
  const bands = isOwnCloser ? ' Its bands make the difference, not its middle.' : '';
  return sentence(
    'On this market ',
    strong(`${name} forecast ${monthsAhead(horizonMonths)} better than this model`),
    `: typical error ${simple} against ${own}.${bands}`,
  );
}

function spellErrors(words: Words, report: BacktestReport, { bestSimple, horizonMonths }: Comparison) {
  const find = (method: ScoreRow['method']) =>
    report.scores.find((row) => row.method === method && row.horizonMonths === horizonMonths)!;
  const [own, simple] = [find('competition'), find(bestSimple)];
  return {
    own: spellError(words, own),
    simple: spellError(words, simple),
    isOwnCloser: own.absoluteLogError <= simple.absoluteLogError,
  };
}

function writeChance(words: Words, report: BacktestReport): Sentence[] {
  const comparison = longestComparison(report);
  if (!comparison) return [];
  const { pValue } = comparison;
  if (pValue === null) {
    return [
      sentence('These forecasts overlap too much in time to say whether the difference is more than chance.'),
    ];
  }
  const p = pValue < 0.001 ? 'p < 0.001' : `p = ${words.numbers.decimals(pValue, pValue < 0.1 ? 3 : 2)}`;
  return [
    sentence(
      pValue < MORE_THAN_CHANCE
        ? `The difference is more than chance easily gives (${p}).`
        : `Chance alone could give such a difference (${p}).`,
    ),
  ];
}

function writeCoverage(words: Words, rows: readonly ScoreRow[]): Sentence {
  const own = rows.find((row) => row.method === 'competition')!;
  const held = Math.round(own.coverage90 * own.cases);
  const warning = own.coverage90 < TOO_NARROW ? ' Take the bands of this market as too narrow.' : '';
  return sentence(
    `What came lay inside this model’s ${words.numbers.percent(0.9)} band in ${held} of ${own.cases} cases.${warning}`,
  );
}

function writeCombination(words: Words, { combination, horizons }: BacktestReport): Sentence[] {
  if (!combination) return [];
  if (!combination.isBetter) return [sentence('Mixing the methods did not beat the best of them alone.')];
  const parts = [...combination.weights]
    .filter(({ weight }) => weight >= SMALLEST_WEIGHT)
    .sort((a, b) => b.weight - a.weight)
    .map(({ method, weight }) => `${words.numbers.percent(Math.round(weight * 100) / 100)} ${NAMES[method]}`);
  const mix = sentence(strong('A combination did better than each alone'), `: ${listWords(parts)}.`);
  const { forecast } = combination;
  if (!forecast) return [mix];
  const at = horizons[horizons.length - 1] - 1;
  const spell = (firm: 'focal' | 'rival') => {
    const { q05, q50, q95 } = forecast[firm];
    const width = { q05: q05[at], q95: q95[at] };
    return `${words.name(firm)} at ${words.numbers.users(q50[at], width)} (${words.numbers.usersInterval(width)})`;
  };
  const month = words.months.long(words.lastMonth + 1 + at);
  return [mix, sentence(`For ${month} it puts ${spell('focal')} and ${spell('rival')}.`)];
}

function writeOrigins({ origins }: BacktestReport): Sentence {
  const { used, possible, failed, firstTraining, lastTraining } = origins;
  const without = failed > 0 ? ` At ${failed} more this model gave no forecast.` : '';
  return sentence(
    `Made from ${used} past months out of ${possible} possible, with ${firstTraining} to ${lastTraining} months of history each; what came later was hidden.${without}`,
  );
}

function toRow(words: Words, report: BacktestReport, row: ScoreRow): BacktestRow {
  const best = bestMethod(report, row.horizonMonths);
  return {
    method: row.method,
    label: LABELS[row.method],
    error: spellError(words, row),
    inside: words.numbers.seenShare(row.coverage90),
    note: noteOf(row, best),
    isOwn: row.method === 'competition',
  };
}

function noteOf(row: ScoreRow, best: ScoreRow['method'] | undefined): string {
  if (!row.isComplete) return `only ${row.cases} forecasts: its history was too short for the others`;
  return row.method === best ? 'best here' : '';
}

/** Lowest CRPS among complete methods. */
function bestMethod({ scores }: BacktestReport, horizonMonths: number): ScoreRow['method'] | undefined {
  return scores
    .filter((row) => row.horizonMonths === horizonMonths && row.isComplete)
    .sort((a, b) => a.crps - b.crps)[0]?.method;
}

function buildTable(words: Words, { scores, horizons }: BacktestReport): FigureTable {
  const rows = horizons.flatMap((horizon) => scores.filter((row) => row.horizonMonths === horizon));
  const decimals = (value: number) => words.numbers.decimals(value, 3);
  return {
    title: 'Scores of past forecasts; lower is better, coverage should be 50 and 90 %',
    columns: [
      'Months ahead',
      'Method',
      'Typical error',
      'MASE',
      'CRPS of ln users',
      '90 % interval score of ln users',
      'Inside 50 % band',
      'Inside 90 % band',
      'Forecasts',
    ],
    rows: rows.map((row) => [
      String(row.horizonMonths),
      LABELS[row.method],
      spellError(words, row),
      row.mase === null ? '–' : words.numbers.decimals(row.mase, 2),
      decimals(row.crps),
      decimals(row.intervalScore90),
      words.numbers.seenShare(row.coverage50),
      words.numbers.seenShare(row.coverage90),
      String(row.cases),
    ]),
    raw: rows.map((row) => [
      row.horizonMonths,
      row.method,
      Math.expm1(row.absoluteLogError),
      row.mase,
      row.crps,
      row.intervalScore90,
      row.coverage50,
      row.coverage90,
      row.cases,
    ]),
  };
}

function spellError(words: Words, row: ScoreRow): string {
  const error = Math.expm1(row.absoluteLogError);
  const step = error < 0.1 ? 1000 : 100;
  return words.numbers.percent(Math.round(error * step) / step);
}

function longestHorizon({ horizons }: BacktestReport): number {
  return horizons[horizons.length - 1];
}

function longestComparison(report: BacktestReport): Comparison | undefined {
  return report.comparisons.find((comparison) => comparison.horizonMonths === longestHorizon(report));
}

function monthsAhead(months: number): string {
  return months === 1 ? '1 month ahead' : `${months} months ahead`;
}
