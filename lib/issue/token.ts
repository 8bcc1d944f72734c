/**
 * Tokens of links: random bytes given by the caller, written in base64url without padding (RFC 4648, section 5), so that they fit a
 * path as they stand. The shape is checked before anything is looked up: what cannot be a token costs no query.
 */

/** 256 bits; at least 128 are wanted. */
export const TOKEN_BYTES = 32;
/** Characters of an encoded token. */
export const TOKEN_LENGTH = Math.ceil((TOKEN_BYTES * 8) / 6);
/** First characters that tell links apart in a list; they give away 24 of 256 bits. */
export const HINT_LENGTH = 4;

const ALPHABET = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_';
const TOKEN_SHAPE = new RegExp(`^[A-Za-z0-9_-]{${TOKEN_LENGTH}}$`);
/** 256 bits leave 4 in the last character, so its two lowest bits are 0. */
const LAST_CHARACTERS = new Set([...ALPHABET].filter((_, value) => value % 4 === 0));

/**
 * @param bytes TOKEN_BYTES random bytes
 * @throws RangeError for another number of bytes
 */
export function encodeToken(bytes: Uint8Array): string {
  if (bytes.length !== TOKEN_BYTES) {
    throw new RangeError(`bytes must hold ${TOKEN_BYTES} random bytes, got ${bytes.length}`);
  }
  let text = '';
  let buffer = 0;
  let bits = 0;
  for (const byte of bytes) {
    buffer = ((buffer << 8) | byte) & 0xffff;
    bits += 8;
    while (bits >= 6) {
      bits -= 6;
      text += ALPHABET[(buffer >> bits) & 63];
    }
  }
  return bits > 0 ? text + ALPHABET[(buffer << (6 - bits)) & 63] : text;
}

/** Could `text` be a token that `encodeToken` wrote? */
export function isTokenShaped(text: string): boolean {
  return TOKEN_SHAPE.test(text) && LAST_CHARACTERS.has(text.charAt(TOKEN_LENGTH - 1));
}

/** What a list of links may show of a token. */
export function hintOfToken(token: string): string {
  return token.slice(0, HINT_LENGTH);
}
