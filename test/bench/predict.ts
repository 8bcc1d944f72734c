/**
 * Predicts every market of a benchmark file on one core: `npm run -s bench:predict -- MARKETS.json OUT.json [LIMIT]`
 * (`--errors ar1`: the other error model; `--seed N`).
 *
 * Reads a list of {id, first, second, H}: monthly counts of two firms (leading zeros: not launched) and the months to forecast; writes a
 * list of {id, probs: {coexistence, first, second, tipping}, q, seconds, status, rhat, ess}; q[firm][level][month] are the 5, 25, 50, 75
 * and 95 % quantiles of future observations in users. What really happened, where the file holds it, is never read.
 */
import { writeFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import type { FitOptions } from '@/lib/estimate/types';
import type { Bands } from '@/lib/forecast/report';
import { cpuSeconds, type Market, readMarkets, runMarket } from './markets';

const NO_OPINION = { coexistence: 0.25, first: 0.25, second: 0.25, tipping: 0.25 };

function predict(market: Market, options: Partial<FitOptions>) {
  const started = performance.now();
  const before = cpuSeconds();
  const step = runMarket(market, options);
  const seconds = (performance.now() - started) / 1000;
  const cpu = cpuSeconds() - before;
  if ('failure' in step) {
    return {
      id: market.id,
      probs: NO_OPINION,
      q: null,
      seconds,
      cpu,
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
    cpu,
    status: diagnostics.status,
    rhat: diagnostics.rHat,
    ess: diagnostics.ess,
  };
}

function toLevels({ q05, q25, q50, q75, q95 }: Bands): number[][] {
  return [q05, q25, q50, q75, q95];
}

function sort(values: number[]): number[] {
  return values.sort((a, b) => a - b);
}

function main(): void {
  const { values, positionals } = parseArgs({
    allowPositionals: true,
    options: { errors: { type: 'string' }, seed: { type: 'string' } },
  });
  const [marketsFile, outFile, limit] = positionals;
  const { errors = DEFAULT_FIT_OPTIONS.errorModel, seed = DEFAULT_FIT_OPTIONS.seed } = values;
  if (!marketsFile || !outFile || !(errors === 'ar1' || errors === 'process-noise')) {
    console.error(
      'usage: npm run -s bench:predict -- MARKETS.json OUT.json [LIMIT] [--errors ar1|process-noise] [--seed N]',
    );
    process.exit(2);
  }
  const options = { errorModel: errors, seed: Number(seed) } as const;
  const markets = readMarkets(marketsFile, limit ? Number(limit) : undefined);
  const predictions = markets.map((market) => predict(market, options));
  writeFileSync(outFile, JSON.stringify(predictions));
  const seconds = sort(predictions.map((prediction) => prediction.seconds));
  const cpu = sort(predictions.map((prediction) => prediction.cpu));
  const converged = predictions.filter((prediction) => prediction.status === 'converged').length;
  console.error(
    `${predictions.length} markets, ${converged} converged, median ${seconds[seconds.length >> 1].toFixed(3)} s ` +
      `(CPU ${cpu[cpu.length >> 1].toFixed(3)} s), slowest ${seconds[seconds.length - 1].toFixed(3)} s`,
  );
}

main();
