/**
 * Paragraphs and tables of a fixed width for a terminal.
 */

const LINE_LENGTH = 100;
const COLUMN_GAP = '  ';

/** Breaks a paragraph at plain spaces; lines after the first are indented. Fixed spaces become plain ones and are not broken at. */
export function wrapText(text: string, indent = 0): string {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ').map(plain)) {
    if (line !== '' && line.length + 1 + word.length > LINE_LENGTH) {
      lines.push(line);
      line = ' '.repeat(indent) + word;
    } else {
      line = line === '' ? word : `${line} ${word}`;
    }
  }
  return [...lines, line].join('\n');
}

/** Cells in columns, two spaces apart, nothing trailing. */
export function renderTable(rows: readonly (readonly string[])[]): string {
  const width = rows.reduce((most, row) => Math.max(most, row.length), 0);
  const widths = Array.from({ length: width }, (_, column) =>
    rows.reduce((most, row) => Math.max(most, lengthOf(row[column] ?? '')), 0),
  );
  const pad = (cell: string, column: number) => plain(cell) + ' '.repeat(widths[column] - lengthOf(cell));
  return rows.map((row) => row.map(pad).join(COLUMN_GAP).trimEnd()).join('\n');
}

function plain(text: string): string {
  return text.replace(/[\u00a0\u202f]/g, ' ');
}

/** Characters, not UTF-16 units. */
function lengthOf(text: string): number {
  return [...text].length;
}
