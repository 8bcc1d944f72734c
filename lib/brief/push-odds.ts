/**
 * Odds under a push on the scale of the brief. A comparison runs on a sample of the draws, so its own odds differ a little from those
 * of the outlook; the change between them does not suffer from that, since both come from the same draws (a control variate:
 * Owen 2013, Monte Carlo theory, section 8.9). So: odds of the outlook plus the change.
 */
import { OUTCOMES } from '../forecast/outcomes';
import type { Odds } from '../forecast/report';

/** @returns before: `outlook` as it stands; after: the same plus the change, cut to [0, 1] and summing to 1 */
export function alignOdds(
  outlook: Odds,
  sample: { before: Odds; after: Odds },
): { before: Odds; after: Odds } {
  const after = { ...outlook };
  let sum = 0;
  for (const outcome of OUTCOMES) {
    // What no draw of the sample leads to any more is said as the sample says it.
    const moved = outlook[outcome] + (sample.after[outcome] - sample.before[outcome]);
    after[outcome] = sample.after[outcome] === 0 && sample.before[outcome] > 0 ? 0 : Math.max(0, moved);
    sum += after[outcome];
  }
  for (const outcome of OUTCOMES) after[outcome] /= sum;
  return { before: outlook, after };
}
