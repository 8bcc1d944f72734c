/**
 * Largest file that is read, bytes, and longest paste, characters. Files are read in the browser; what is sent is the series that
 * was understood, a few kilobytes.
 */
export const MAX_FILE_BYTES = 20_000_000;
