/**
 * The scenario as its controls hold it: pushes by either firm, one of them open for editing, and what is assumed to count money; with
 * its history, so that every step can be undone. Steps of one slider are one step.
 */
import { spellPushField } from '@/lib/brief/push-words';
import type { Words } from '@/lib/brief/words';
import type { PushKind } from '@/lib/dynamics/push';
import type { Money } from '@/lib/scenario/money';
import { MAX_PUSHES } from '@/lib/scenario/push-bounds';
import { firstPush, limitsForPush, type MarketScale } from '@/lib/scenario/push-limits';
import { type PricedPush, settleSize } from '@/lib/scenario/spend';
import { cutText } from '@/lib/series/clean-name';
import { MAX_NAME_LENGTH } from '@/lib/series/limits';

export interface ScenarioDraft {
  pushes: PricedPush[];
  /** Index of the push under the controls. */
  open: number;
  /** null: no money is counted. */
  money: Money | null;
}

export interface DraftHistory {
  past: ScenarioDraft[];
  now: ScenarioDraft;
  future: ScenarioDraft[];
  /** What the last step changed; the next one of the same kind is part of it. null: nothing to join. */
  lastStep: string | null;
}

/** Steps that can be undone. */
const MAX_PAST = 100;

/** The rival's recruits for some months: what most people fear. */
export function firstDraft(scale: MarketScale): ScenarioDraft {
  return { pushes: [firstPush(2, 'recruits', scale)], open: 0, money: null };
}

export function startHistory(now: ScenarioDraft): DraftHistory {
  return { past: [], now, future: [], lastStep: null };
}

/** @param step names what is changed: "0 size" joins the last step when that changed the same; null joins nothing */
export function takeStep(history: DraftHistory, next: ScenarioDraft, step: string | null): DraftHistory {
  const isSame = step !== null && step === history.lastStep;
  const past = isSame ? history.past : [...history.past, history.now].slice(-MAX_PAST);
  return { past, now: next, future: [], lastStep: step };
}

export function undo({ past, now, future }: DraftHistory): DraftHistory | null {
  const before = past.at(-1);
  return before ? { past: past.slice(0, -1), now: before, future: [now, ...future], lastStep: null } : null;
}

export function redo({ past, now, future }: DraftHistory): DraftHistory | null {
  const [after, ...later] = future;
  return after ? { past: [...past, now], now: after, future: later, lastStep: null } : null;
}

/** Changes the open push; a spend that buys recruits sets the size. */
export function editPush(draft: ScenarioDraft, change: Partial<PricedPush>): ScenarioDraft {
  const pushes = draft.pushes.map((push, index) =>
    index === draft.open ? settleSize({ ...push, ...change }) : push,
  );
  return { ...draft, pushes };
}

/** Another kind begins at its own first size, without a price; when and how long stay. */
export function changeKind(draft: ScenarioDraft, kind: PushKind, scale: MarketScale): ScenarioDraft {
  const { first } = limitsForPush(kind, scale).size;
  return editPush(draft, { kind, size: first, response: undefined });
}

export function canAdd({ pushes }: ScenarioDraft): boolean {
  return pushes.length < MAX_PUSHES;
}

/** The new push is the open one. */
export function addPush(draft: ScenarioDraft, push: PricedPush): ScenarioDraft {
  return canAdd(draft) ? { ...draft, pushes: [...draft.pushes, push], open: draft.pushes.length } : draft;
}

/** A scenario may be empty: then nothing is pushed. */
export function removeOpen({ pushes, open, money }: ScenarioDraft): ScenarioDraft {
  const left = pushes.filter((_, index) => index !== open);
  return { pushes: left, open: Math.max(0, Math.min(open, left.length - 1)), money };
}

/** Pushes that push: those of size 0 are left out. */
export function listPushes({ pushes }: ScenarioDraft): PricedPush[] {
  return pushes.filter(({ size }) => size > 0);
}

/** "Marrowby, 5,000 recruits a month, from Mar 2026, 6 months": a name for the scenario, cut to what a name may have. */
export function nameScenario(words: Words, pushes: readonly PricedPush[]): string {
  const [push, ...more] = pushes;
  if (!push) return '';
  const name = more.length > 0 ? `${namePush(words, push)} and ${more.length} more` : namePush(words, push);
  return cutText(name, MAX_NAME_LENGTH);
}

/** The push in as many words as a tab has room for. */
export function namePush(words: Words, push: PricedPush): string {
  const size = spellPushField(words, 'size', push);
  return [
    words.name(push.firm === 1 ? 'focal' : 'rival'),
    SIZES[push.kind](size),
    `from ${spellPushField(words, 'startMonth', push)}`,
    spellPushField(words, 'lengthMonths', push),
  ].join(', ');
}

const SIZES: Record<PushKind, (size: string) => string> = {
  recruits: (size) => `${size} recruits a month`,
  'growth-lift': (size) => `growth ${size}`,
  pull: (size) => `pull ${size}`,
  room: (size) => `room ${size}`,
};
