/**
 * User counts as people write them: 1234, 1,234, 1 234, 1'234, 1.234.567, 12.5k, 1.2M, 13,75, 1.2E+05.
 * A lone mark before exactly three digits (1,234) could group thousands or start a fraction: both readings are kept, and the
 * column settles them when another cell proves the decimal mark (13,75 or 1,234,567). Otherwise nobody guesses.
 */
import { MAX_COUNT } from './limits';
import type { DecimalMark } from './types';

export type CountReading =
  | { kind: 'count'; value: number }
  | { kind: 'missing' }
  | { kind: 'ambiguous'; point: number; comma: number }
  | { kind: 'unreadable' };

/** The value under each decimal mark that is possible. */
interface BothReadings {
  point: number | null;
  comma: number | null;
}

// biome-ignore format: one line per kind
const MISSING = new Set([
  '', '-', '--', '–', '—', '.', '..', '...', '?', 'x',
  'n/a', 'na', 'n.a.', 'n.a', 'nan', 'null', 'nil', 'none', 'missing', 'unknown', 'tbd', 'tbc', 'k. a.', 'k.a.',
  '#n/a', '#na', '#value!', '#ref!', '#div/0!',
]);

/** Powers of ten of the words and letters that may follow a number. */
// biome-ignore format: one line per size
const SUFFIX_EXPONENTS: Record<string, number> = {
  k: 3, tsd: 3, thousand: 3,
  m: 6, mm: 6, mn: 6, mio: 6, mln: 6, million: 6, millions: 6,
  b: 9, bn: 9, mrd: 9, billion: 9,
};

/** Thousands grouped by spaces (thin and fixed ones too) or apostrophes, which never start a fraction. */
const SPACED_THOUSANDS = /^\d{1,3}(?:[ \u00a0\u2009\u202f'’]\d{3})+(?!\d)/;

/** Digits, or groups of three; with commas also groups of two before the last three, as on the Indian subcontinent. */
const PLAIN_NUMBER: Record<DecimalMark, RegExp> = {
  point: /^(?:\d+|[1-9]\d{0,2}(?:,\d{3})+|[1-9]\d?(?:,\d{2})+,\d{3})?(?:\.\d+)?$/,
  comma: /^(?:\d+|[1-9]\d{0,2}(?:\.\d{3})+)?(?:,\d+)?$/,
};

const NUMBER_WITH_SIZE = /^([\d.,]*\d)(?:e([+-]?\d{1,3})|\s*([a-z]+)\.?)?$/i;

/** One text by itself. */
export function readCountText(text: string): CountReading {
  return settleCount(text, null);
}

/** One reading per text, in the same order. `mark` is the answer of a person; without it the column must prove its mark. */
export function readCountColumn(texts: readonly string[], mark?: DecimalMark): CountReading[] {
  const settled = mark ?? provenMark(texts);
  return texts.map((text) => settleCount(text, settled));
}

/** The decimal mark that the cells prove; null when none does, or when they contradict each other. */
export function provenMark(texts: readonly string[]): DecimalMark | null {
  const marks = new Set<DecimalMark>();
  for (const text of texts) {
    const { point, comma } = readBothWays(text);
    if (point !== null && comma === null) marks.add('point');
    if (comma !== null && point === null) marks.add('comma');
  }
  return marks.size === 1 ? [...marks][0] : null;
}

function settleCount(text: string, mark: DecimalMark | null): CountReading {
  if (MISSING.has(text.trim().toLowerCase())) return { kind: 'missing' };
  const { point, comma } = readBothWays(text);
  if (point !== null && comma !== null && point !== comma) {
    return mark === null ? { kind: 'ambiguous', point, comma } : asCount(mark === 'point' ? point : comma);
  }
  return asCount(point ?? comma);
}

function asCount(value: number | null): CountReading {
  return value !== null && Math.abs(value) <= MAX_COUNT ? { kind: 'count', value } : { kind: 'unreadable' };
}

function readBothWays(text: string): BothReadings {
  const trimmed = text.trim().replace('−', '-');
  const bracketed = /^\((.*)\)$/.exec(trimmed);
  const sign = bracketed || trimmed.startsWith('-') ? -1 : 1;
  const unsigned = (bracketed ? bracketed[1] : trimmed.replace(/^[+-]\s*/, '')).trim();
  const match = NUMBER_WITH_SIZE.exec(
    unsigned.replace(SPACED_THOUSANDS, (group) => group.replace(/\D/g, '')),
  );
  if (!match) return { point: null, comma: null };

  const [, digits, power, suffix] = match;
  const exponent = power ?? (suffix === undefined ? 0 : SUFFIX_EXPONENTS[suffix.toLowerCase()]);
  const read = (mark: DecimalMark) => {
    if (exponent === undefined || !PLAIN_NUMBER[mark].test(digits)) return null;
    return sign * Number(`${toPlainDigits(digits, mark)}e${exponent}`) + 0;
  };
  return { point: read('point'), comma: read('comma') };
}

/** Thousands marks out, a point for the fraction. */
function toPlainDigits(digits: string, mark: DecimalMark): string {
  return mark === 'point' ? digits.replaceAll(',', '') : digits.replaceAll('.', '').replace(',', '.');
}
