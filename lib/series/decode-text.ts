/**
 * Bytes of a file -> text: UTF-8 and UTF-16 by their byte order mark, else UTF-8 when the bytes are valid, else Windows-1252,
 * which older spreadsheets write.
 */

/** The text without its byte order mark. */
export function decodeText(bytes: Uint8Array): string {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return new TextDecoder('utf-16le').decode(bytes);
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return new TextDecoder('utf-16be').decode(bytes);
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return new TextDecoder('windows-1252').decode(bytes);
  }
}
