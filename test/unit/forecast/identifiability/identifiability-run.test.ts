import { describe, expect, it } from 'vitest';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { thinDraws } from '@/lib/estimate/draws';
import { createIdentifiabilityRun } from '@/lib/forecast/identifiability/identifiability-run';
import { identifiabilityReportSchema } from '@/lib/forecast/identifiability/report';
import { createOutlookRun } from '@/lib/forecast/outlook-run';
import { DEMO_MARKETS } from '@/seed/demo-markets';
import { readDemoSeries } from '@/seed/seed';

const options = { ...DEFAULT_FIT_OPTIONS };

function fitDemo(series: ReturnType<typeof readDemoSeries>) {
  const run = createOutlookRun({ series, options });
  let step = run.next();
  while (!step.done) step = run.next();
  if ('failure' in step) throw new Error(step.failure);
  return { series, options, report: step.report, draws: thinDraws(step.draws, 500) };
}

function analyse(input: ReturnType<typeof fitDemo>) {
  const run = createIdentifiabilityRun(input);
  const progress: { done: number; total: number }[] = [];
  let step = run.next();
  while (!step.done) {
    progress.push(step.progress);
    step = run.next();
  }
  return { step, progress };
}

describe('the analysis of identifiability', () => {
  const input = fitDemo(readDemoSeries(DEMO_MARKETS[0]));

  it('gives every part for a long series, moves on only, and is what its schema says', () => {
    const { step, progress } = analyse(input);
    if (!('result' in step)) throw new Error('no result');
    const report = identifiabilityReportSchema.parse(JSON.parse(JSON.stringify(step.result)));
    expect(report).toEqual(step.result);
    for (const part of Object.values(report)) expect(part).not.toBeNull();
    progress.forEach(({ done, total }, i) => {
      expect(done).toBeLessThanOrEqual(total);
      if (i > 0) expect(done).toBeGreaterThanOrEqual(progress[i - 1].done);
    });
  });

  it('has profile intervals that hold their estimates', () => {
    const { step } = analyse(input);
    if (!('result' in step)) throw new Error('no result');
    for (const { estimate, low, high } of step.result.profiles!) {
      if (estimate === null) continue;
      expect(low ?? Number.NEGATIVE_INFINITY).toBeLessThan(estimate);
      expect(high ?? Number.POSITIVE_INFINITY).toBeGreaterThan(estimate);
    }
  });

  it('does without the plain fits when hardly a month has both firms', () => {
    const rival = input.series.rival.map((count, t) => (t < input.series.rival.length - 4 ? null : count));
    const { step } = analyse({ ...input, series: { ...input.series, rival } });
    if (!('result' in step)) throw new Error('no result');
    expect([step.result.errorScales, step.result.profiles]).toEqual([null, null]);
    expect(step.result.decision).not.toBeNull();
  });

  it('says so when the series cannot be fitted', () => {
    const series = { ...input.series, rival: input.series.rival.map(() => null) };
    expect(analyse({ ...input, series }).step).toEqual({ done: true, failure: 'not-fitted' });
  });
});
