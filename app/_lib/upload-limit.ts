/**
 * Largest table that a form carries, bytes. A century of months has a few kilobytes; next.config.js lets forms of this size,
 * with their envelope, through.
 */
export const MAX_UPLOAD_BYTES = 4_000_000;
