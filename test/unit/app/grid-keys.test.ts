import { expect, test } from 'vitest';
import { readGridKey } from '@/app/_components/data/grid-keys';

const LAST = 30;
const press = (key: string, held: { ctrlKey?: boolean; metaKey?: boolean; altKey?: boolean } = {}) =>
  readGridKey(
    { key, ctrlKey: false, metaKey: false, altKey: false, ...held },
    { row: 5, column: 'rival' },
    LAST,
  );
const placeOf = (key: string, held = {}) => {
  const read = press(key, held);
  return read?.kind === 'move' ? [read.to.row, read.to.column] : read;
};

test('arrows, page keys, Home and End move and stop at the edges', () => {
  expect(placeOf('ArrowUp')).toEqual([4, 'rival']);
  expect(placeOf('ArrowRight')).toEqual([5, 'exclusion']);
  expect(placeOf('PageUp')).toEqual([0, 'rival']);
  expect(placeOf('PageDown')).toEqual([17, 'rival']);
  expect(placeOf('Home')).toEqual([5, 'focal']);
  expect(placeOf('End')).toEqual([5, 'exclusion']);
  expect(placeOf('Home', { ctrlKey: true })).toEqual([0, 'focal']);
  expect(placeOf('End', { metaKey: true })).toEqual([LAST, 'exclusion']);
});

test('typing opens a cell with the character, Enter and F2 with what it holds', () => {
  expect([press('7'), press('k'), press('-')]).toEqual([
    { kind: 'open', text: '7' },
    { kind: 'open', text: 'k' },
    { kind: 'open', text: '-' },
  ]);
  expect([press('Enter'), press('F2')]).toEqual([{ kind: 'open' }, { kind: 'open' }]);
});

test('Delete empties, Ctrl+Z takes back, other keys and commands of the browser are left alone', () => {
  expect(press('Delete')).toEqual({ kind: 'empty' });
  expect(press('z', { ctrlKey: true })).toEqual({ kind: 'undo' });
  for (const key of ['Tab', 'Escape', 'Shift', 'F5']) expect(press(key)).toBeNull();
  expect(press('r', { ctrlKey: true })).toBeNull();
  expect(press('v', { metaKey: true })).toBeNull();
  expect(press('d', { altKey: true })).toBeNull();
});
