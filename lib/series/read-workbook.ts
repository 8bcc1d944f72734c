/**
 * Bytes of an .xlsx workbook -> its sheets as texts. Nothing is unpacked before the sizes that the archive declares have been
 * checked, and never more than they say, so memory stays bounded; locked, old and macro workbooks are refused with a reason.
 * Works in Node, in a browser and in its workers.
 */
import { unzipSync, zipSync } from 'fflate';
import readXlsxFile from 'read-excel-file/universal';
import { spellCount } from './export-series';
import { MAX_SHEETS, MAX_UNPACKED_BYTES } from './limits';
import { makeError } from './problem';
import type { SeriesProblem, WorkbookReading } from './types';

/** First bytes of a zip archive, and of the container that holds old and locked workbooks (MS-CFB). */
const ZIP_START = [0x50, 0x4b, 0x03, 0x04];
const CONTAINER_START = [0xd0, 0xcf, 0x11, 0xe0];

const MACROS = /vbaProject\.bin$/i;
const PARTS = /\.(xml|rels)$/i;

/** True when the bytes are to be read as a workbook rather than as text, whatever the file is called. */
export function isWorkbook(bytes: Uint8Array): boolean {
  return startsWith(bytes, ZIP_START) || startsWith(bytes, CONTAINER_START);
}

export async function readWorkbook(bytes: Uint8Array): Promise<WorkbookReading> {
  if (startsWith(bytes, CONTAINER_START)) return refuse(makeError('workbook-locked'));
  try {
    const refusal = inspect(bytes);
    if (refusal) return refuse(refusal);
    // Unpacked here under the sizes just checked, and handed on stored: the reader then has nothing to unpack.
    const parts = unzipSync(bytes, { filter: ({ name }) => PARTS.test(name) });
    const archive = zipSync(parts, { level: 0 });
    const sheets = await readXlsxFile(toArrayBuffer(archive));
    return {
      ok: true,
      sheets: sheets.slice(0, MAX_SHEETS).map(({ sheet, data }) => ({
        name: sheet,
        rows: data.map((row) => row.map(spellCell)),
      })),
    };
  } catch {
    return refuse(makeError('workbook-broken'));
  }
}

/** Reads the archive's list of contents only. */
function inspect(bytes: Uint8Array): SeriesProblem | null {
  let unpacked = 0;
  let hasMacros = false;
  let hasSheets = false;
  unzipSync(bytes, {
    filter: ({ name, originalSize }) => {
      if (PARTS.test(name)) unpacked += originalSize;
      hasMacros ||= MACROS.test(name);
      hasSheets ||= /^xl\/worksheets\//i.test(name);
      return false;
    },
  });
  if (hasMacros) return makeError('workbook-macros');
  if (!hasSheets) return makeError('workbook-empty', { value: 'packed file' });
  if (unpacked > MAX_UNPACKED_BYTES) {
    return makeError('workbook-swollen', {
      value: spellMegabytes(unpacked),
      other: { row: null, value: spellMegabytes(MAX_UNPACKED_BYTES) },
    });
  }
  return null;
}

/** A cell as one would type it; numbers so that no mark in them is ambiguous, dates as ISO 8601. */
function spellCell(cell: unknown): string {
  if (cell === null || cell === undefined) return '';
  if (typeof cell === 'number') return spellCount(cell);
  if (cell instanceof Date) return Number.isNaN(cell.getTime()) ? '' : cell.toISOString().slice(0, 10);
  return String(cell);
}

function spellMegabytes(size: number): string {
  return `${Math.round(size / 1_000_000)} MB`;
}

function startsWith(bytes: Uint8Array, start: number[]): boolean {
  return start.every((byte, index) => bytes[index] === byte);
}

function toArrayBuffer(bytes: Uint8Array): ArrayBuffer {
  return bytes.slice().buffer;
}

function refuse(problem: SeriesProblem): WorkbookReading {
  return { ok: false, problem };
}
