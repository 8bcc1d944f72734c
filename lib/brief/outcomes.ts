/** The four outcomes: which one is decided, who wins, what each is called and coloured. */
import { OUTCOMES, type Outcome } from '../forecast/outcomes';
import type { Odds, Outlook } from '../forecast/report';
import type { Tone } from './types';
import type { FirmRole, Words } from './words';

const TONES: Record<Outcome, Tone> = {
  coexistence: 'both',
  exclusionByFocal: 'focal',
  exclusionByRival: 'rival',
  headStartDecides: 'headStart',
};

export function toneOfOutcome(outcome: Outcome): Tone {
  return TONES[outcome];
}

/** Outcomes from the best odds to the worst; equal ones in the order of OUTCOMES. */
export function rankOutcomes(odds: Odds): Outcome[] {
  return [...OUTCOMES].sort((a, b) => odds[b] - odds[a]);
}

/** Who squeezes whom out; null when nobody does, or when the head start decides who. */
export function winnerOf(outcome: Outcome): FirmRole | null {
  if (outcome === 'exclusionByFocal') return 'focal';
  return outcome === 'exclusionByRival' ? 'rival' : null;
}

/** "both stay", "Quillfern alone", "head start decides". */
export function labelOutcome(words: Pick<Words, 'name'>, outcome: Outcome): string {
  const winner = winnerOf(outcome);
  if (winner) return `${words.name(winner)} alone`;
  return outcome === 'coexistence' ? 'both stay' : 'head start decides';
}

/** As the subject of a sentence: "both firms staying", "Quillfern alone staying", "the head start deciding". */
export function subjectOutcome(words: Words, outcome: Outcome): string {
  const winner = winnerOf(outcome);
  if (winner) return `${words.name(winner)} alone staying`;
  return outcome === 'coexistence' ? 'both firms staying' : 'the head start deciding';
}

/** Chances over draws that the rival takes all of the focal firm's room (alpha > 1), and the reverse (beta > 1). */
export function chancesOfTakingAll(odds: Odds): { alpha: number; beta: number } {
  return {
    alpha: Math.min(1, odds.exclusionByRival + odds.headStartDecides),
    beta: Math.min(1, odds.exclusionByFocal + odds.headStartDecides),
  };
}

/** Who is left in the end, the head start played out; null when no draws tell who is ahead. */
export function chancesOfBeingAlone({
  odds,
  headStartFocalAhead,
}: Outlook): { focal: number; rival: number } | null {
  if (headStartFocalAhead === null && odds.headStartDecides > 0) return null;
  const ahead = headStartFocalAhead ?? 0;
  return {
    focal: Math.min(1, odds.exclusionByFocal + odds.headStartDecides * ahead),
    rival: Math.min(1, odds.exclusionByRival + odds.headStartDecides * (1 - ahead)),
  };
}
