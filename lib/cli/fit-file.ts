/** File -> series -> outlook with its draws: what every command starts with. */
import type { BriefFacts } from '../brief/facts';
import { DEFAULT_FIT_OPTIONS } from '../estimate/defaults';
import type { DrawSet, FitStatus } from '../estimate/types';
import type { FitReport } from '../forecast/report';
import { makeMonth } from '../series/month';
import { isBlocking } from '../series/problem';
import { canFit, readSeriesFromTable } from '../series/read-series';
import type { MonthlySeries, SeriesProblem, SeriesReading, TableReading } from '../series/types';
import { chooseColumns } from './choose-columns';
import { type CommandFailure, fail, failWithProblems } from './command-end';
import type { FitRequest } from './fit-request';
import { readInput } from './read-input';
import { describeProgress, runOutlook } from './run-outlook';
import type { Terminal } from './terminal';

/** What a chart would call the counts; a file does not say. */
const UNIT = 'users';

export type FittableReading = SeriesReading & { series: MonthlySeries };

export interface FittedFile {
  reading: FittableReading;
  report: FitReport;
  draws: DrawSet;
}

export async function fitFile(request: FitRequest, terminal: Terminal): Promise<FittedFile | CommandFailure> {
  const input = await readInput(request.file, request.sheet);
  if (!input.ok) return fail(input.exit, input.message);
  const reading = readCounts(input.table, request);
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
  return { reading, report: end.report, draws: end.draws };
}

export function toFacts({ reading, report }: Pick<FittedFile, 'reading' | 'report'>): BriefFacts {
  const { series, focalName, rivalName } = reading;
  return {
    market: { name: `${focalName} and ${rivalName}`, unit: UNIT, focalName, rivalName },
    series,
    revision: { number: 1, createdAt: null, fileName: null },
    report,
  };
}

function readCounts(table: TableReading, request: FitRequest): FittableReading | CommandFailure {
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

function explainFailure(status: FitStatus, problems: readonly SeriesProblem[]): CommandFailure {
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
