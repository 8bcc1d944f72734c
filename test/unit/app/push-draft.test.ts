/** The push of the controls and the push of the engine: one becomes the other and back. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { firstDraft, fromPush, namePush, type PushDraft, toPush } from '@/app/_components/change/push-draft';
import { createWords } from '@/lib/brief/words';
import { pushSchema } from '@/lib/scenario/push-schema';
import { MAX_NAME_LENGTH } from '@/lib/series/limits';
import { makeSample } from '../brief/sample-report';

const SCALE = { focalUsers: 320_000, rivalUsers: 180_000, horizonMonths: 24 };
const FIRST = firstDraft(SCALE);

const drafts: fc.Arbitrary<PushDraft> = fc.record({
  firm: fc.constantFrom('focal', 'rival'),
  kind: fc.constantFrom('recruits', 'growth-lift'),
  startMonth: fc.integer({ min: 0, max: 24 }),
  isLasting: fc.boolean(),
  lengthMonths: fc.integer({ min: 1, max: 24 }),
  sizes: fc.record({
    recruits: fc.integer({ min: 1, max: 50_000 }),
    'growth-lift': fc.double({ min: 0.01, max: 1, noNaN: true }),
  }),
  carryOverHalfLifeMonths: fc.integer({ min: 0, max: 24 }),
});

describe('toPush and fromPush', () => {
  it('give the same push again, and one that the server accepts', () => {
    fc.assert(
      fc.property(drafts, (draft) => {
        const push = toPush(draft);
        expect(push).not.toBeNull();
        expect(pushSchema.parse(push)).toEqual(push);
        const back = fromPush(push!, FIRST);
        expect(toPush(back!)).toEqual(push);
      }),
    );
  });

  it('push nothing at size 0', () => {
    expect(toPush({ ...FIRST, sizes: { ...FIRST.sizes, recruits: 0 } })).toBeNull();
  });

  it('do not show a push that the controls would change', () => {
    const push = toPush(FIRST)!;
    expect(fromPush({ ...push, kind: 'pull', size: 0.2 }, FIRST)).toBeNull();
    expect(fromPush({ ...push, rampMonths: 2 }, FIRST)).toBeNull();
  });

  it('keep the length and the other size while a push lasts for good', () => {
    const lasting = { ...FIRST, isLasting: true, lengthMonths: 9 };
    const back = fromPush(toPush(lasting)!, lasting)!;
    expect(back).toEqual(lasting);
  });
});

describe('namePush', () => {
  it('names firm, size, start and length, in no more letters than a name may have', () => {
    const { facts } = makeSample('coexistence');
    expect(
      namePush(createWords(facts), toPush({ ...FIRST, sizes: { ...FIRST.sizes, recruits: 5000 } })!),
    ).toBe('Marrowby, 5,000 recruits a month, from Mar 2026, 6 months');
    const long = { ...facts, market: { ...facts.market, rivalName: 'R'.repeat(MAX_NAME_LENGTH) } };
    expect([...namePush(createWords(long), toPush(FIRST)!)].length).toBe(MAX_NAME_LENGTH);
  });
});
