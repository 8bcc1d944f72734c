import { describe, expect, it } from 'vitest';
import { findReason, findReturnMonth, findWorstMonth, nameDestinationEffect } from '@/lib/scenario/effect';
import { pushOf } from './draw-cases';

describe('nameDestinationEffect', () => {
  it.each([
    [0, 'stays'],
    [0.009, 'stays'],
    [0.01, 'may-move'],
    [0.66, 'may-move'],
    [0.661, 'moves'],
    [1, 'moves'],
  ] as const)('%d of the draws: %s', (probability, name) =>
    expect(nameDestinationEffect(probability)).toBe(name),
  );
});

describe('findReason', () => {
  const lasting = pushOf({ lengthMonths: null });
  it.each([
    [[], 0, 0.5, 'no-push'],
    [[pushOf({ size: 0 })], 0, 0.5, 'no-push'],
    [[pushOf()], 0, 0, 'temporary-fades'],
    [[pushOf()], 0.005, 0.5, 'temporary-same-side'],
    [[pushOf()], 0.2, 0.5, 'temporary-crosses'],
    [[pushOf(), lasting], 0.2, 0, 'lasting-crosses'],
    [[lasting], 0, 0, 'lasting-same-outcome'],
  ] as const)('%j, moved %d, head start %d: %s', (pushes, moved, headStart, reason) => {
    expect(findReason(pushes, moved, headStart)).toBe(reason);
  });
});

describe('the worst month and the way back', () => {
  const dip = [0, -0.01, -0.04, -0.02, -0.004, -0.001];

  it('finds the largest difference of either sign', () => {
    expect(findWorstMonth(dip)).toBe(2);
    expect(findWorstMonth([0, 0.01, -0.005])).toBe(1);
    expect(findWorstMonth([0, 0, 0])).toBe(0);
  });

  it('finds the month from which the difference stays within half a point', () => {
    expect(findReturnMonth(dip, 2)).toBe(4);
    expect(findReturnMonth([0, -0.04, -0.001, 0.01, 0.001], 1)).toBe(4);
  });

  it('has no way back when the difference stays, or never left', () => {
    expect(findReturnMonth([0, -0.04, -0.03], 1)).toBeNull();
    expect(findReturnMonth([0, -0.004, 0], 1)).toBeNull();
  });
});
