/** The columns of a mapping in a table, by header. */
import { cleanName } from './clean-name';
import { makeError } from './problem';
import type { SeriesMapping, SeriesProblem, TableReading } from './types';

export interface ColumnIndexes {
  month: number;
  /** -1 in the long layout. */
  focal: number;
  rival: number;
  /** null: each firm has a column of its own. */
  long: { firm: number; users: number } | null;
}

/** @returns no columns when one is missing or chosen twice, with the problem */
export function findColumns(
  table: TableReading,
  mapping: SeriesMapping,
): { columns: ColumnIndexes | null; problems: SeriesProblem[] } {
  if (table.header.length === 0) return { columns: null, problems: [] };
  const { month, focal, rival, long } = mapping;
  const wanted = long ? [month, long.firm, long.users] : [month, focal, rival];
  const indexes = wanted.map((name) => findColumn(table.header, name));
  const problems = wanted
    .filter((_, role) => indexes[role] < 0)
    .map((name) => makeError('column-not-found', { value: name, readings: table.header.slice() }));
  if (problems.length > 0) return { columns: null, problems };

  const twice = wanted.find((_, role) => indexes.indexOf(indexes[role]) < role);
  const sameFirm = long && cleanName(focal) === cleanName(rival) ? focal : undefined;
  const repeated = twice ?? sameFirm;
  if (repeated !== undefined)
    return { columns: null, problems: [makeError('same-column-twice', { column: cleanName(repeated) })] };
  const [first, second, third] = indexes;
  return {
    columns: long
      ? { month: first, focal: -1, rival: -1, long: { firm: second, users: third } }
      : { month: first, focal: second, rival: third, long: null },
    problems: [],
  };
}

/** The exact header, else the only one that differs in capitals alone; -1 when there is none. */
function findColumn(header: readonly string[], name: string): number {
  const wanted = cleanName(name);
  const exact = header.indexOf(wanted);
  if (exact >= 0) return exact;
  const alike = header.flatMap((column, index) =>
    column.toLowerCase() === wanted.toLowerCase() ? [index] : [],
  );
  return alike.length === 1 ? alike[0] : -1;
}
