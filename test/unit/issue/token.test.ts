import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { encodeToken, hintOfToken, isTokenShaped, TOKEN_BYTES, TOKEN_LENGTH } from '@/lib/issue/token';

const tokenBytes = fc.uint8Array({ minLength: TOKEN_BYTES, maxLength: TOKEN_BYTES });

describe('encodeToken', () => {
  it('writes what an independent base64url encoder writes', () => {
    fc.assert(
      fc.property(tokenBytes, (bytes) => {
        expect(encodeToken(bytes)).toBe(Buffer.from(bytes).toString('base64url'));
      }),
    );
  });

  it('holds at least 128 bits', () => {
    expect(TOKEN_BYTES * 8).toBeGreaterThanOrEqual(128);
    expect(encodeToken(new Uint8Array(TOKEN_BYTES))).toHaveLength(TOKEN_LENGTH);
  });

  it('refuses another number of bytes', () => {
    expect(() => encodeToken(new Uint8Array(15))).toThrow(RangeError);
  });
});

describe('isTokenShaped', () => {
  it('accepts every token and refuses it cut, padded, lengthened or with a foreign character', () => {
    fc.assert(
      fc.property(tokenBytes, (bytes) => {
        const token = encodeToken(bytes);
        expect(isTokenShaped(token)).toBe(true);
        for (const wrong of [
          token.slice(1),
          `${token}=`,
          `${token}A`,
          `/${token.slice(1)}`,
          ` ${token}`,
          `${token}\n`,
        ]) {
          expect(isTokenShaped(wrong)).toBe(false);
        }
      }),
    );
  });

  it('refuses an end that no 256 bits give', () => {
    expect(isTokenShaped(`${'A'.repeat(TOKEN_LENGTH - 1)}B`)).toBe(false);
  });
});

describe('hintOfToken', () => {
  it('shows few characters', () => {
    expect(hintOfToken(encodeToken(new Uint8Array(TOKEN_BYTES)))).toBe('AAAA');
  });
});
