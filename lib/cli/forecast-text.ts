/**
 * The outlook as text for a terminal: the sentences of the brief, its odds, bands, milestones and parameters, and what was read.
 */
import { plainText } from '../brief/text';
import type { Brief, ForecastRow } from '../brief/types';
import { explainProblem } from '../series/explain';
import { formatMonth } from '../series/month';
import type { MonthlySeries, SeriesProblem } from '../series/types';
import { renderTable, wrapText } from './text-layout';

/** Forecasts of up to a year are shown month by month, longer ones every third month. */
const MONTHS_SHOWN_SINGLY = 12;
const STRIDE = 3;

/** Characters of the longest odds bar. */
const BAR_LENGTH = 30;

/** Problems written out; the rest is counted, `--json` has them all. */
const MAX_PROBLEMS_SHOWN = 12;

export function renderOutlook(
  brief: Brief,
  series: MonthlySeries,
  problems: readonly SeriesProblem[],
): string {
  const { where, why, trust, cautions } = brief;
  const blocks = [
    wrapText(plainText(where.verdict.headline)),
    ...where.verdict.support.map((sentence) => wrapText(plainText(sentence))),
    renderOdds(brief),
    section('Forecast: median (90 % band)', renderBands(brief)),
    section(
      'Milestones',
      renderTable(where.milestones.map(({ label, value, chance }) => [label, value, chance])),
    ),
    section(
      'Why',
      renderTable(why.parameters.rows.map(({ label, value, interval }) => [label, value, interval])),
    ),
    section(
      'What the data cannot tell',
      renderList(trust.unknowns.map(({ sentence }) => plainText(sentence))),
    ),
    section('Data', renderData(brief, series, problems)),
    section('Sampler', wrapText(plainText(trust.sampler.line))),
    section('Cautions', renderList(cautions.map(({ text }) => text))),
  ];
  return `${blocks.join('\n\n')}\n`;
}

/** One line a problem: what happened, why it matters, what to try; the first ones only. */
export function renderProblems(problems: readonly SeriesProblem[]): string {
  const shown = problems.slice(0, MAX_PROBLEMS_SHOWN).map((problem) => {
    const { what, why, tryThis } = explainProblem(problem);
    return `${what} ${why} ${tryThis}`;
  });
  const left = problems.length - shown.length;
  return renderList(left > 0 ? [...shown, `${left} more; --json lists them.`] : shown);
}

function section(title: string, body: string): string {
  return `${title}\n${body}`;
}

function renderOdds({ where }: Brief): string {
  const rows = where.odds.rows.map(({ label, percent, width, words }) => {
    const bar = '█'.repeat(Math.round((width / 100) * BAR_LENGTH));
    return [label, percent, words, bar];
  });
  return renderTable(rows);
}

function renderBands({ where, market }: Brief): string {
  const shares = new Map(where.forecast.share.rows.map((row) => [row.month, row]));
  const future = where.forecast.users.rows.filter(({ isForecast }) => isForecast);
  const shown =
    future.length <= MONTHS_SHOWN_SINGLY ? future : future.filter((_, index) => (index + 1) % STRIDE === 0);
  const cell = (row: ForecastRow | undefined, key: 'focal' | 'rival' | 'share') =>
    row?.points[key]?.text ?? '';
  const lines = shown.map((row) => [
    formatMonth(row.month),
    cell(row, 'focal'),
    cell(row, 'rival'),
    cell(shares.get(row.month), 'share'),
  ]);
  return renderTable([['', market.focalName, market.rivalName, `share of ${market.focalName}`], ...lines]);
}

function renderData(brief: Brief, series: MonthlySeries, problems: readonly SeriesProblem[]): string {
  const { focalName, rivalName } = brief.market;
  const first = formatMonth(series.firstMonth);
  const last = formatMonth(series.firstMonth + series.focal.length - 1);
  const read = `${series.focal.length} months, ${first} to ${last}; ${focalName} is the focal firm, ${rivalName} the rival.`;
  return problems.length === 0 ? wrapText(read) : `${wrapText(read)}\n${renderProblems(problems)}`;
}

function renderList(items: readonly string[]): string {
  return items.map((item) => wrapText(`- ${item}`, 2)).join('\n');
}
