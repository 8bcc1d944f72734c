/** The same seed gives the same numbers, however the work is shared out: over processes, and in slices between those of other fits. */
import { spawn } from 'node:child_process';
import { text } from 'node:stream/consumers';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import type { FitInput } from '@/lib/estimate/types';
import { createOutlookRun } from '@/lib/forecast/outlook-run';
import { createStream } from '@/lib/numeric/random';
import { COEXISTING, RIVAL_LOSES, simulateSeries } from '../estimate/simulated-market';
import { digestOf } from './outlook-digest';

/** Processes start slowly on a busy machine. */
const PATIENCE = 120_000;

const inputOf = (series: FitInput['series'], seed: number): FitInput => ({
  series,
  options: { ...DEFAULT_FIT_OPTIONS, seed },
});
const INPUTS = [
  inputOf(simulateSeries(COEXISTING, 30, 0.03, 1), 1),
  inputOf(simulateSeries(RIVAL_LOSES, 36, 0.03, 2), 2),
  inputOf(simulateSeries(COEXISTING, 24, 0.05, 3), 1),
];

function digestAlone(input: FitInput): string {
  const run = createOutlookRun(input);
  let step = run.next();
  while (!step.done) step = run.next();
  return digestOf(step);
}

/** Slices of all runs in an order that a seed decides. */
function digestsInterleaved(seed: number): string[] {
  const stream = createStream(seed, 0);
  const open = INPUTS.map((input, i) => ({ i, run: createOutlookRun(input) }));
  const digests: string[] = [];
  while (open.length > 0) {
    const at = stream.integer(open.length);
    const step = open[at].run.next();
    if (step.done) digests[open.splice(at, 1)[0].i] = digestOf(step);
  }
  return digests;
}

/** The inputs dealt out to so many processes at once. */
async function digestsOfProcesses(processes: number): Promise<string[]> {
  const program = fileURLToPath(new URL('outlook-digest.ts', import.meta.url));
  const digests: string[] = [];
  await Promise.all(
    Array.from({ length: processes }, async (_, p) => {
      const mine = Array.from(INPUTS.keys()).filter((i) => i % processes === p);
      const child = spawn(process.execPath, ['--import', 'tsx', program], {
        stdio: ['pipe', 'pipe', 'inherit'],
      });
      child.stdin.end(JSON.stringify(mine.map((i) => INPUTS[i])));
      const lines = (await text(child.stdout)).trim().split('\n');
      mine.forEach((i, k) => {
        digests[i] = lines[k];
      });
    }),
  );
  return digests;
}

describe('the numbers of a fit', () => {
  const alone = INPUTS.map(digestAlone);

  it('are results, and differ between markets', () => {
    for (const digest of alone) expect(digest).toMatch(/^[0-9a-f]{64}$/);
    expect(new Set(alone).size).toBe(INPUTS.length);
  });

  it.each([1, 2])('are the same whatever fits run between its slices, order %d', (seed) => {
    expect(digestsInterleaved(seed)).toEqual(alone);
  });

  it.each([1, 3])(
    'are the same from %d processes',
    async (processes) => {
      expect(await digestsOfProcesses(processes)).toEqual(alone);
    },
    PATIENCE,
  );
});
