/**
 * Writes the counts of the demo markets to `markets/`: run once, results committed.  npx tsx seed/simulate-markets.ts
 */
import { writeFileSync } from 'node:fs';
import { toCsv } from '../lib/series/export-series';
import { DEMO_MARKETS } from './demo-markets';
import { simulateMarket } from './simulate-market';

for (const { truth, focalName, rivalName, fileName } of DEMO_MARKETS) {
  const csv = toCsv({ series: simulateMarket(truth), focalName, rivalName });
  writeFileSync(new URL(`markets/${fileName}`, import.meta.url), csv);
}
