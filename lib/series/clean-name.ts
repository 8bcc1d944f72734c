/**
 * Names as they stand in a header or a field, made safe to show and to compare: one line, no invisible or direction-changing
 * characters, the apostrophe that shields a spreadsheet formula taken off again, cut to MAX_NAME_LENGTH.
 */
import { MAX_NAME_LENGTH } from './limits';

/** First characters that make a spreadsheet read a cell as a formula; the wide forms are read so too. */
export const FORMULA_START = /^[=+\-@\t\r＝＋－＠]/;

/** Control and format characters (zero-width, direction marks) and lone halves of surrogate pairs. */
const INVISIBLE = /[\p{Cc}\p{Cf}\p{Cs}]/gu;

export function cleanName(text: string): string {
  const oneLine = text.replace(/\s+/g, ' ').replace(INVISIBLE, '').replace(/ {2,}/g, ' ').trim();
  const unshielded =
    oneLine.startsWith("'") && FORMULA_START.test(oneLine.slice(1)) ? oneLine.slice(1) : oneLine;
  return cutText(unshielded.trim(), MAX_NAME_LENGTH);
}

/** At most `length` characters; a longer text ends with an ellipsis. Never cuts a character in half. */
export function cutText(text: string, length: number): string {
  const characters = [...text];
  return characters.length <= length ? text : `${characters.slice(0, length - 1).join('')}…`;
}
