import { describe, expect, it } from 'vitest';
import { alignOdds } from '@/lib/brief/push-odds';

const outlook = { coexistence: 0.06, exclusionByFocal: 0.09, exclusionByRival: 0, headStartDecides: 0.85 };
const sampled = { coexistence: 0.06, exclusionByFocal: 0.11, exclusionByRival: 0, headStartDecides: 0.83 };

describe('odds under a push, on the scale of the brief', () => {
  it('are those of the brief, to the last digit, when the push changes none', () => {
    expect(alignOdds(outlook, { before: sampled, after: sampled })).toEqual({
      before: outlook,
      after: outlook,
    });
  });

  it('differ from them by what the push changes in the sample', () => {
    const after = { ...sampled, exclusionByFocal: 0.21, headStartDecides: 0.73 };
    const aligned = alignOdds(outlook, { before: sampled, after });
    expect(aligned.after.exclusionByFocal).toBeCloseTo(0.19, 12);
    expect(aligned.after.headStartDecides).toBeCloseTo(0.75, 12);
  });

  it('stay odds when the change is larger than the odds themselves', () => {
    const after = { coexistence: 0, exclusionByFocal: 1, exclusionByRival: 0, headStartDecides: 0 };
    const aligned = alignOdds(
      { ...outlook, coexistence: 0.03, headStartDecides: 0.88 },
      { before: sampled, after },
    );
    const values = Object.values(aligned.after);
    expect(Math.min(...values)).toBe(0);
    expect(values.reduce((sum, value) => sum + value, 0)).toBeCloseTo(1, 12);
    expect(aligned.after.exclusionByFocal).toBeGreaterThan(0.99);
  });
});
