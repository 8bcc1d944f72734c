/**
 * Ready-made pushes by what a firm does, as plain values to be edited. They are places to start from, not findings: sizes come from the
 * ranges of the controls, lengths and fading from common practice where `basis` says so. `lib/brief/push-kind-words.ts` has their words.
 */
import type { Firm } from '../dynamics/system';
import { limitsForPush, type MarketScale } from './push-limits';
import type { PricedPush } from './spend';

export const STARTING_POINTS = [
  'price-promotion',
  'advertising-burst',
  'new-region',
  'poaching-feature',
] as const;
export type StartingPointId = (typeof STARTING_POINTS)[number];

/** Whether how long it lasts and fades follows common practice, or is a plain value to start from. Sizes are always the latter. */
export type StartingBasis = 'common-practice' | 'starting-value';

export interface StartingPoint {
  id: StartingPointId;
  basis: StartingBasis;
  push: PricedPush;
}

type Shape = Pick<
  PricedPush,
  'kind' | 'startMonth' | 'lengthMonths' | 'rampMonths' | 'carryOverHalfLifeMonths'
>;

const SHAPES: Record<StartingPointId, Shape & { basis: StartingBasis }> = {
  'price-promotion': {
    kind: 'growth-lift',
    startMonth: 1,
    lengthMonths: 3,
    rampMonths: 0,
    carryOverHalfLifeMonths: 1,
    basis: 'starting-value',
  },
  // bursts of a quarter, remembered for a month or two: common practice in media planning
  'advertising-burst': {
    kind: 'recruits',
    startMonth: 1,
    lengthMonths: 3,
    rampMonths: 1,
    carryOverHalfLifeMonths: 2,
    basis: 'common-practice',
  },
  'new-region': {
    kind: 'room',
    startMonth: 6,
    lengthMonths: null,
    rampMonths: 12,
    carryOverHalfLifeMonths: 0,
    basis: 'starting-value',
  },
  'poaching-feature': {
    kind: 'pull',
    startMonth: 3,
    lengthMonths: null,
    rampMonths: 3,
    carryOverHalfLifeMonths: 0,
    basis: 'starting-value',
  },
};

export function buildStartingPoint(id: StartingPointId, firm: Firm, scale: MarketScale): StartingPoint {
  const { basis, ...shape } = SHAPES[id];
  const { size, startMonth } = limitsForPush(shape.kind, scale);
  return {
    id,
    basis,
    push: { firm, ...shape, startMonth: Math.min(shape.startMonth, startMonth.max), size: size.first },
  };
}
