import fc from 'fast-check';
import { expect, test } from 'vitest';
import { cleanName, cutText } from '@/lib/series/clean-name';
import { MAX_NAME_LENGTH } from '@/lib/series/limits';

test.each([
  ['  two\n words ', 'two words'],
  ['a\u200bb\u202ec\u0007', 'abc'],
  ["'=SUM(A1)", '=SUM(A1)'],
  ["'n Beetje", "'n Beetje"],
  ['\ud800x', 'x'],
  ['', ''],
])('%j becomes %j', (text, clean) => {
  expect(cleanName(text)).toBe(clean);
});

test('a clean name stays as it is', () => {
  fc.assert(
    fc.property(fc.string({ unit: 'binary' }), (text) => cleanName(cleanName(text)) === cleanName(text)),
  );
});

test('names are short and no character is cut in half', () => {
  const cut = cleanName('😀'.repeat(200));
  expect([...cut]).toHaveLength(MAX_NAME_LENGTH);
  expect(cut).not.toMatch(/[\ud800-\udfff](?![\udc00-\udfff])$/);
  expect(cutText('abc', 3)).toBe('abc');
  expect(cutText('abcd', 3)).toBe('ab…');
});
