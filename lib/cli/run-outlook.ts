/**
 * Drives the engine to its end in this process and says how far it is while somebody watches.
 */
import type { FitInput, FitProgress } from '../estimate/types';
import { createOutlookRun, type OutlookStep } from '../forecast/outlook-run';

export type OutlookEnd = Extract<OutlookStep, { done: true }>;

export function runOutlook(input: FitInput, onProgress: (progress: FitProgress) => void): OutlookEnd {
  const run = createOutlookRun(input);
  for (;;) {
    const step = run.next();
    if (step.done) return step;
    onProgress(step.progress);
  }
}

/** One line of true numbers: "starts 7 of 12", then "draws 1,200 of 4,000, R-hat 1.02". */
export function describeProgress(progress: FitProgress): string {
  const { stage, startsDone, startsTotal, drawsKept, drawsTarget, rHat } = progress;
  if (stage === 'starts' || stage === 'polish') return `starts ${startsDone} of ${startsTotal}`;
  if (stage === 'outlook') return 'outlook';
  const agreement = rHat === null ? '' : `, R-hat ${rHat.toFixed(3)}`;
  return `${stage}: draws ${drawsKept} of ${drawsTarget}${agreement}`;
}
