import { expect, test } from 'vitest';
import { readTable } from '@/lib/series/parse-table';

test.each([
  ['plain', 'Month,Ferrow,Tarn\n2024-01,10,20\n2024-02,11,21', ['Month', 'Ferrow', 'Tarn']],
  ['month last', 'Ferrow,Tarn,When\n10,20,Jan 2024\n11,21,Feb 2024', ['When', 'Ferrow', 'Tarn']],
  [
    'compact months, which are numbers too',
    'Period,Ferrow,Tarn\n202401,10,20\n202402,11,21',
    ['Period', 'Ferrow', 'Tarn'],
  ],
  [
    'a running number first',
    ',Month,Ferrow,Tarn\n0,2024-01,10,20\n1,2024-02,11,21\n2,2024-03,12,22',
    ['Month', 'Ferrow', 'Tarn'],
  ],
  [
    'notes and a total between',
    'Month,Note,Total,Ferrow,Tarn\n2024-01,ok,30,10,20\n2024-02,,32,11,21',
    ['Month', 'Ferrow', 'Tarn'],
  ],
  [
    'shares beside',
    'Month,Share %,Ferrow,Tarn\n2024-01,12%,10,20\n2024-02,13%,11,21',
    ['Month', 'Ferrow', 'Tarn'],
  ],
  ['three firms', 'Month,Ferrow,Tarn,Holm\n2024-01,10,20,5\n2024-02,11,21,6', ['Month', 'Ferrow', 'Tarn']],
  [
    'only a total and a firm',
    'Month,Total,Ferrow\n2024-01,30,10\n2024-02,32,11',
    ['Month', 'Total', 'Ferrow'],
  ],
  [
    'a footnote row',
    'Month,Ferrow,Tarn\n2024-01,10,20\n2024-02,11,21\nSource: panel,,',
    ['Month', 'Ferrow', 'Tarn'],
  ],
  ['decimals that look like days', 'x,Month,A,B\n1/12,2024-01,1,2\n2/12,2024-02,3,4', ['Month', 'A', 'B']],
  ['no header', '2024-01,10,20\n2024-02,11,21', ['Column A', 'Column B', 'Column C']],
  ['two dates', 'Created,Month,A,B\n2025-01-05,2024-01,1,2\n2025-01-05,2024-02,3,4', ['Month', 'A', 'B']],
])('%s', (_, text, [month, focal, rival]) => {
  expect(readTable(text).guess).toEqual({ month, focal, rival, long: null });
});

test('what is not there is not guessed', () => {
  expect(readTable('Name,A,B\nx,1,2\ny,3,4').guess).toEqual({
    month: null,
    focal: 'A',
    rival: 'B',
    long: null,
  });
  expect(readTable('Month,A,B\n2024-01,1,text\n2024-02,2,more').guess).toEqual({
    month: 'Month',
    focal: 'A',
    rival: null,
    long: null,
  });
  expect(readTable('exp,hours,A\n1,6.5,3\n1,31.5,4\n2,12.5,4').guess.month).toBeNull();
  expect(readTable('').guess).toEqual({ month: null, focal: null, rival: null, long: null });
});

test.each([
  ['one firm after the other', (index: number) => [Math.floor(index / 1500), index % 1500]],
  ['two firms in turn', (index: number) => [index % 2, Math.floor(index / 2)]],
] as const)('firms are found in a long table with %s', (_, place) => {
  const rows = Array.from({ length: 6000 }, (_, index) => {
    const [firm, month] = place(index) as [number, number];
    return `${1900 + Math.floor(month / 12)}-${String((month % 12) + 1).padStart(2, '0')},Firm ${firm},${100 + index}`;
  });
  const { guess } = readTable(['Month,Firm,Users', ...rows].join('\n'));
  expect(guess.long).toEqual({ firm: 'Firm', users: 'Users' });
});
