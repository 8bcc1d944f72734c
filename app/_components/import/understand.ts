/**
 * A file or a paste -> what a page shows of it: the sheets, the table's first rows, the columns that were chosen or guessed, the
 * counts and every problem. Runs in the reading worker; small results only, so that a page never waits for a large table.
 */
import { decodeText } from '@/lib/series/decode-text';
import { describePlace } from '@/lib/series/explain';
import { chosenFix, nameFix } from '@/lib/series/fixes';
import { rankFirms } from '@/lib/series/long-layout';
import { readGrid, readTable } from '@/lib/series/parse-table';
import { canFit, readSeriesFromTable } from '@/lib/series/read-series';
import { isWorkbook, readWorkbook } from '@/lib/series/read-workbook';
import type {
  Month,
  SeriesMapping,
  SeriesProblem,
  SeriesReading,
  TableReading,
  WorkbookSheet,
} from '@/lib/series/types';
import type { ReadingChoices, Understood } from './understood';

/** Rows of the table that a page shows. */
const SAMPLE_ROWS = 6;
/** Firms of a long layout that are offered. */
const MOST_FIRMS = 100;
/** Choices about single problems that are told one by one in the record. */
const MOST_FIX_NOTES = 20;

/** A source as it was opened: its tables are read once, whatever is chosen later. */
export type OpenSource =
  | { kind: 'text'; table: TableReading }
  | { kind: 'workbook'; sheets: WorkbookSheet[]; tables: Map<number, TableReading> }
  | { kind: 'refused'; problem: SeriesProblem };

export async function openBytes(bytes: Uint8Array): Promise<OpenSource> {
  if (!isWorkbook(bytes)) return openText(decodeText(bytes));
  const workbook = await readWorkbook(bytes);
  return workbook.ok
    ? { kind: 'workbook', sheets: workbook.sheets, tables: new Map() }
    : { kind: 'refused', problem: workbook.problem };
}

export function openText(text: string): OpenSource {
  return { kind: 'text', table: readTable(text) };
}

export function understand(source: OpenSource, choices: ReadingChoices, thisMonth: Month): Understood {
  if (source.kind === 'refused') return understandTable(refusedTable(source.problem), null, thisMonth);
  if (source.kind === 'text') return understandTable(source.table, choices.mapping, thisMonth);
  const sheet = choices.sheet ?? findSheet(source);
  const names = source.sheets.map(({ name }) => name);
  const understood = understandTable(tableOf(source, sheet), choices.mapping, thisMonth);
  const note = names[sheet] === undefined ? [] : [`Sheet “${names[sheet]}”.`];
  return { ...understood, sheets: names, sheet, notes: [...note, ...understood.notes] };
}

type Workbook = Extract<OpenSource, { kind: 'workbook' }>;

function tableOf(workbook: Workbook, sheet: number): TableReading {
  const known = workbook.tables.get(sheet);
  if (known) return known;
  const table = readGrid(workbook.sheets[sheet]?.rows ?? []);
  workbook.tables.set(sheet, table);
  return table;
}

/** The first sheet with a month and two counts, else the first. */
function findSheet(workbook: Workbook): number {
  const found = workbook.sheets.findIndex((_, index) => {
    const { guess } = tableOf(workbook, index);
    return guess.month !== null && guess.focal !== null && guess.rival !== null;
  });
  return Math.max(found, 0);
}

function understandTable(table: TableReading, chosen: SeriesMapping | null, thisMonth: Month): Understood {
  const { mapping, firms } = fitMapping(table, chosen);
  const reading = mapping ? readSeriesFromTable(table, mapping, { thisMonth }) : unreadable(table.problems);
  return {
    sheets: [],
    sheet: 0,
    header: table.header,
    sample: table.rows.slice(0, SAMPLE_ROWS),
    rowCount: table.rows.length,
    firms,
    mapping,
    reading,
    canFit: canFit(reading),
    notes: mapping ? [...reading.notes, ...noteFixes(reading.problems, mapping)] : [],
  };
}

/** The chosen columns while the table has them, else the guess, else the columns in their order. */
function fitMapping(
  table: TableReading,
  chosen: SeriesMapping | null,
): { mapping: SeriesMapping | null; firms: string[] } {
  const { header, guess } = table;
  const [first, second, third] = header;
  if (first === undefined || second === undefined || third === undefined) return { mapping: null, firms: [] };
  const start = chosen && hasAll(header, chosen) ? chosen : guessMapping(header, guess);
  if (!start.long) return { mapping: start, firms: [] };
  const column = header.indexOf(start.long.firm);
  const firms = rankFirms(table.rows.map(({ cells }) => cells[column] ?? ''))
    .slice(0, MOST_FIRMS)
    .map(({ name }) => name);
  const focal = firms.includes(start.focal) ? start.focal : (firms[0] ?? '');
  const rest = firms.filter((name) => name !== focal);
  const rival = rest.includes(start.rival) ? start.rival : (rest[0] ?? '');
  return { mapping: { ...start, focal, rival }, firms };
}

function hasAll(header: string[], { month, focal, rival, long }: SeriesMapping): boolean {
  const wanted = long ? [month, long.firm, long.users] : [month, focal, rival];
  return wanted.every((name) => header.includes(name));
}

function guessMapping(header: string[], { month, focal, rival, long }: TableReading['guess']): SeriesMapping {
  const theMonth = month ?? header[0]!;
  if (long) return { month: theMonth, focal: focal ?? '', rival: rival ?? '', long };
  const others = header.filter((name) => name !== theMonth && name !== focal);
  return {
    month: theMonth,
    focal: focal ?? others[0]!,
    rival: rival ?? others.find((name) => focal !== null || name !== others[0])!,
  };
}

/** What a person chose about problems, where it is not what is done anyway. */
function noteFixes(problems: SeriesProblem[], mapping: SeriesMapping): string[] {
  const notes = problems.flatMap((problem) => {
    const fix = chosenFix(problem, mapping.fixes);
    if (fix === null || fix === problem.fixes?.[0]) return [];
    const place = describePlace(problem) || 'The file';
    return [`${place}${problem.value ? `, ${problem.value}` : ''}: ${nameFix(fix)}.`];
  });
  return notes.length <= MOST_FIX_NOTES
    ? notes
    : [
        ...notes.slice(0, MOST_FIX_NOTES),
        `${notes.length - MOST_FIX_NOTES} more choices about single cells.`,
      ];
}

function refusedTable(problem: SeriesProblem): TableReading {
  const guess = { month: null, focal: null, rival: null, long: null };
  return { delimiter: '', header: [], rows: [], guess, problems: [problem] };
}

function unreadable(problems: SeriesProblem[]): SeriesReading {
  return { series: null, focalName: '', rivalName: '', grain: 'month', notes: [], problems };
}
