/**
 * Text of a file or a paste -> table. Comma, semicolon, tab and bar; quotes; byte order mark; a "sep=" line; title lines above
 * the header; a missing header. A row that does not fit is reported and left out, the others stay.
 */
import Papa from 'papaparse';
import { cleanName } from './clean-name';
import { guessColumns } from './guess-columns';
import { MAX_COLUMNS, MAX_ROWS, MAX_TEXT_LENGTH } from './limits';
import { parseMonth } from './month';
import { readCountText } from './number';
import { makeError, makeWarning } from './problem';
import type { SeriesProblem, TableReading, TableRow } from './types';

/** Tried in this order; the first of equally good ones wins. */
const DELIMITERS = ['\t', ';', ',', '|'];

/** A character that no cell holds, so that no quote is special. */
const NO_QUOTES = '\u0000';

/** Rows looked at to find the delimiter. */
const ROWS_TO_GUESS_FROM = 50;

/** First characters of workbooks (zipped) and PDFs. */
const OTHER_FORMATS = ['PK\u0003\u0004', '%PDF-'];

/** Share of characters that no writer of text would use, from which a file is taken for something else. */
const MAX_UNPRINTABLE_SHARE = 0.02;
const UNPRINTABLE = /(?![\t\n\v\f\r])[\p{Cc}\uFFFD]/gu;

export function readTable(text: string): TableReading {
  const body = text.replace(/^\uFEFF/, '');
  if (body.trim() === '') return unusable(makeError('empty-file'));
  if (body.length > MAX_TEXT_LENGTH) {
    return unusable(
      makeError('too-large', {
        value: `${body.length} characters`,
        other: { row: null, value: `${MAX_TEXT_LENGTH} characters` },
      }),
    );
  }
  if (!isText(body)) return unusable(makeError('not-text'));

  const { delimiter, lines, problems } = splitCells(body);
  if (lines.length > MAX_ROWS) {
    return unusable(tooManyRows());
  }
  return shapeLines(delimiter, lines, problems);
}

/** A sheet of a workbook, its cells as texts. */
export function readGrid(rows: readonly string[][]): TableReading {
  if (rows.length > MAX_ROWS) return unusable(tooManyRows());
  const lines = rows.map((cells, index) => ({ row: index + 1, cells: cells.map((cell) => cell.trim()) }));
  return shapeLines('', lines, []);
}

/** Titles above the header off, then header and rows. */
function shapeLines(delimiter: string, lines: TableRow[], problems: SeriesProblem[]): TableReading {
  const filled = lines.filter(({ cells }) => cells.some((cell) => cell !== ''));
  if (filled.length === 0) return unusable(makeError('empty-file'));
  const headerIndex = Math.max(
    0,
    filled.findIndex(({ cells }) => cells.filter((cell) => cell !== '').length > 1),
  );
  const table = filled.slice(headerIndex);
  const width = table.reduce((widest, { cells }) => Math.max(widest, cells.length), 0);
  if (width > MAX_COLUMNS) {
    return unusable(
      makeError('too-large', {
        value: `${width} columns`,
        other: { row: null, value: `${MAX_COLUMNS} columns` },
      }),
    );
  }
  return shapeTable(delimiter, table, problems);
}

/** The header and the rows below it, each as wide as the header. */
function shapeTable(delimiter: string, table: TableRow[], problems: SeriesProblem[]): TableReading {
  const hasHeader = !looksLikeData(table[0].cells);
  if (!hasHeader)
    problems.push(makeWarning('no-header', { row: table[0].row, value: table[0].cells.join(delimiter) }));
  const below = hasHeader ? table.slice(1) : table;
  const headerCells = hasHeader ? table[0].cells : table[0].cells.map(() => '');
  const width = lastUsedColumn(headerCells, below) + 1;

  const rows: TableRow[] = [];
  for (const { row, cells } of below) {
    if (cells.slice(width).some((cell) => cell !== '')) {
      problems.push(
        makeError('row-misaligned', {
          row,
          value: cells.join(delimiter),
          other: { row: null, value: String(width) },
        }),
      );
    } else {
      rows.push({ row, cells: Array.from({ length: width }, (_, column) => cells[column] ?? '') });
    }
  }
  const header = nameColumns(headerCells, width);
  if (header.length < 3) problems.unshift(makeError('too-few-columns', { value: String(header.length) }));
  return { delimiter, header, rows, guess: guessColumns(header, rows), problems };
}

function unusable(problem: SeriesProblem): TableReading {
  return {
    delimiter: ',',
    header: [],
    rows: [],
    guess: { month: null, focal: null, rival: null, long: null },
    problems: [problem],
  };
}

function tooManyRows(): SeriesProblem {
  const other = { row: null, value: `${MAX_ROWS} rows` };
  return makeError('too-large', { value: `more than ${MAX_ROWS} rows`, other });
}

function isText(body: string): boolean {
  if (body.includes('\0') || OTHER_FORMATS.some((start) => body.startsWith(start))) return false;
  return (body.match(UNPRINTABLE)?.length ?? 0) <= MAX_UNPRINTABLE_SHARE * body.length;
}

/** All lines with their row number in the file. Where a quote is never closed, quotes are read as plain characters instead. */
function splitCells(body: string): { delimiter: string; lines: TableRow[]; problems: SeriesProblem[] } {
  const declared = /^"?sep=(.)"?\r?\n?/i.exec(body);
  const text = declared ? body.slice(declared[0].length) : body;
  const firstRow = declared ? 2 : 1;
  const delimiter = declared ? declared[1] : findDelimiter(text);
  const parsed = parseCells(text, delimiter);
  const open = parsed.errors.find(({ code }) => code === 'MissingQuotes');
  const data = open ? parseCells(text, delimiter, NO_QUOTES).data : parsed.data;
  const problems = open ? [makeWarning('quote-open', { row: (open.row ?? 0) + firstRow })] : [];
  const lines = data.map((cells, index) => ({
    row: index + firstRow,
    cells: cells.map((cell) => cell.trim()),
  }));
  return { delimiter, lines, problems };
}

function parseCells(
  text: string,
  delimiter: string,
  quoteChar = '"',
  preview = MAX_ROWS + 1,
): Papa.ParseResult<string[]> {
  return Papa.parse<string[]>(text, { delimiter, quoteChar, preview, skipEmptyLines: false });
}

/** The delimiter under which most rows are as wide as the first row that has more than one cell; then the one with more columns. */
function findDelimiter(text: string): string {
  let best = { delimiter: ',', agreement: 0, width: 0 };
  for (const delimiter of DELIMITERS) {
    const rows = parseCells(text, delimiter, '"', ROWS_TO_GUESS_FROM).data.filter((cells) =>
      cells.some((cell) => cell.trim() !== ''),
    );
    const start = rows.findIndex((cells) => cells.length > 1);
    if (start < 0) continue;
    const table = rows.slice(start);
    const width = table[0].length;
    const agreement = table.filter((cells) => cells.length === width).length / rows.length;
    const isBetter = agreement > best.agreement || (agreement === best.agreement && width > best.width);
    if (isBetter) best = { delimiter, agreement, width };
  }
  return best.delimiter;
}

/** A first row that already holds a month and counts is no header. */
function looksLikeData(cells: string[]): boolean {
  const filled = cells.filter((cell) => cell !== '');
  const hasMonth = filled.some((cell) => parseMonth(cell) !== null);
  const others = filled.filter((cell) => parseMonth(cell) === null);
  return (
    hasMonth &&
    others.length > 0 &&
    others.every((cell) => ['count', 'ambiguous'].includes(readCountText(cell).kind))
  );
}

/** Columns without a name and without a cell, as a trailing delimiter leaves them, are dropped. */
function lastUsedColumn(headerCells: string[], below: TableRow[]): number {
  for (let column = headerCells.length - 1; column > 0; column--) {
    if (headerCells[column] !== '' || below.some(({ cells }) => (cells[column] ?? '') !== '')) return column;
  }
  return 0;
}

/** Clean, filled and distinct names: an empty one is called after its letter, a second "Users" becomes "Users (2)". */
function nameColumns(headerCells: string[], width: number): string[] {
  const taken = new Set<string>();
  return Array.from({ length: width }, (_, column) => {
    const name = cleanName(headerCells[column] ?? '') || `Column ${columnLetter(column)}`;
    let distinct = name;
    for (let copy = 2; taken.has(distinct); copy++) distinct = `${name} (${copy})`;
    taken.add(distinct);
    return distinct;
  });
}

/** 0 -> A, 25 -> Z, 26 -> AA, as spreadsheets name them. */
function columnLetter(column: number): string {
  const rest = Math.floor(column / 26) - 1;
  return (rest >= 0 ? columnLetter(rest) : '') + String.fromCharCode(65 + (column % 26));
}
