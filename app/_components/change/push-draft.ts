/**
 * The push as its controls hold it: a size for each kind, so that switching the kind and back loses nothing.
 * Months count from the last observed month; recruits are users a month, the lift a fraction.
 */
import type { MonthFormat } from '@/lib/brief/month-words';
import type { NumberFormat } from '@/lib/brief/number-format';
import type { Push } from '@/lib/dynamics/push';
import type { PushMarket } from './push-market';

export type DraftKind = 'growth-lift' | 'recruits';

export interface PushDraft {
  firm: 'focal' | 'rival';
  kind: DraftKind;
  startMonth: number;
  isLasting: boolean;
  lengthMonths: number;
  recruits: number;
  lift: number;
  carryOverHalfLifeMonths: number;
}

/** Ranges of the controls. */
export const RANGES = {
  startMonth: { min: 0, max: 24, step: 1 },
  lengthMonths: { min: 1, max: 36, step: 1 },
  liftPercent: { min: 0, max: 100, step: 1 },
  carryOverHalfLifeMonths: { min: 0, max: 12, step: 0.5 },
} as const;

/** Recruits a month reach this share of the larger firm. */
const MOST_RECRUITS_SHARE = 0.2;
/** A first push: recruits of this share of the rival's users a month. */
const FIRST_RECRUITS_SHARE = 0.03;
const RECRUIT_STEPS = 100;

export function rangeOfRecruits({ lastUsers }: PushMarket): { min: number; max: number; step: number } {
  const most = MOST_RECRUITS_SHARE * Math.max(lastUsers.focal, lastUsers.rival, 1);
  const step = roundStep(most / RECRUIT_STEPS);
  return { min: 0, max: Math.ceil(most / step) * step, step };
}

/** The nearest 1, 2 or 5 times a power of ten, at least 1. */
function roundStep(value: number): number {
  const power = 10 ** Math.floor(Math.log10(Math.max(value, 1)));
  const factor = [1, 2, 5, 10].find((candidate) => candidate * power >= value) ?? 10;
  return Math.max(1, factor * power);
}

export function firstDraft(market: PushMarket): PushDraft {
  const { step, max } = rangeOfRecruits(market);
  const recruits = Math.round((FIRST_RECRUITS_SHARE * market.lastUsers.rival) / step) * step;
  return {
    firm: 'rival',
    kind: 'recruits',
    startMonth: 3,
    isLasting: false,
    lengthMonths: 6,
    recruits: Math.min(Math.max(recruits, step), max),
    lift: 0.2,
    carryOverHalfLifeMonths: 3,
  };
}

/** null when the size is 0: nothing is pushed. */
export function toPush(draft: PushDraft): Push | null {
  const size = draft.kind === 'recruits' ? draft.recruits : draft.lift;
  if (!(size > 0)) return null;
  return {
    firm: draft.firm === 'focal' ? 1 : 2,
    kind: draft.kind,
    startMonth: draft.startMonth,
    lengthMonths: draft.isLasting ? null : draft.lengthMonths,
    size,
    rampMonths: 0,
    carryOverHalfLifeMonths: draft.isLasting ? 0 : draft.carryOverHalfLifeMonths,
  };
}

/** A stored push back into the controls; null for a kind that they do not offer. */
export function fromPush(push: Push, known: PushDraft): PushDraft | null {
  if (push.kind !== 'recruits' && push.kind !== 'growth-lift') return null;
  return {
    firm: push.firm === 1 ? 'focal' : 'rival',
    kind: push.kind,
    startMonth: push.startMonth,
    isLasting: push.lengthMonths === null,
    lengthMonths: push.lengthMonths ?? known.lengthMonths,
    recruits: push.kind === 'recruits' ? push.size : known.recruits,
    lift: push.kind === 'growth-lift' ? push.size : known.lift,
    carryOverHalfLifeMonths:
      push.lengthMonths === null ? known.carryOverHalfLifeMonths : push.carryOverHalfLifeMonths,
  };
}

/** "Marrowby, 5,000 recruits a month, Mar 2026, 6 months": a name for the scenario. */
export function wordPush(
  draft: PushDraft,
  market: PushMarket,
  numbers: NumberFormat,
  months: MonthFormat,
): string {
  const firm = draft.firm === 'focal' ? market.focalName : market.rivalName;
  const size =
    draft.kind === 'recruits'
      ? `${Math.round(draft.recruits).toLocaleString(numbers.locale)} recruits a month`
      : `growth +${Math.round(100 * draft.lift)}\u00a0%`;
  const start = months.short(market.lastMonth + draft.startMonth);
  const length = draft.isLasting
    ? 'for good'
    : `${draft.lengthMonths} ${draft.lengthMonths === 1 ? 'month' : 'months'}`;
  return `${firm}, ${size}, from ${start}, ${length}`;
}
