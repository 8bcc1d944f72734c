/** Files of counts as people have them, made up: the same series in many spellings. */
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

const german = ROWS.map(
  ({ year, month, focal, rival }) =>
    `31.${two(month)}.${year};${(focal / 1000).toFixed(3).replace('.', ' ')};${String(rival)},5`,
);

export const SPELLINGS: { what: string; file: GivenFile }[] = [
  { what: 'CSV', file: textFile('plain.csv', PLAIN_CSV) },
  { what: 'TSV in UTF-16', file: textFile('tabs.tsv', utf16(PLAIN_CSV.replaceAll(',', '\t'))) },
  {
    what: 'semicolons in Windows-1252 with spaced thousands and decimal commas',
    file: textFile(
      'bericht.csv',
      Buffer.from(['Monat;Nørrland GmbH;Übermut', ...german, ''].join('\r\n'), 'latin1'),
    ),
  },
];

/** Days and months can be told either way, and no other row settles it. */
export const AMBIGUOUS_CSV = [
  'Date,Norrland,Halcyon',
  ...Array.from(
    { length: 12 },
    (_, index) => `0${(index % 9) + 1}/0${(index % 3) + 1}/2024,${100 + index},${50 + index}`,
  ),
].join('\n');

function utf16(text: string): Buffer {
  return Buffer.concat([Buffer.from([0xff, 0xfe]), Buffer.from(text, 'utf16le')]);
}
