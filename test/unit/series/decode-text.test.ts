import { expect, test } from 'vitest';
import { decodeText } from '@/lib/series/decode-text';

const text = 'Month,Größe,Ærø\n';
const utf16 = (bigEndian: boolean) => {
  const bytes = [...`\uFEFF${text}`].flatMap((character) => {
    const code = character.charCodeAt(0);
    return bigEndian ? [code >> 8, code & 255] : [code & 255, code >> 8];
  });
  return Uint8Array.from(bytes);
};

test.each([
  ['UTF-8', new TextEncoder().encode(text)],
  ['UTF-8 with a byte order mark', new TextEncoder().encode(`\uFEFF${text}`)],
  ['UTF-16, little end first', utf16(false)],
  ['UTF-16, big end first', utf16(true)],
  ['Windows-1252', Uint8Array.from([...text].map((character) => character.charCodeAt(0)))],
])('%s', (_, bytes) => {
  expect(decodeText(bytes)).toBe(text);
});
