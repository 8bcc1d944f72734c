/**
 * The known-truth markets that the benches run on, and one whole market as the app would run it: starts, converged draws, odds, bands.
 */
import { readFileSync } from 'node:fs';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import type { FitOptions } from '@/lib/estimate/types';
import { createOutlookRun, type OutlookStep } from '@/lib/forecast/outlook-run';

/** The markets beside the repository. */
export const DEFAULT_MARKETS = '../shared/bench/markets.json';

export interface Market {
  id: number | string;
  first: (number | null)[];
  second: (number | null)[];
  H: number;
}

export function readMarkets(file: string, limit?: number): Market[] {
  return (JSON.parse(readFileSync(file, 'utf8')) as Market[]).slice(0, limit);
}

export function runMarket(
  market: Market,
  options: Partial<FitOptions> = {},
): Exclude<OutlookStep, { done: false }> {
  const run = createOutlookRun({
    series: { firstMonth: 0, focal: market.first, rival: market.second },
    options: { ...DEFAULT_FIT_OPTIONS, horizonMonths: market.H, ...options },
  });
  let step = run.next();
  while (!step.done) step = run.next();
  return step;
}

/** CPU seconds of this process so far, all its threads together. */
export function cpuSeconds(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1e6;
}
