/**
 * Predicts every market of a benchmark file on one core: `npm run -s bench:predict -- MARKETS.json OUT.json [LIMIT]`.
 *
 * Reads a list of {id, first, second, H}: monthly counts of two firms (leading zeros: not launched) and the months to forecast; writes a
 * list of {id, probs: {coexistence, first, second, tipping}, q, seconds, status, rhat, ess}; q[firm][level][month] are the 5, 25, 50, 75
 * and 95 % quantiles of future observations in users. What really happened, where the file holds it, is never read.
 */
import { readFileSync, writeFileSync } from 'node:fs';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { createOutlookRun } from '@/lib/forecast/outlook-run';
import type { Bands } from '@/lib/forecast/report';

interface Market {
  id: number | string;
  first: (number | null)[];
  second: (number | null)[];
  H: number;
}

const NO_OPINION = { coexistence: 0.25, first: 0.25, second: 0.25, tipping: 0.25 };

function predict(market: Market) {
  const started = performance.now();
  const run = createOutlookRun({
    series: { firstMonth: 0, focal: market.first, rival: market.second },
    options: { ...DEFAULT_FIT_OPTIONS, horizonMonths: market.H },
  });
  let step = run.next();
  while (!step.done) step = run.next();
  const seconds = (performance.now() - started) / 1000;
  if ('failure' in step) {
    return {
      id: market.id,
      probs: NO_OPINION,
      q: null,
      seconds,
      status: step.failure,
      rhat: null,
      ess: null,
    };
  }
  const { outlook, diagnostics } = step.report;
  const { coexistence, exclusionByFocal, exclusionByRival, headStartDecides } = outlook.odds;
  return {
    id: market.id,
    probs: { coexistence, first: exclusionByFocal, second: exclusionByRival, tipping: headStartDecides },
    q: [toLevels(outlook.observations.focal), toLevels(outlook.observations.rival)],
    seconds,
    status: diagnostics.status,
    rhat: diagnostics.rHat,
    ess: diagnostics.ess,
  };
}

function toLevels({ q05, q25, q50, q75, q95 }: Bands): number[][] {
  return [q05, q25, q50, q75, q95];
}

function main(): void {
  const [marketsFile, outFile, limit] = process.argv.slice(2);
  if (!marketsFile || !outFile) {
    console.error('usage: npm run -s bench:predict -- MARKETS.json OUT.json [LIMIT]');
    process.exit(2);
  }
  const markets = JSON.parse(readFileSync(marketsFile, 'utf8')) as Market[];
  const predictions = markets.slice(0, limit ? Number(limit) : undefined).map(predict);
  writeFileSync(outFile, JSON.stringify(predictions));
  const seconds = predictions.map((prediction) => prediction.seconds).sort((a, b) => a - b);
  const converged = predictions.filter((prediction) => prediction.status === 'converged').length;
  console.error(
    `${predictions.length} markets, ${converged} converged, median ${seconds[seconds.length >> 1].toFixed(3)} s, ` +
      `slowest ${seconds[seconds.length - 1].toFixed(3)} s`,
  );
}

main();
