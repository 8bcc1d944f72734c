import { expect, test } from 'vitest';
import { renderTable, wrapText } from '@/lib/cli/text-layout';

test('paragraphs break at spaces and lose no word', () => {
  const words = Array.from({ length: 60 }, (_, index) => `word${index}`);
  const lines = wrapText(words.join(' '), 2).split('\n');
  expect(lines.length).toBeGreaterThan(3);
  expect(lines.every((line) => line.length <= 100)).toBe(true);
  expect(lines.slice(1).every((line) => line.startsWith('  w'))).toBe(true);
  expect(lines.join(' ').split(/\s+/)).toEqual(words);
});

test('a word longer than a line stays whole', () => {
  expect(wrapText(`a ${'x'.repeat(150)} b`)).toBe(`a\n${'x'.repeat(150)}\nb`);
});

test('cells stand in columns, whatever characters they hold', () => {
  expect(
    renderTable([
      ['a', '12\u00a0%', 'z'],
      ['Ærø 😀', '1', ''],
    ]),
  ).toBe('a      12 %  z\nÆrø 😀  1');
  expect(renderTable([])).toBe('');
});
