import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  FACTOR_RANGE,
  middleRange,
  type PRIOR_IDS,
  toDraft,
  toSettings,
} from '@/app/_components/priors/prior-draft';
import { priorSettingsSchema } from '@/lib/estimate/prior-schema';
import { USUAL_PRIORS } from '@/lib/estimate/priors';

describe('priors in a form', () => {
  it('show the usual ones in plain units', () => {
    const { middles, factors, noCompetition } = toDraft(USUAL_PRIORS);
    // ln r around ln 0.15: e^0.15 - 1 a month; sd 0.8: e^(1.645 x 0.8)
    expect(middles).toEqual({ growth: 0.162, saturation: 1.65, alpha: 1, beta: 1 });
    expect(factors).toEqual({ growth: 3.73, saturation: 4.39, alpha: 3.73, beta: 3.73 });
    expect(noCompetition).toBe(0.2);
  });

  it('are the usual ones still when nothing was touched, and keep what was not touched to the last bit', () => {
    expect(toSettings(toDraft(USUAL_PRIORS), USUAL_PRIORS)).toBeNull();
    const draft = { ...toDraft(USUAL_PRIORS), noCompetition: 0.5 };
    const settings = toSettings(draft, USUAL_PRIORS)!;
    expect(settings).toEqual({ ...USUAL_PRIORS, noCompetition: 0.5 });
    expect(toSettings({ ...draft, noCompetition: 0.2 }, settings)).toBeNull();
  });

  it('are accepted whatever the fields allow, ends included', () => {
    const within = ({ min, max }: { min: number; max: number }) =>
      fc.oneof(fc.constantFrom(min, max), fc.double({ min, max, noNaN: true }));
    const record = (rangeOf: (id: (typeof PRIOR_IDS)[number]) => { min: number; max: number }) =>
      fc.record({
        growth: within(rangeOf('growth')),
        saturation: within(rangeOf('saturation')),
        alpha: within(rangeOf('alpha')),
        beta: within(rangeOf('beta')),
      });
    const anyDraft = fc.record({
      middles: record(middleRange),
      factors: record(() => FACTOR_RANGE),
      noCompetition: fc.double({ min: 0, max: 0.9, noNaN: true }),
    });
    fc.assert(
      fc.property(anyDraft, (draft) => {
        const settings = toSettings(draft, USUAL_PRIORS) ?? USUAL_PRIORS;
        expect(priorSettingsSchema.safeParse(settings).success).toBe(true);
      }),
      { seed: 5 },
    );
  });
});
