import { expect, test } from 'vitest';
import { describeProgress } from '@/lib/cli/run-outlook';
import type { FitProgress } from '@/lib/estimate/types';

const begun: FitProgress = {
  stage: 'starts',
  startsDone: 3,
  startsTotal: 12,
  bestValue: 4.2,
  drawsKept: 0,
  drawsTarget: 4000,
  rHat: null,
  ess: null,
};

test.each([
  [{}, 'starts 3 of 12'],
  [{ stage: 'sampling', drawsKept: 800 }, 'sampling: draws 800 of 4000'],
  [{ stage: 'sampling', drawsKept: 800, rHat: 1.0234 }, 'sampling: draws 800 of 4000, R-hat 1.023'],
  [{ stage: 'outlook', drawsKept: 4000 }, 'outlook'],
] as const)('progress is told in numbers that exist: %j', (change, line) => {
  expect(describeProgress({ ...begun, ...change })).toBe(line);
});
