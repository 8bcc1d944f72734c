/**
 * Months until the data decide, by re-weighting draws, against brute force: `npx tsx test/bench/decide-months.ts MARKETS.json IDS [FUTURES]`.
 *
 * For each market the same simulated futures are judged twice: by weights on the draws of the fit, and by fitting the lengthened series
 * anew. Prints, per horizon, the chance that some outcome passes 66 % and 90 % by both, and the mean absolute difference of the best odds.
 */
import { readFileSync } from 'node:fs';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { thinDraws } from '@/lib/estimate/draws';
import {
  createFutureScore,
  DECISION_MONTHS,
  type DecisionFuture,
  SURE_ABOVE,
  simulateDecisionFutures,
} from '@/lib/forecast/identifiability/decide-months';
import { DECIDED_ABOVE } from '@/lib/forecast/odds';
import { createOutlookRun } from '@/lib/forecast/outlook-run';
import type { Odds } from '@/lib/forecast/report';
import type { MonthlySeries } from '@/lib/series/types';

interface Market {
  id: number;
  first: (number | null)[];
  second: (number | null)[];
}

const SEED = 5;
/** As many as are stored with a fit. */
const DRAWS = 2000;

function runFit(series: MonthlySeries) {
  const run = createOutlookRun({ series, options: { ...DEFAULT_FIT_OPTIONS } });
  let step = run.next();
  while (!step.done) step = run.next();
  if ('failure' in step) throw new Error(`a market of the benchmark cannot be fitted: ${step.failure}`);
  return step;
}

function lengthen(series: MonthlySeries, { logCounts }: DecisionFuture, months: number): MonthlySeries {
  const furthest = logCounts.length / 2;
  const counts = (firm: number) =>
    Array.from(logCounts.subarray(firm * furthest, firm * furthest + months), Math.exp);
  return { ...series, focal: [...series.focal, ...counts(0)], rival: [...series.rival, ...counts(1)] };
}

const best = (odds: Odds) => Math.max(...Object.values(odds));
const mean = (values: number[]) => values.reduce((a, b) => a + b, 0) / values.length;
const passing = (values: number[], limit: number) => mean(values.map((value) => (value > limit ? 1 : 0)));

function compare(market: Market, futureCount: number): void {
  const series = { firstMonth: 0, focal: market.first, rival: market.second };
  const { report, draws } = runFit(series);
  const stored = thinDraws(draws, DRAWS);
  const score = createFutureScore(stored);
  const futures = simulateDecisionFutures(stored, SEED, futureCount).filter((_, i) => i % 2 === 0);
  const weighted = futures.map((future) => score(future)!.map(({ odds }) => odds));
  console.log(
    `market ${market.id}, ${series.focal.length} months, odds now ${best(report.outlook.odds).toFixed(2)}`,
  );
  const rows = DECISION_MONTHS.map((months, k) => {
    const refitted = futures.map((future) =>
      best(runFit(lengthen(series, future, months)).report.outlook.odds),
    );
    const reweighted = weighted.map((row) => best(row[k]));
    return {
      months,
      'decided, weights': passing(reweighted, DECIDED_ABOVE),
      'decided, refits': passing(refitted, DECIDED_ABOVE),
      'sure, weights': passing(reweighted, SURE_ABOVE),
      'sure, refits': passing(refitted, SURE_ABOVE),
      'best odds differ by': Number(
        mean(refitted.map((odds, i) => Math.abs(odds - reweighted[i]))).toFixed(3),
      ),
    };
  });
  console.table(rows);
}

function main(): void {
  const [file, ids, futures] = process.argv.slice(2);
  if (!file || !ids) {
    console.error('usage: npx tsx test/bench/decide-months.ts MARKETS.json ID,ID,.. [FUTURES]');
    process.exit(2);
  }
  const markets = JSON.parse(readFileSync(file, 'utf8')) as Market[];
  for (const id of ids.split(',').map(Number)) {
    const market = markets.find((candidate) => candidate.id === id);
    if (!market) throw new Error(`no market ${id} in ${file}`);
    compare(market, futures ? Number(futures) : 20);
  }
}

main();
