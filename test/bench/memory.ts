/**
 * Memory over many markets: `npm run -s bench:memory -- [COUNT] [MARKETS.json]` (1000; the benchmark markets, each time with another seed).
 *
 * Prints the heap after a forced collection on the way. It is flat when nothing of a market outlives it; exit code 1 when the last reading is
 * more than ALLOWED above the first.
 */
import { existsSync } from 'node:fs';
import { DEFAULT_MARKETS, readMarkets, runMarket } from './markets';

const DEFAULT_COUNT = 1000;
/** Shares of the way at which the heap is read. */
const READINGS = [0.1, 0.25, 0.5, 0.75, 1];
/** Megabytes that compiled code and caches may still add after the first reading. */
const ALLOWED = 5;
const MEGABYTE = 2 ** 20;

function readHeap(): number {
  if (!globalThis.gc) throw new Error('run with --expose-gc');
  globalThis.gc();
  globalThis.gc();
  return process.memoryUsage().heapUsed / MEGABYTE;
}

function main(): void {
  const count = Number(process.argv[2] ?? DEFAULT_COUNT);
  const file = process.argv[3] ?? DEFAULT_MARKETS;
  if (!existsSync(file)) {
    console.error(`no markets at ${file}`);
    process.exit(2);
  }
  const markets = readMarkets(file);
  const due = READINGS.map((share) => Math.round(share * count));
  const heaps: number[] = [];
  for (let i = 1; i <= count; i++) {
    runMarket(markets[(i - 1) % markets.length], { seed: i });
    if (!due.includes(i)) continue;
    heaps.push(readHeap());
    const { rss } = process.memoryUsage();
    console.log(
      `after ${i} markets: heap ${heaps[heaps.length - 1].toFixed(1)} MB, resident ${(rss / MEGABYTE).toFixed(0)} MB`,
    );
  }
  process.exitCode = heaps[heaps.length - 1] - heaps[0] <= ALLOWED ? 0 : 1;
}

main();
