/**
 * Ranges and first values of the controls of a push, by kind and by the market's size. The numbers are starting points for an analyst,
 * chosen to be plausible and easy to move, not findings; `push-bounds.ts` holds the outer limits of what is accepted.
 */

import type { Push, PushKind } from '../dynamics/push';
import type { Firm } from '../dynamics/system';
import { MAX_CARRY_OVER_HALF_LIFE, MAX_PUSH_MONTHS } from './push-bounds';

export interface Range {
  min: number;
  max: number;
  step: number;
  /** Where the control starts. */
  first: number;
}

export interface PushLimits {
  startMonth: Range;
  lengthMonths: Range;
  size: Range;
  rampMonths: Range;
  carryOverHalfLifeMonths: Range;
}

/** How big the market is: users in the last observed month. */
export interface MarketScale {
  focalUsers: number;
  rivalUsers: number;
  horizonMonths: number;
}

/** Largest recruits per month on the control, as part of both firms' users; and where it starts. */
const RECRUITS_MAX_OF_MARKET = 0.1;
const RECRUITS_FIRST_OF_MAX = 0.2;
/** Steps of the recruits control. */
const RECRUITS_STEPS = 100;
/** Relative kinds, as fractions. */
const RELATIVE: Record<Exclude<PushKind, 'recruits'>, Range> = {
  'growth-lift': { min: 0, max: 1, step: 0.01, first: 0.2 },
  pull: { min: 0, max: 1, step: 0.01, first: 0.2 },
  room: { min: 0, max: 1, step: 0.01, first: 0.1 },
};

export function limitsForPush(kind: PushKind, scale: MarketScale): PushLimits {
  const lastMonth = Math.min(MAX_PUSH_MONTHS, scale.horizonMonths);
  return {
    startMonth: { min: 0, max: lastMonth, step: 1, first: Math.min(3, lastMonth) },
    lengthMonths: { min: 1, max: Math.min(MAX_PUSH_MONTHS, 24), step: 1, first: 6 },
    size: kind === 'recruits' ? recruitsRange(scale) : RELATIVE[kind],
    rampMonths: { min: 0, max: 12, step: 1, first: 1 },
    carryOverHalfLifeMonths: { min: 0, max: MAX_CARRY_OVER_HALF_LIFE, step: 1, first: 3 },
  };
}

/** A push at the first values of its controls. */
export function firstPush(firm: Firm, kind: PushKind, scale: MarketScale): Push {
  const limits = limitsForPush(kind, scale);
  return {
    firm,
    kind,
    startMonth: limits.startMonth.first,
    lengthMonths: limits.lengthMonths.first,
    size: limits.size.first,
    rampMonths: limits.rampMonths.first,
    carryOverHalfLifeMonths: limits.carryOverHalfLifeMonths.first,
  };
}

/** A round maximum of 1, 2 or 5 times a power of ten, cut in a hundred steps. Users may be counted in thousands or millions. */
function recruitsRange({ focalUsers, rivalUsers }: MarketScale): Range {
  const max = roundUp(Math.max(RECRUITS_MAX_OF_MARKET * (focalUsers + rivalUsers), Number.MIN_VALUE));
  return { min: 0, max, step: max / RECRUITS_STEPS, first: max * RECRUITS_FIRST_OF_MAX };
}

function roundUp(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value));
  const factor = [1, 2, 5, 10].find((one) => one * power >= value * (1 - 1e-9)) ?? 10;
  return factor * power;
}
