/** A process of its own that fits what it is given on standard input and prints what identifies every number of the result. */
import { createHash } from 'node:crypto';
import { text } from 'node:stream/consumers';
import type { FitInput } from '@/lib/estimate/types';
import { createOutlookRun, type OutlookRun } from '@/lib/forecast/outlook-run';

type End = Extract<ReturnType<OutlookRun['next']>, { done: true }>;

export function digestOf(end: End): string {
  if (!('report' in end)) return end.failure;
  return createHash('sha256')
    .update(JSON.stringify(end.report))
    .update(Float64Array.from(end.draws.values))
    .digest('hex');
}

if (process.argv[1]?.endsWith('outlook-digest.ts')) {
  for (const input of JSON.parse(await text(process.stdin)) as FitInput[]) {
    const run = createOutlookRun(input);
    let step = run.next();
    while (!step.done) step = run.next();
    console.log(digestOf(step));
  }
}
