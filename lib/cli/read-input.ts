/**
 * The table of the file that the command names: text, or a sheet of a workbook. Every way of not getting it is one sentence.
 */
import { readFileSync, statSync } from 'node:fs';
import { decodeText } from '../series/decode-text';
import { explainProblem } from '../series/explain';
import { MAX_TEXT_LENGTH } from '../series/limits';
import { readGrid, readTable } from '../series/parse-table';
import { isWorkbook, readWorkbook } from '../series/read-workbook';
import type { TableReading, WorkbookSheet } from '../series/types';

export type InputReading =
  | { ok: true; table: TableReading }
  | { ok: false; exit: 'file-unreadable' | 'data-unusable'; message: string };

/** Name of standard input. */
const STANDARD_INPUT = '-';

/** Characters of up to four bytes; a larger file cannot be within the limit of characters. */
const MAX_BYTES = 4 * MAX_TEXT_LENGTH;

/** @param sheet of a workbook; null: the first one with a table */
export async function readInput(file: string, sheet: string | null): Promise<InputReading> {
  const input = readBytes(file);
  if (!input.ok) return { ...input, exit: 'file-unreadable' };
  if (isWorkbook(input.bytes)) return readSheet(input.bytes, sheet);
  if (sheet !== null)
    return {
      ok: false,
      exit: 'data-unusable',
      message: `${file} is no workbook, so it has no sheet “${sheet}”.`,
    };
  return { ok: true, table: readTable(decodeText(input.bytes)) };
}

function readBytes(file: string): { ok: true; bytes: Uint8Array } | { ok: false; message: string } {
  try {
    if (file === STANDARD_INPUT) return { ok: true, bytes: readFileSync(0) };
    const { size } = statSync(file);
    if (size > MAX_BYTES)
      return { ok: false, message: `${file} is too large (${size} bytes; at most ${MAX_BYTES} are read).` };
    return { ok: true, bytes: readFileSync(file) };
  } catch (error) {
    return { ok: false, message: explainSystemError(file, error) };
  }
}

async function readSheet(bytes: Uint8Array, name: string | null): Promise<InputReading> {
  const workbook = await readWorkbook(bytes);
  if (!workbook.ok) {
    const { what, why, tryThis } = explainProblem(workbook.problem);
    return { ok: false, exit: 'data-unusable', message: `${what} ${why} ${tryThis}` };
  }
  const { sheets } = workbook;
  const sheet = name === null ? firstTable(sheets) : sheets.find((one) => one.name === name);
  if (sheet) return { ok: true, table: readGrid(sheet.rows) };
  const names = sheets.map((one) => `“${one.name}”`).join(', ');
  return { ok: false, exit: 'data-unusable', message: `There is no sheet “${name}”; there are ${names}.` };
}

/** The first sheet whose columns can be guessed, else the first one. */
function firstTable(sheets: readonly WorkbookSheet[]): WorkbookSheet | undefined {
  const isTable = (sheet: WorkbookSheet) => {
    const { month, focal, rival } = readGrid(sheet.rows).guess;
    return month !== null && focal !== null && rival !== null;
  };
  return sheets.find(isTable) ?? sheets[0];
}

export function explainSystemError(file: string, error: unknown): string {
  const code = error instanceof Error && 'code' in error ? String(error.code) : 'unknown';
  if (code === 'ENOENT') return `There is no file ${file}.`;
  if (code === 'EISDIR') return `${file} is a folder, not a file.`;
  if (code === 'EACCES' || code === 'EPERM') return `${file} may not be read by this user.`;
  return `${file} could not be read (${code}).`;
}
