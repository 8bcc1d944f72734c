/**
 * The text of the file that the command names. Every way of not getting it is one sentence.
 */
import { readFileSync, statSync } from 'node:fs';
import { decodeText } from '../series/decode-text';
import { MAX_TEXT_LENGTH } from '../series/limits';

export type InputReading = { ok: true; text: string } | { ok: false; message: string };

/** Name of standard input. */
const STANDARD_INPUT = '-';

/** Characters of up to four bytes; a larger file cannot be within the limit of characters. */
const MAX_BYTES = 4 * MAX_TEXT_LENGTH;

export function readInput(file: string): InputReading {
  try {
    if (file === STANDARD_INPUT) return { ok: true, text: decodeText(readFileSync(0)) };
    const { size } = statSync(file);
    if (size > MAX_BYTES)
      return { ok: false, message: `${file} is too large (${size} bytes; at most ${MAX_BYTES} are read).` };
    return { ok: true, text: decodeText(readFileSync(file)) };
  } catch (error) {
    return { ok: false, message: explainSystemError(file, error) };
  }
}

export function explainSystemError(file: string, error: unknown): string {
  const code = error instanceof Error && 'code' in error ? String(error.code) : 'unknown';
  if (code === 'ENOENT') return `There is no file ${file}.`;
  if (code === 'EISDIR') return `${file} is a folder, not a file.`;
  if (code === 'EACCES' || code === 'EPERM') return `${file} may not be read by this user.`;
  return `${file} could not be read (${code}).`;
}
