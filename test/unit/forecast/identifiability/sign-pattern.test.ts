import { describe, expect, it } from 'vitest';
import { createMonthFlow } from '@/lib/dynamics/month-flow';
import { readObservations } from '@/lib/estimate/observations';
import { buildPriors } from '@/lib/estimate/priors';
import { SIGN_PATTERNS, type SignPatternId } from '@/lib/forecast/identifiability/report';
import { computeSignPattern } from '@/lib/forecast/identifiability/sign-pattern';
import { createStream } from '@/lib/numeric/random';

const K = 1000;
const MONTHS = 45;
const POINT = [0.2, 0.2, K, K, 0.5, 0.5, 40, 60];

/** Counts of a market with coefficients of either sign and 1 % errors. */
function simulate(alpha: number, beta: number) {
  const flow = createMonthFlow(1);
  flow.setParameters(0.25, 0.18, alpha, beta);
  flow.state.set([40 / K, 60 / K]);
  const stream = createStream(11, 0);
  const focal: number[] = [];
  const rival: number[] = [];
  for (let t = 0; t < MONTHS; t++) {
    focal.push(K * flow.state[0] * Math.exp(0.01 * stream.normal()));
    rival.push(K * flow.state[1] * Math.exp(0.01 * stream.normal()));
    flow.advance(0);
  }
  const reading = readObservations({ firstMonth: 0, focal, rival });
  if (!reading.ok) throw new Error(reading.status);
  return reading.observations;
}

const found = new Map<string, ReturnType<typeof computeSignPattern>>();

function findPattern(alpha: number, beta: number) {
  const key = `${alpha} ${beta}`;
  if (!found.has(key)) {
    const observations = simulate(alpha, beta);
    const priors = buildPriors(observations);
    found.set(
      key,
      computeSignPattern({ observations, priors, floors: [0.003, 0.003], point: POINT, seed: 1 }),
    );
  }
  return found.get(key)!;
}

const CASES: [SignPatternId, number, number][] = [
  ['competition', 0.6, 0.7],
  ['oneSided', 0.6, 0],
  ['predatorPrey', 0.6, -0.4],
  ['mutualHelp', -0.4, -0.5],
  ['oneSidedHelp', 0, -0.4],
  ['none', 0, 0],
];

describe('sign pattern', () => {
  it.each(CASES)('%s is found in counts that were made by it', (wanted, alpha, beta) => {
    const pattern = findPattern(alpha, beta);
    expect(pattern.patterns.map(({ id }) => id)).toEqual([...SIGN_PATTERNS]);
    expect(pattern.patterns.find(({ id }) => id === wanted)!.odds).toBeGreaterThan(0.8);
    // the 90 % interval, twice as wide: some 99.9 %
    const within = ({ q05, q50, q95 }: typeof pattern.alpha, truth: number) =>
      truth > q50 - 2 * (q50 - q05) && truth < q50 + 2 * (q95 - q50);
    expect(within(pattern.alpha, alpha) && within(pattern.beta, beta)).toBe(true);
  });

  it('has odds that add to 1, after the data and before', () => {
    const { patterns, cells } = findPattern(0.6, 0);
    for (const rows of [patterns, cells]) {
      for (const key of ['odds', 'prior'] as const) {
        expect(rows.reduce((sum, row) => sum + row[key], 0)).toBeCloseTo(1, 9);
      }
    }
  });

  it('turns with the firms', () => {
    const { cells } = findPattern(0.6, -0.4);
    expect(
      cells.find(({ onFocal, onRival }) => onFocal === 'takes' && onRival === 'gives')!.odds,
    ).toBeGreaterThan(0.8);
  });
});
