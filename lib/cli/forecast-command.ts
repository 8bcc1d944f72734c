/**
 * `elbowroom forecast FILE`: file -> series -> outlook -> text or JSON. Every way of ending is one of EXIT_CODES.
 */
import { buildBrief } from '../brief/build-brief';
import { DEFAULT_FIT_OPTIONS } from '../estimate/defaults';
import type { FitStatus } from '../estimate/types';
import type { FitReport } from '../forecast/report';
import { explainProblem } from '../series/explain';
import { makeMonth } from '../series/month';
import { readTable } from '../series/parse-table';
import { isBlocking } from '../series/problem';
import { canFit, readSeriesFromTable } from '../series/read-series';
import type { MonthlySeries, SeriesProblem, SeriesReading } from '../series/types';
import type { ForecastRequest } from './arguments';
import { chooseColumns } from './choose-columns';
import type { ExitId } from './exit-codes';
import { toForecastJson } from './forecast-json';
import { renderOutlook } from './forecast-text';
import { readInput } from './read-input';
import { describeProgress, runOutlook } from './run-outlook';
import type { Terminal } from './terminal';

export type CommandEnd =
  | { exit: 'ok'; output: string }
  | { exit: Exclude<ExitId, 'ok'>; message: string; problems: readonly SeriesProblem[] };

/** What a chart would call the counts; a file does not say. */
const UNIT = 'users';

type FittableReading = SeriesReading & { series: MonthlySeries };

export function forecast(request: ForecastRequest, asJson: boolean, terminal: Terminal): CommandEnd {
  const startedAt = performance.now();
  const input = readInput(request.file);
  if (!input.ok) return fail('file-unreadable', input.message);
  const reading = readFile(input.text, request);
  if ('exit' in reading) return reading;

  const { seed, horizonMonths } = request;
  const options = { ...DEFAULT_FIT_OPTIONS, seed, horizonMonths };
  const end = runOutlook({ series: reading.series, options }, (progress) =>
    terminal.showProgress(describeProgress(progress)),
  );
  terminal.clearProgress();
  if ('failure' in end) return explainFailure(end.failure, reading.problems);

  if (end.report.diagnostics.status === 'not-converged') {
    terminal.warn(
      'The sampler stopped short of its target; the numbers are rough. More months or another --seed may help.',
    );
  }
  const milliseconds = performance.now() - startedAt;
  const output = asJson
    ? `${JSON.stringify(toForecastJson(reading, end.report, milliseconds))}\n`
    : writeText(reading, end.report);
  return { exit: 'ok', output };
}

function readFile(text: string, request: ForecastRequest): FittableReading | CommandEnd {
  const table = readTable(text);
  if (table.header.length === 0) return failWithProblems('data-unusable', table.problems);
  const choice = chooseColumns(table, request);
  if (!choice.ok) return fail('data-unusable', choice.message, table.problems);
  const reading = readSeriesFromTable(table, choice.mapping, { thisMonth: currentMonth() });
  if (canFit(reading) && reading.series !== null) return { ...reading, series: reading.series };

  const isTooShort = reading.problems.filter(isBlocking).every(({ code }) => code === 'too-short-to-fit');
  return failWithProblems(isTooShort ? 'too-short' : 'data-unusable', reading.problems);
}

/** The month on this machine's calendar. */
function currentMonth(): number {
  const now = new Date();
  return makeMonth(now.getFullYear(), now.getMonth() + 1);
}

function writeText(reading: FittableReading, report: FitReport): string {
  const { series, focalName, rivalName, problems } = reading;
  const brief = buildBrief({
    market: { name: `${focalName} and ${rivalName}`, unit: UNIT, focalName, rivalName },
    series,
    revision: { number: 1, createdAt: null, fileName: null },
    report,
  });
  return renderOutlook(brief, series, problems);
}

function explainFailure(status: FitStatus, problems: readonly SeriesProblem[]): CommandEnd {
  if (status === 'too-short')
    return fail('too-short', 'Too few months have a count for both firms.', problems);
  if (status === 'no-usable-data') {
    return fail(
      'data-unusable',
      'Neither firm’s count ever changes, so there is no growth to learn from.',
      problems,
    );
  }
  return fail(
    'fit-failed',
    'No start of the fit came to a finite value. Check the counts for slips of the comma.',
    problems,
  );
}

function fail(
  exit: Exclude<ExitId, 'ok'>,
  message: string,
  problems: readonly SeriesProblem[] = [],
): CommandEnd {
  return { exit, message, problems };
}

/** The message is the first problem that stops the file. */
function failWithProblems(exit: Exclude<ExitId, 'ok'>, problems: readonly SeriesProblem[]): CommandEnd {
  const { what, why, tryThis } = explainProblem(problems.find(isBlocking) ?? problems[0]);
  return fail(exit, `${what} ${why} ${tryThis}`, problems);
}
