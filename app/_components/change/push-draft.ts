/**
 * The push as its controls hold it: a size for each kind and a length even while it lasts for good, so that switching and
 * back loses nothing. Units are those of a push: months from the last observed one, users a month or a fraction.
 */
import { spellPushField } from '@/lib/brief/push-words';
import type { Words } from '@/lib/brief/words';
import type { Push } from '@/lib/dynamics/push';
import { limitsForPush, type MarketScale, type PushLimits } from '@/lib/scenario/push-limits';
import { cutText } from '@/lib/series/clean-name';
import { MAX_NAME_LENGTH } from '@/lib/series/limits';

export type DraftKind = 'growth-lift' | 'recruits';

export interface PushDraft {
  firm: 'focal' | 'rival';
  kind: DraftKind;
  startMonth: number;
  isLasting: boolean;
  lengthMonths: number;
  sizes: Record<DraftKind, number>;
  carryOverHalfLifeMonths: number;
}

export function limitsOf(draft: Pick<PushDraft, 'kind'>, scale: MarketScale): PushLimits {
  return limitsForPush(draft.kind, scale);
}

/** The rival's recruits for some months, at the first values of the controls. */
export function firstDraft(scale: MarketScale): PushDraft {
  const limits = limitsForPush('recruits', scale);
  return {
    firm: 'rival',
    kind: 'recruits',
    startMonth: limits.startMonth.first,
    isLasting: false,
    lengthMonths: limits.lengthMonths.first,
    sizes: { recruits: limits.size.first, 'growth-lift': limitsForPush('growth-lift', scale).size.first },
    carryOverHalfLifeMonths: limits.carryOverHalfLifeMonths.first,
  };
}

/** null when the size is 0: nothing is pushed. */
export function toPush(draft: PushDraft): Push | null {
  const size = draft.sizes[draft.kind];
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

/** A stored push back into the controls; null for one that they cannot show. */
export function fromPush(push: Push, known: PushDraft): PushDraft | null {
  if ((push.kind !== 'recruits' && push.kind !== 'growth-lift') || push.rampMonths !== 0) return null;
  const isLasting = push.lengthMonths === null;
  return {
    firm: push.firm === 1 ? 'focal' : 'rival',
    kind: push.kind,
    startMonth: push.startMonth,
    isLasting,
    lengthMonths: push.lengthMonths ?? known.lengthMonths,
    sizes: { ...known.sizes, [push.kind]: push.size },
    carryOverHalfLifeMonths: isLasting ? known.carryOverHalfLifeMonths : push.carryOverHalfLifeMonths,
  };
}

/** "Marrowby, 5,000 recruits a month, from Mar 2026, 6 months": a name for the scenario, cut to what a name may have. */
export function namePush(words: Words, push: Push): string {
  const size = spellPushField(words, 'size', push);
  const parts = [
    words.name(push.firm === 1 ? 'focal' : 'rival'),
    push.kind === 'recruits' ? `${size} recruits a month` : `growth ${size}`,
    `from ${spellPushField(words, 'startMonth', push)}`,
    spellPushField(words, 'lengthMonths', push),
  ];
  return cutText(parts.join(', '), MAX_NAME_LENGTH);
}
