/** Tables as analysts have them: layouts, months and numbers in the spellings of many programs and countries, in a time zone that is not UTC. */
import { describe, expect, test } from 'vitest';
import { formatMonth, makeMonth } from '@/lib/series/month';
import { readTable } from '@/lib/series/parse-table';
import { canFit, readSeriesFromTable } from '@/lib/series/read-series';
import type { SeriesMapping } from '@/lib/series/types';

const MONTHS = 14;
const FOCAL = Array.from({ length: MONTHS }, (_, index) => 12_000 + 731 * index);
const RIVAL = Array.from({ length: MONTHS }, (_, index) => 30_500 - 412 * index);
const FIRST = makeMonth(2023, 1);
const NAMES = 'Jan Feb Mar Apr May Jun Jul Aug Sep Oct Nov Dec'.split(' ');
const GERMAN = 'Januar Februar März April Mai Juni Juli August September Oktober November Dezember'.split(
  ' ',
);
const FRENCH = 'janv. févr. mars avril mai juin juil. août sept. oct. nov. déc.'.split(' ');

interface Spelling {
  month?: (year: number, month: number, index: number) => string;
  count?: (count: number) => string;
  delimiter?: string;
  header?: string[];
}

const pad = (value: number) => String(value).padStart(2, '0');
const lastDay = (year: number, month: number) => new Date(Date.UTC(year, month, 0)).getUTCDate();
const group = (mark: string) => (count: number) => String(count).replace(/\B(?=(\d{3})+$)/g, mark);
const quoted = (write: (count: number) => string) => (count: number) => `"${write(count)}"`;
const isoMonth = (year: number, month: number) => `${year}-${pad(month)}`;

function write({
  month = isoMonth,
  count = String,
  delimiter = ',',
  header = ['Month', 'Ours', 'Theirs'],
}: Spelling): string {
  const rows = FOCAL.map((focal, index) => {
    const year = 2023 + Math.floor(index / 12);
    return [month(year, (index % 12) + 1, index), count(focal), count(RIVAL[index]!)].join(delimiter);
  });
  return [header.join(delimiter), ...rows].join('\n');
}

const wide: [string, Spelling][] = [
  ['2024-03', {}],
  ['2024/03', { month: (y, m) => `${y}/${pad(m)}` }],
  ['2024.03', { month: (y, m) => `${y}.${pad(m)}` }],
  ['2024 03', { month: (y, m) => `${y} ${pad(m)}` }],
  ['202403', { month: (y, m) => `${y}${pad(m)}` }],
  ['2024-M03', { month: (y, m) => `${y}-M${pad(m)}` }],
  ['2024M03', { month: (y, m) => `${y}M${pad(m)}` }],
  ['03/2024', { month: (y, m) => `${pad(m)}/${y}` }],
  ['3/2024', { month: (y, m) => `${m}/${y}` }],
  ['03-2024', { month: (y, m) => `${pad(m)}-${y}` }],
  ['03.2024', { month: (y, m) => `${pad(m)}.${y}` }],
  ['Mar 2024', { month: (y, m) => `${NAMES[m - 1]} ${y}` }],
  ['Mar-2024', { month: (y, m) => `${NAMES[m - 1]}-${y}` }],
  ['2024 Mar', { month: (y, m) => `${y} ${NAMES[m - 1]}` }],
  ['Mar-24', { month: (y, m) => `${NAMES[m - 1]}-${pad(y % 100)}` }],
  ["Mar '24", { month: (y, m) => `${NAMES[m - 1]} '${pad(y % 100)}` }],
  ['03/24', { month: (y, m) => `${pad(m)}/${pad(y % 100)}` }],
  ['März 2024', { month: (y, m) => `${GERMAN[m - 1]} ${y}` }],
  ['févr. 2024', { month: (y, m) => `${FRENCH[m - 1]} ${y}` }],
  ['2024-03-01', { month: (y, m) => `${y}-${pad(m)}-01` }],
  ['2024-03-31', { month: (y, m) => `${y}-${pad(m)}-${lastDay(y, m)}` }],
  ['20240331', { month: (y, m) => `${y}${pad(m)}${lastDay(y, m)}` }],
  ['31.03.2024', { month: (y, m) => `${lastDay(y, m)}.${pad(m)}.${y}` }],
  ['31/03/2024', { month: (y, m) => `${lastDay(y, m)}/${pad(m)}/${y}` }],
  ['3/31/2024', { month: (y, m) => `${m}/${lastDay(y, m)}/${y}` }],
  ['31-Mar-24', { month: (y, m) => `${lastDay(y, m)}-${NAMES[m - 1]}-${pad(y % 100)}` }],
  ['31 March 2024', { month: (y, m) => `${lastDay(y, m)} ${NAMES[m - 1]} ${y}` }],
  ['March 31, 2024', { month: (y, m) => `"${NAMES[m - 1]} ${lastDay(y, m)}, ${y}"` }],
  ['2024-03-01T00:00:00Z', { month: (y, m) => `${y}-${pad(m)}-01T00:00:00Z` }],
  ['2024-03-31 23:59', { month: (y, m) => `${y}-${pad(m)}-${lastDay(y, m)} 23:59` }],
  ['day numbers of a spreadsheet', { month: (y, m) => String(Date.UTC(y, m - 1, 1) / 86_400_000 + 25_569) }],
  ['day numbers with a time', { month: (y, m) => `${Date.UTC(y, m - 1, 1) / 86_400_000 + 25_569}.5` }],
  ['01/03/2024 in 14 rows', { month: (y, m) => `01/${pad(m)}/${y}` }],
  ['semicolons', { delimiter: ';' }],
  ['tabs, as pasted from a spreadsheet', { delimiter: '\t' }],
  ['bars', { delimiter: '|' }],
  ['1,234.0', { count: quoted((count) => `${group(',')(count)}.0`) }],
  ['1.234 with 13,75 elsewhere', { count: (count) => `${group('.')(count)},0`, delimiter: ';' }],
  ['1 234', { count: group(' ') }],
  ['1 234 with a fixed space', { count: group('\u00a0') }],
  ['1 234 with a narrow fixed space', { count: group('\u202f') }],
  ["1'234", { count: group("'") }],
  ['1’234', { count: group('’') }],
  ['12.731k', { count: (count) => `${(count / 1000).toFixed(4)}k` }],
  ['0.0127M', { count: (count) => `${(count / 1e6).toFixed(6)}M` }],
  [
    '12,7310 k with commas',
    { count: (count) => `${(count / 1000).toFixed(4).replace('.', ',')} k`, delimiter: ';' },
  ],
  ['1.2E+04', { count: (count) => count.toExponential(6) }],
  ['12000.00', { count: (count) => count.toFixed(2) }],
  ['12000,00', { count: (count) => count.toFixed(2).replace('.', ','), delimiter: ';' }],
  ['+12000', { count: (count) => `+${count}` }],
  ['quoted numbers', { count: quoted(String) }],
  ['other header names', { header: ['Period', 'Quillfern', 'Marrowby'] }],
  ['header in German', { header: ['Monat', 'Wir', 'Konkurrent'] }],
  ['header with line breaks', { header: ['Month', '"Our\nusers"', 'Theirs'] }],
];

function understand(text: string, further: Partial<SeriesMapping> = {}) {
  const table = readTable(text);
  const { month, focal, rival, long } = table.guess;
  expect({ month, focal, rival }).not.toContain(null);
  return readSeriesFromTable(table, {
    month: month!,
    focal: focal!,
    rival: rival!,
    long: long ?? undefined,
    ...further,
  });
}

describe('one row a month reads to the same series, spelt', () => {
  test.each(wide)('%s', (_, spelling) => {
    const reading = understand(write(spelling));
    expect(reading.problems.filter(({ severity }) => severity === 'error')).toEqual([]);
    expect(canFit(reading)).toBe(true);
    expect(formatMonth(reading.series!.firstMonth)).toBe('2023-01');
    // at most 7 digits were written
    for (const [index, count] of reading.series!.focal.entries())
      expect(count! / FOCAL[index]!).toBeCloseTo(1, 6);
    for (const [index, count] of reading.series!.rival.entries())
      expect(count! / RIVAL[index]!).toBeCloseTo(1, 6);
  });
});

const frames: [string, (text: string) => string][] = [
  ['a byte order mark', (text) => `\uFEFF${text}`],
  ['a sep= line', (text) => `sep=,\n${text}`],
  ['title lines above', (text) => `Monthly users\nSkerrow Isles\n\n${text}`],
  ['lines ended by CR LF', (text) => text.replaceAll('\n', '\r\n')],
  ['old lines ended by CR', (text) => text.replaceAll('\n', '\r')],
  ['empty lines at the end', (text) => `${text}\n\n,,\n`],
  ['a total below', (text) => `${text}\nTotal,999999,888888`],
  ['newest month first', (text) => [text.split('\n')[0], ...text.split('\n').slice(1).reverse()].join('\n')],
  [
    'a running number in front',
    (text) =>
      text
        .split('\n')
        .map((line, index) => `${index === 0 ? '#' : index},${line}`)
        .join('\n'),
  ],
  [
    'notes behind',
    (text) =>
      text
        .split('\n')
        .map((line, index) => `${line},${index === 0 ? 'Note' : index === 4 ? 'strike' : ''}`)
        .join('\n'),
  ],
  [
    'a third firm behind',
    (text) =>
      text
        .split('\n')
        .map((line, index) => `${line},${index === 0 ? 'Third' : 50 + index}`)
        .join('\n'),
  ],
  [
    'trailing delimiters',
    (text) =>
      text
        .split('\n')
        .map((line) => `${line},,`)
        .join('\n'),
  ],
  [
    'blanks around cells',
    (text) =>
      text
        .split('\n')
        .map((line) => line.split(',').join(' , '))
        .join('\n'),
  ],
];

test.each(frames)('the same series comes from a table with %s', (_, frame) => {
  const { series } = understand(frame(write({})));
  expect(series).toEqual({ firstMonth: FIRST, focal: FOCAL, rival: RIVAL });
});

describe('one row per month and firm', () => {
  const lines = FOCAL.flatMap((focal, index) => {
    const month = formatMonth(FIRST + index);
    return [`${month},Ours,${focal}`, `${month},Theirs,${RIVAL[index]}`, `${month},Small,${5 + index}`];
  });

  test('is recognised, whatever the order of rows and columns, and two of the firms are picked', () => {
    for (const order of [
      [0, 1, 2],
      [2, 0, 1],
      [1, 2, 0],
    ]) {
      for (const body of [lines, [...lines].reverse()]) {
        const text = [['Month', 'Firm', 'Users'], ...body.map((line) => line.split(','))]
          .map((cells) => order.map((column) => cells[column]).join(','))
          .join('\n');
        expect(readTable(text).guess.long).toEqual({ firm: 'Firm', users: 'Users' });
        const { series, notes } = understand(text, { focal: 'Ours', rival: 'Theirs' });
        expect(series).toEqual({ firstMonth: FIRST, focal: FOCAL, rival: RIVAL });
        expect(notes.join(' ')).toContain('One row per month and firm');
      }
    }
  });

  test('names a firm that no row has, and a month that a firm has twice, with its row', () => {
    const text = ['Month,Firm,Users', ...lines, '2023-01,Ours,77'].join('\n');
    const { problems } = understand(text, { focal: 'Ours', rival: 'Nobody' });
    expect(problems).toContainEqual(expect.objectContaining({ code: 'firm-not-found', value: 'Nobody' }));
    expect(problems).toContainEqual(
      expect.objectContaining({
        code: 'month-duplicate',
        row: lines.length + 2,
        other: { row: 2, value: '2023-01' },
      }),
    );
  });
});

describe('rows that are no months', () => {
  test('quarters stand in their last month, and the months between are no problem', () => {
    const rows = Array.from(
      { length: 14 },
      (_, index) => `Q${(index % 4) + 1} ${2020 + Math.floor(index / 4)},${100 + index},${90 - 2 * index}`,
    );
    const { series, grain, notes, problems } = understand(['Quarter,A,B', ...rows].join('\n'));
    expect(grain).toBe('quarter');
    expect(formatMonth(series!.firstMonth)).toBe('2020-03');
    expect(series!.focal.slice(0, 4)).toEqual([100, null, null, 101]);
    expect(problems).toEqual([]);
    expect(notes[0]).toContain('quarter');
  });

  /** Every day from 1 January 2023 to 15 March 2024. */
  const days = Array.from({ length: 440 }, (_, day) =>
    new Date(Date.UTC(2023, 0, 1 + day)).toISOString().slice(0, 10),
  );
  const daily = ['Day,A,B', ...days.map((day, index) => `${day},${1000 + index},${2000 - 2 * index}`)].join(
    '\n',
  );

  test('days become months by their mean or their last, and a month that has not ended is left out', () => {
    const mean = understand(daily);
    expect(mean.grain).toBe('day');
    // January: 1000 to 1030, mean 1015
    expect(mean.series!.focal[0]).toBe(1015);
    expect(mean.series!.focal).toHaveLength(14);
    expect(mean.problems).toMatchObject([
      { code: 'month-partial', value: '2024-03', fixes: ['skip-row', 'use'] },
    ]);
    expect(understand(daily, { aggregation: 'last' }).series!.focal[0]).toBe(1030);
    expect(mean.notes[0]).toContain('mean');
  });

  test('a partial month is used when somebody says so', () => {
    const { problems } = understand(daily);
    const { code, row, column } = problems[0]!;
    const used = understand(daily, { fixes: { [[code, row, column].join('|')]: 'use' } });
    expect(used.series!.focal).toHaveLength(15);
    expect(used.problems).toMatchObject([{ code: 'month-partial' }]);
  });

  test('weeks belong to the month of their Thursday', () => {
    const weeks = Array.from({ length: 66 }, (_, week) => `2023-W${pad(week + 1)}`).slice(0, 52);
    const next = Array.from({ length: 14 }, (_, week) => `2024-W${pad(week + 1)}`);
    const text = [
      'Week,A,B',
      ...[...weeks, ...next].map((week, index) => `${week},${10 + index},${90 + index}`),
    ].join('\n');
    const { series, grain } = understand(text);
    expect(grain).toBe('week');
    expect(formatMonth(series!.firstMonth)).toBe('2023-01');
    // W01 to W04: Thursdays 5, 12, 19 and 26 January
    expect(series!.focal[0]).toBe((10 + 11 + 12 + 13) / 4);
  });
});

describe('what can be read two ways', () => {
  test('asks once and takes the answer for the whole file', () => {
    const short = [
      'Date,A,B',
      ...Array.from({ length: 12 }, (_, index) => `01/${pad(index + 1)}/2023,${5 + index},${9 + index}`),
    ].join('\n');
    const open = understand(short);
    expect(open.problems.some(({ code }) => code === 'month-ambiguous')).toBe(true);
    const dayFirst = understand(short, { dateOrder: 'day-first' });
    expect(dayFirst.series!.focal).toHaveLength(12);
    expect(dayFirst.notes.join(' ')).toContain('day first');

    const counts = [
      'Month,A,B',
      ...Array.from(
        { length: 12 },
        (_, index) => `2023-${pad(index + 1)};"1,23${index % 10}";"2,34${index % 10}"`,
      ),
    ]
      .join('\n')
      .replaceAll(/,(?=[AB])/g, ';');
    expect(
      understand(counts).problems.every(({ code }) => ['count-ambiguous', 'too-short-to-fit'].includes(code)),
    ).toBe(true);
    expect(understand(counts, { decimalMark: 'point' }).series!.focal[1]).toBe(1231);
    expect(understand(counts, { decimalMark: 'comma' }).series!.focal[1]).toBe(1.231);
  });
});
