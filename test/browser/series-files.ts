/** Files of counts as people have them, made up: the same series in many spellings. */
import writeXlsxFile from 'write-excel-file/node';
import type { GivenFile } from './people';

const MONTHS = 15;
/** Month by month: "2023-01" and two counts. */
const ROWS = Array.from({ length: MONTHS }, (_, index) => ({
  year: 2023 + Math.floor(index / 12),
  month: (index % 12) + 1,
  focal: 12_040 + 311 * index,
  rival: 3_320 + 97 * index,
}));

const two = (number: number) => String(number).padStart(2, '0');

export function textFile(name: string, content: string | Buffer): GivenFile {
  return { name, mimeType: 'text/csv', buffer: Buffer.from(content as string) };
}

/** What the page says of each of these files once it is understood. */
export const UNDERSTOOD = /15 months, January 2023 to March 2024; both firms known in each/;

export const PLAIN_ROWS = ROWS.map(
  ({ year, month, focal, rival }) => `${year}-${two(month)},${focal},${rival}`,
);
export const PLAIN_CSV = ['Month,Norrland,Halcyon', ...PLAIN_ROWS, ''].join('\n');

const GERMAN_ROWS = ROWS.map(
  ({ year, month, focal, rival }) =>
    `31.${two(month)}.${year};${(focal / 1000).toFixed(3).replace('.', ' ')};${String(rival)},5`,
);

const long = ROWS.flatMap(({ year, month, focal, rival }) => [
  `${year}-${two(month)};Norrland;${focal}`,
  `${year}-${two(month)};Halcyon;${rival}`,
]);

/** Seventy weeks from the first Monday of 2023 on: the last one ends in the middle of May 2024. */
const weeks = Array.from({ length: 70 }, (_, index) => {
  const day = new Date(Date.UTC(2023, 0, 2 + 7 * index)).toISOString().slice(0, 10);
  return `${day},${12_000 + 70 * index},${3_300 + 20 * index}`;
});

/** Each quarter stands in its last month. */
const quarters = Array.from(
  { length: 16 },
  (_, index) =>
    `${2020 + Math.floor(index / 4)}-Q${(index % 4) + 1},${12_000 + 800 * index},${3_300 + 250 * index}`,
);

async function makeWorkbook(): Promise<Buffer> {
  const rows = PLAIN_CSV.trimEnd()
    .split('\n')
    .map((line) => line.split(',').map((value) => ({ value })));
  const file = await writeXlsxFile([
    { data: [[{ value: 'Remarks only' }]], sheet: 'Cover' },
    { data: rows, sheet: 'Users' },
  ]);
  return file.toBuffer();
}

interface Spelling {
  what: string;
  file: GivenFile;
  /** What the page says of it. */
  understood: RegExp;
}

export async function listSpellings(): Promise<Spelling[]> {
  const spelling = (what: string, file: GivenFile, understood = UNDERSTOOD): Spelling => ({
    what,
    file,
    understood,
  });
  const german = ['Monat;Nørrland GmbH;Übermut', ...GERMAN_ROWS, ''].join('\r\n');
  return [
    spelling('CSV', textFile('plain.csv', PLAIN_CSV)),
    spelling('TSV in UTF-16', textFile('tabs.tsv', utf16(PLAIN_CSV.replaceAll(',', '\t')))),
    spelling(
      'semicolons in Windows-1252 with spaced thousands and decimal commas',
      textFile('bericht.csv', Buffer.from(german, 'latin1')),
    ),
    spelling('the second sheet of a workbook', textFile('users.xlsx', await makeWorkbook())),
    spelling('the long layout', textFile('long.csv', ['Month;Firm;Users', ...long].join('\n'))),
    spelling(
      'weeks',
      textFile('weeks.csv', ['Week,Us,Them', ...weeks].join('\n')),
      /1[56] months, (January|February) 2023/,
    ),
    spelling(
      'quarters',
      textFile('quarters.csv', ['Quarter,Us,Them', ...quarters].join('\n')),
      /46 months, March 2020 to December 2023; both firms known in 16/,
    ),
  ];
}

/** Days and months can be told either way, and no other row settles it. */
export const AMBIGUOUS_CSV = [
  'Date,Norrland,Halcyon',
  ...Array.from({ length: 12 }, (_, index) => `${two(index + 1)}/05/2024,${100 + index},${50 + index}`),
].join('\n');

function utf16(text: string): Buffer {
  return Buffer.concat([Buffer.from([0xff, 0xfe]), Buffer.from(text, 'utf16le')]);
}
