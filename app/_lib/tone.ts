/** The colour tokens (tokens.css) of each tone that a brief names. Values are CSS, for `fill`, `stroke` and `color`. */
import type { Tone } from '@/lib/brief/types';

const MARKS: Record<Tone, string> = {
  focal: 'var(--focal)',
  rival: 'var(--rival)',
  both: 'var(--both)',
  headStart: 'var(--head-start)',
  ink: 'var(--ink)',
  quiet: 'var(--ink-2)',
};

/** For lines, marks and areas. */
export function markColour(tone: Tone): string {
  return MARKS[tone];
}

/** For letters: the same, darkened where the mark's colour is too light to read. */
export function textColour(tone: Tone): string {
  return tone === 'headStart' ? 'var(--head-start-text)' : MARKS[tone];
}
