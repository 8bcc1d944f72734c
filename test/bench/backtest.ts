/**
 * The backtest on the open monthly series of the reference data, as a Markdown table for DEVELOPERS.md:
 *   npm run -s bench:backtest
 * Months before June 2016 are left out: their counts are of parts of months.
 */
import { readFileSync } from 'node:fs';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { ENGINE_VERSION } from '@/lib/estimate/engine-version';
import type { FitInput } from '@/lib/estimate/types';
import { createBacktestRun } from '@/lib/forecast/backtest/backtest-run';
import type { BacktestReport } from '@/lib/forecast/backtest/report';
import { createOutlookRun } from '@/lib/forecast/outlook-run';
import { readSeries } from '@/lib/series/read-series';

const SERIES = [
  { name: 'Django by Python 2 and 3', file: 'pypi_django_py2_py3_monthly.csv' },
  { name: 'All packages by Python 2 and 3', file: 'pypi_all_py2_py3_monthly.csv' },
];
const FIRST_WHOLE_MONTH = '2016-06';

function readInput(file: string): FitInput {
  const text = readFileSync(new URL(`../reference/data/${file}`, import.meta.url), 'utf8');
  const [header, ...rows] = text.trimEnd().split('\n');
  const whole = [header, ...rows.filter((row) => row >= FIRST_WHOLE_MONTH)].join('\n');
  const mapping = { month: 'month', focal: 'python2_installs', rival: 'python3_installs' };
  const { series } = readSeries(whole, mapping);
  if (!series) throw new Error(`${file} cannot be read`);
  return { series, options: { ...DEFAULT_FIT_OPTIONS } };
}

function runBacktest(input: FitInput): { report: BacktestReport; seconds: number } {
  const fit = createOutlookRun(input);
  let end = fit.next();
  while (!end.done) end = fit.next();
  if ('failure' in end) throw new Error(end.failure);
  const started = performance.now();
  const run = createBacktestRun({ ...input, report: end.report, draws: end.draws });
  let step = run.next();
  while (!step.done) step = run.next();
  if ('failure' in step) throw new Error(step.failure);
  return { report: step.result, seconds: (performance.now() - started) / 1000 };
}

function printReport(name: string, input: FitInput): void {
  const { report, seconds } = runBacktest(input);
  const { origins, scores, comparisons, combination } = report;
  console.log(
    `\n**${name}**, ${input.series.focal.length} months, ${origins.used} of ${origins.possible} origins, training ${origins.firstTraining} to ${origins.lastTraining} months, ${seconds.toFixed(0)} s.\n`,
  );
  console.log(
    '| months ahead | method | typical error | MASE | CRPS | 90 % interval score | inside 50 % | inside 90 % |',
  );
  console.log('|---|---|---|---|---|---|---|---|');
  for (const row of [...scores].sort((a, b) => a.horizonMonths - b.horizonMonths)) {
    const percent = (value: number) => `${(100 * value).toFixed(0)} %`;
    const cells = [
      row.horizonMonths,
      row.isComplete ? row.method : `${row.method} (${row.cases} cases)`,
      percent(Math.expm1(row.absoluteLogError)),
      row.mase?.toFixed(2) ?? '-',
      row.crps.toFixed(3),
      row.intervalScore90.toFixed(2),
      percent(row.coverage50),
      percent(row.coverage90),
    ];
    console.log(`| ${cells.join(' | ')} |`);
  }
  for (const { horizonMonths, bestSimple, meanDifference, pValue } of comparisons) {
    const who = meanDifference <= 0 ? 'own model better' : `${bestSimple} better`;
    const p = pValue === null ? 'overlap too large to test' : `p = ${pValue.toFixed(3)}`;
    console.log(
      `${horizonMonths === 1 ? '\n' : ''}${horizonMonths} ahead: ${who} (against ${bestSimple}; CRPS difference ${meanDifference.toFixed(3)}, ${p}).`,
    );
  }
  if (!combination) return;
  const weights = combination.weights
    .map(({ method, weight }) => `${method} ${weight.toFixed(2)}`)
    .join(', ');
  console.log(
    `Combination, left-one-out CRPS ${combination.crps.toFixed(3)} against ${combination.bestSingleCrps.toFixed(3)} of ${combination.bestSingle}: ${combination.isBetter ? 'offered' : 'not offered'}. Weights: ${weights}.`,
  );
}

console.log(`Engine ${ENGINE_VERSION}.`);
for (const { name, file } of SERIES) printReport(name, readInput(file));
