import { describe, expect, it } from 'vitest';
import { buildBrief } from '@/lib/brief/build-brief';
import { plainText } from '@/lib/brief/text';
import { createTrajectory } from '@/lib/dynamics/trajectory';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { createOutlookRun } from '@/lib/forecast/outlook-run';
import { COEXISTING, FIRST_MONTH, toTheta } from '../estimate/simulated-market';
import { makeSample } from './sample-report';

const MONTHS = 36;
const EXIT = 26;

/** A market that the focal firm leaves, fitted. */
function briefOfExit() {
  const path = createTrajectory({ months: MONTHS, entry1: 0, entry2: 0, exit1: EXIT });
  path.run(toTheta(COEXISTING));
  const round = (logLevel: Float64Array) =>
    Array.from(logLevel, (value, t) => Math.round(Math.exp(value) * (1 + 0.01 * Math.sin(5 * t * t))));
  const series = { firstMonth: FIRST_MONTH, focal: round(path.logLevel1), rival: round(path.logLevel2) };
  const run = createOutlookRun({ series, options: DEFAULT_FIT_OPTIONS });
  let step = run.next();
  while (!step.done) step = run.next();
  if (!('report' in step)) throw new Error(step.failure);
  const { facts } = makeSample('coexistence');
  return { facts, report: step.report, brief: buildBrief({ ...facts, series, report: step.report }) };
}

describe('the brief of a market that a firm has left', () => {
  const { facts, report, brief } = briefOfExit();
  const { focalName, rivalName } = facts.market;

  it('says who has left and when, and no outcome of a contest', () => {
    const { headline, support, decided } = brief.where.verdict;
    expect(plainText(headline)).toBe(`${focalName} has left this market; ${rivalName} goes on alone.`);
    expect(decided).toBeNull();
    expect(report.outlook.decided).toBeNull();
    const text = support.map(plainText).join(' ');
    expect(text).toContain(`${focalName} has had no users since March 2022`);
    expect(text).toContain(`${rivalName} is near`);
    expect(text).toContain(`if ${focalName} came back`);
  });

  it('forecasts no users of it and all of the market for the other', () => {
    const { levels, observations, destination, overtaking } = report.outlook;
    for (const bands of [levels, observations]) {
      expect(Math.max(...bands.focal.q95)).toBe(0);
      expect(Math.max(...bands.share.q95)).toBe(0);
    }
    expect(destination.focal.q95).toBe(0);
    expect(Math.abs(destination.rival.q50 / COEXISTING.k2 - 1)).toBeLessThan(0.1);
    expect([overtaking.overtaker, overtaking.chance]).toEqual(['focal', 0]);
    expect(brief.where.milestones.map(({ id }) => id)).not.toContain('overtaking');
  });

  it('draws no number that is none', () => {
    expect(JSON.stringify(brief)).not.toMatch(/NaN|Infinity|undefined/);
  });
});
