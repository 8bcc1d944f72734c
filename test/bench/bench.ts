/**
 * Speed of the engine: `npm run bench -- [MARKETS.json] [LIMIT]` (default: the benchmark markets beside the repository, 12 of them).
 *
 * Micro figures on a path of 60 months; scenarios; whole markets on one core; and, where Python with scipy and the analyst's script lie beside the
 * markets, the ratio to it on the same markets in the same run.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { createTrajectory } from '@/lib/dynamics/trajectory';
import { createAr1Posterior } from '@/lib/estimate/ar1-posterior';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { readObservations } from '@/lib/estimate/observations';
import type { Posterior } from '@/lib/estimate/posterior';
import { buildPriors } from '@/lib/estimate/priors';
import { createStatePosterior } from '@/lib/estimate/state-posterior';
import { cpuSeconds, DEFAULT_MARKETS, type Market, readMarkets, runMarket } from './markets';
import { benchScenario } from './scenario-bench';

const DEFAULT_LIMIT = 12;
const MONTHS = 60;
const THETA = Float64Array.of(0.15, 0.2, 1e6, 8e5, 0.7, 1.2, 5e4, 2e4).map(Math.log);

/** Microseconds per call, after warming up: the best of a few batches, which other load on the machine disturbs least. */
function timeCall(call: () => void): number {
  for (let i = 0; i < 3000; i++) call();
  let best = Number.POSITIVE_INFINITY;
  for (let batch = 0; batch < 10; batch++) {
    const started = performance.now();
    for (let i = 0; i < 1000; i++) call();
    best = Math.min(best, performance.now() - started);
  }
  return best;
}

function benchMicro(): void {
  const trajectory = createTrajectory({ months: MONTHS, entry1: 0, entry2: 0 });
  const sensitivities = new Float64Array(2 * MONTHS * 8);
  const weights = new Float64Array(MONTHS).fill(1);
  const gradient = new Float64Array(8);
  const report = (name: string, microseconds: number) =>
    console.log(`${name.padEnd(58)} ${microseconds.toFixed(1)} us`);
  report(
    '60 months, path',
    timeCall(() => trajectory.run(THETA)),
  );
  report(
    '60 months, path with all forward sensitivities',
    timeCall(() => trajectory.fillSensitivities(THETA, sensitivities)),
  );
  const both = () => {
    trajectory.run(THETA);
    trajectory.pullBack(weights, weights, gradient);
  };
  report('60 months, path with reverse gradient', timeCall(both));

  trajectory.run(THETA);
  const counts = (logLevel: Float64Array) =>
    Array.from(logLevel, (value, t) => Math.exp(value + 0.03 * Math.sin(7 * t)));
  const reading = readObservations({
    firstMonth: 0,
    focal: counts(trajectory.logLevel1),
    rival: counts(trajectory.logLevel2),
  });
  if (!reading.ok) throw new Error(`bench series not usable: ${reading.status}`);
  const priors = buildPriors(reading.observations);
  const posteriors: [string, Posterior][] = [
    [
      'persistent errors',
      createAr1Posterior(reading.observations, priors, DEFAULT_FIT_OPTIONS.measurementFloor),
    ],
    [
      'process noise',
      createStatePosterior(reading.observations, priors, DEFAULT_FIT_OPTIONS.measurementFloor, {
        harmonics: 0,
        hasBreak: false,
      }),
    ],
  ];
  for (const [name, posterior] of posteriors) {
    const q = posterior.place(THETA, [
      { size: 0.03, persistence: 0.1 },
      { size: 0.03, persistence: 0.1 },
    ]);
    const slope = new Float64Array(q.length);
    report(
      `60 months, log posterior with gradient, ${name}`,
      timeCall(() => posterior.logDensity(q, slope)),
    );
  }
}

interface Seconds {
  wall: number;
  cpu: number;
}

/** Whole markets one after the other, with the horizon of the benchmark. */
function timeMarkets(markets: readonly Market[]): Seconds[] {
  return markets.map((market) => {
    const started = performance.now();
    const before = cpuSeconds();
    runMarket(market);
    return { wall: (performance.now() - started) / 1000, cpu: cpuSeconds() - before };
  });
}

/** Runs the analyst's script inside Python with its libraries loaded, and tells the CPU seconds that it took beyond them. */
const WRAPPER = `
import resource, runpy, sys
import numpy, scipy.integrate, scipy.optimize
def used():
    usage = resource.getrusage(resource.RUSAGE_SELF)
    return usage.ru_utime + usage.ru_stime
before = used()
sys.argv = sys.argv[1:]
runpy.run_path(sys.argv[0], run_name='__main__')
sys.stderr.write('\\nCPU %.3f' % (used() - before))
`;

/** Mean seconds per market of the analyst's script on one core, or null where it cannot run. */
function timeAnalyst(marketsFile: string, limit: number): Seconds | null {
  const script = join(dirname(marketsFile), 'analyst_scipy.py');
  if (!existsSync(script)) return null;
  const folder = mkdtempSync(join(tmpdir(), 'elbowroom-bench-'));
  try {
    const out = join(folder, 'analyst.json');
    const run = spawnSync('python3', ['-c', WRAPPER, script, marketsFile, out, String(limit)], {
      stdio: ['ignore', 'ignore', 'pipe'],
      encoding: 'utf8',
      env: { ...process.env, OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1' },
    });
    const cpu = Number(/CPU ([\d.]+)$/.exec(run.stderr ?? '')?.[1]);
    if (run.status !== 0 || !(cpu > 0)) return null;
    const rows = JSON.parse(readFileSync(out, 'utf8')) as { seconds: number }[];
    return { wall: meanOf(rows.map(({ seconds }) => seconds)), cpu: cpu / rows.length };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function meanOf(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

function describe(values: readonly number[]): string {
  const sorted = [...values].sort((a, b) => a - b);
  const last = sorted[sorted.length - 1];
  return `median ${sorted[sorted.length >> 1].toFixed(3)}, mean ${meanOf(values).toFixed(3)}, slowest ${last.toFixed(3)}`;
}

function main(): void {
  benchMicro();
  benchScenario();
  const marketsFile = process.argv[2] ?? DEFAULT_MARKETS;
  if (!existsSync(marketsFile)) {
    console.log(`no markets at ${marketsFile}: whole-market figures left out`);
    return;
  }
  const limit = Number(process.argv[3] ?? DEFAULT_LIMIT);
  const markets = readMarkets(marketsFile, limit);
  // the first market compiles the code; a worker runs for days
  runMarket(markets[0]);
  const times = timeMarkets(markets);
  const wall = times.map((time) => time.wall);
  const cpu = times.map((time) => time.cpu);
  console.log(`${times.length} whole markets, seconds:     ${describe(wall)}`);
  console.log(`${times.length} whole markets, CPU seconds: ${describe(cpu)}`);
  const analyst = timeAnalyst(marketsFile, limit);
  if (analyst === null) {
    console.log('the analyst script cannot run here: no ratio');
    return;
  }
  const ratio = (theirs: number, ours: number) =>
    `${theirs.toFixed(2)}, ${(theirs / ours).toFixed(1)} times as long`;
  console.log(`analyst with scipy on the same, mean seconds:     ${ratio(analyst.wall, meanOf(wall))}`);
  console.log(`analyst with scipy on the same, mean CPU seconds: ${ratio(analyst.cpu, meanOf(cpu))}`);
}

main();
