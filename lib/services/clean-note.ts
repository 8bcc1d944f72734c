/**
 * Free text of people, made safe to store and to show: no control characters but line breaks, no characters that turn the
 * direction of what follows, no lone halves of surrogate pairs. Everything else stays as it was typed.
 */

/** Control characters but line feed, marks that override the direction, lone surrogates. */
const UNSAFE = /(?!\n)\p{Cc}|[\u202a-\u202e\u2066-\u2069]|\p{Cs}/gu;

export function cleanNote(text: string): string {
  return text.replace(/\r\n?/g, '\n').replace(/\t/g, ' ').replace(UNSAFE, '').trim();
}
