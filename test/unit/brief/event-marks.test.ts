import { expect, test } from 'vitest';
import { markEvents, tellExclusions } from '@/lib/brief/event-marks';
import { createMonthFormat } from '@/lib/brief/month-words';

const months = createMonthFormat('en-US');
const MARCH = 2024 * 12 + 2;
const event = (month: number, note: string, changesParameters = false) => ({
  month,
  note,
  changesParameters,
});

test('events get letters in the order of their months; those of one month share one', () => {
  const marks = markEvents(
    [event(MARCH + 1, 'outage.'), event(MARCH, 'price change', true), event(MARCH + 1, 'refund')],
    months,
  );
  expect(marks).toEqual([
    {
      month: MARCH,
      letter: 'a',
      isBreak: true,
      text: 'Mar 2024: price change (strengths may have changed).',
    },
    { month: MARCH + 1, letter: 'b', isBreak: false, text: 'Apr 2024: outage; refund.' },
  ]);
});

test('letters go on after z and none comes twice', () => {
  const marks = markEvents(
    Array.from({ length: 60 }, (_, i) => event(MARCH + i, 'x')),
    months,
  );
  expect([25, 26, 27, 52].map((index) => marks[index]!.letter)).toEqual(['z', 'aa', 'ab', 'ba']);
  expect(new Set(marks.map(({ letter }) => letter)).size).toBe(60);
});

test('left-out months are told with their reasons', () => {
  expect(tellExclusions([], months)).toBe('');
  expect(tellExclusions([{ month: MARCH, reason: 'strike' }], months)).toBe(
    'Left out of the fit: Mar 2024 (strike).',
  );
});
