/** A push and its controls in words. What a scenario does is said in `push-effect.ts`. */
import type { Push, PushKind } from '../dynamics/push';
import { possessive } from './text';
import { type FirmRole, otherFirm, type Words } from './words';

export type PushField = 'startMonth' | 'lengthMonths' | 'size' | 'rampMonths' | 'carryOverHalfLifeMonths';

const KIND_NAMES: Record<PushKind, string> = {
  recruits: 'recruits',
  'growth-lift': 'growth lift',
  pull: 'pull on the other’s room',
  room: 'more room of its own',
};

export function nameKind(kind: PushKind): string {
  return KIND_NAMES[kind];
}

export function firmOfPush(push: Pick<Push, 'firm'>): FirmRole {
  return push.firm === 1 ? 'focal' : 'rival';
}

/** Label of a control. */
export function labelPushField(words: Words, field: PushField, push: Push): string {
  switch (field) {
    case 'startMonth':
      return `${possessive(words.name(firmOfPush(push)))} push starts`;
    case 'lengthMonths':
      return 'lasts';
    case 'size':
      return push.kind === 'recruits' ? 'recruits per month' : nameKind(push.kind);
    case 'rampMonths':
      return 'ramp-in';
    case 'carryOverHalfLifeMonths':
      return 'carry-over half-life';
  }
}

/** Value of a control: "Mar 2026", "6 months", "for good", "7,500", "+20 %". */
export function spellPushField(words: Words, field: PushField, push: Push): string {
  switch (field) {
    case 'startMonth':
      return words.months.short(words.lastMonth + Math.round(push.startMonth));
    case 'lengthMonths':
      return push.lengthMonths === null ? 'for good' : spellMonths(words, push.lengthMonths);
    case 'size':
      return spellSize(words, push);
    case 'rampMonths':
      return push.rampMonths === 0 ? 'at once' : spellMonths(words, push.rampMonths);
    case 'carryOverHalfLifeMonths':
      return push.carryOverHalfLifeMonths === 0 ? 'none' : spellMonths(words, push.carryOverHalfLifeMonths);
  }
}

/** "Marrowby: recruits, 7,500 a month from Mar 2026 for 6 months, then fading with a half-life of 3 months". */
export function describePush(words: Words, push: Push): string {
  const size = push.kind === 'recruits' ? `${spellSize(words, push)} a month` : spellSize(words, push);
  const start = words.months.short(words.lastMonth + Math.round(push.startMonth));
  const length = push.lengthMonths === null ? 'for good' : `for ${spellMonths(words, push.lengthMonths)}`;
  const fades = push.lengthMonths !== null && push.carryOverHalfLifeMonths > 0;
  const fading = fades
    ? `, then fading with a half-life of ${spellMonths(words, push.carryOverHalfLifeMonths)}`
    : '';
  return `${words.name(firmOfPush(push))}: ${nameKind(push.kind)}, ${size} from ${start} ${length}${fading}`;
}

function spellSize(words: Words, push: Push): string {
  return push.kind === 'recruits' ? words.numbers.number(push.size) : `+${words.numbers.percent(push.size)}`;
}

function spellMonths(words: Words, months: number): string {
  return `${words.numbers.number(months)} ${months === 1 ? 'month' : 'months'}`;
}

/** Who pushes, for headings: "Marrowby’s push", "2 pushes by Quillfern and Marrowby". */
export function namePushes(words: Words, pushes: readonly Push[]): string {
  if (pushes.length === 0) return 'No push';
  const firms = [...new Set(pushes.map(firmOfPush))];
  if (pushes.length === 1) return `${possessive(words.name(firms[0]!))} push`;
  const names =
    firms.length === 1
      ? words.name(firms[0]!)
      : `${words.name(firms[0]!)} and ${words.name(otherFirm(firms[0]!))}`;
  return `${pushes.length} pushes by ${names}`;
}
