import { describe, expect, it } from 'vitest';
import { PUSH_KINDS } from '@/lib/scenario/push-bounds';
import { limitsForPush } from '@/lib/scenario/push-limits';
import { pushSchema } from '@/lib/scenario/push-schema';
import { parseScenario, readScenario, writeScenario } from '@/lib/scenario/scenario-json';
import { buildStartingPoint, STARTING_POINTS } from '@/lib/scenario/starting-points';
import { pushOf } from './draw-cases';

const MONEY = {
  currency: 'EUR',
  marginPerUserMonth: { focal: 2.5, rival: null },
  discountRatePerYear: 0.1,
  months: null,
};
const SCALE = { focalUsers: 30_000, rivalUsers: 20_000, horizonMonths: 24 };

describe('the written form of a scenario', () => {
  it('reads what it writes', () => {
    const pushes = PUSH_KINDS.map((kind, i) => pushOf({ kind, firm: i % 2 === 0 ? 1 : 2 }));
    const written = writeScenario({ name: 'Autumn', pushes, money: MONEY });
    expect(parseScenario(written)).toEqual({
      ok: true,
      value: { version: 1, name: 'Autumn', pushes, money: MONEY },
    });
  });

  it('needs no money', () => {
    expect(readScenario({ version: 1, name: 'A', pushes: [] }).ok).toBe(true);
  });

  it('tells a later release from damage', () => {
    expect(readScenario({ version: 2, name: 'A' })).toEqual({
      ok: false,
      code: 'unknown-version',
      version: 2,
    });
    expect(parseScenario('{"version": 1,')).toEqual({ ok: false, code: 'not-json' });
    for (const json of [null, 7, [], {}, { version: 'one' }, { version: 1, name: ' ', pushes: [] }]) {
      expect(readScenario(json)).toMatchObject({ ok: false, code: 'invalid' });
    }
  });

  it('names the place of every problem', () => {
    const reading = readScenario({
      version: 1,
      name: 'A',
      pushes: [pushOf(), pushOf({ size: -1 }), { ...pushOf(), kind: 'magic' }],
      money: { ...MONEY, discountRatePerYear: -1 },
    });
    if (reading.ok || reading.code !== 'invalid') throw new Error('invalid expected');
    expect(reading.problems.map(({ place }) => place)).toEqual([
      'pushes.1.size',
      'pushes.2.kind',
      'money.discountRatePerYear',
    ]);
  });

  it('refuses fields that it does not know rather than losing them', () => {
    expect(readScenario({ version: 1, name: 'A', pushes: [], budget: 3 })).toMatchObject({
      ok: false,
      code: 'invalid',
    });
  });
});

describe('starting points', () => {
  it.each(STARTING_POINTS)('%s is a push within the range of its controls, for either firm', (id) => {
    for (const firm of [1, 2] as const) {
      const { push } = buildStartingPoint(id, firm, SCALE);
      expect(pushSchema.parse(push)).toEqual(push);
      expect(push.firm).toBe(firm);
      const limits = limitsForPush(push.kind, SCALE);
      for (const field of ['startMonth', 'size', 'rampMonths', 'carryOverHalfLifeMonths'] as const) {
        expect(push[field]).toBeGreaterThanOrEqual(limits[field].min);
        expect(push[field]).toBeLessThanOrEqual(limits[field].max);
      }
      expect(push.size).toBeGreaterThan(0);
    }
  });

  it('covers every kind of push', () => {
    const kinds = STARTING_POINTS.map((id) => buildStartingPoint(id, 1, SCALE).push.kind);
    expect(new Set(kinds)).toEqual(new Set(PUSH_KINDS));
  });
});
