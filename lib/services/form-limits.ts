/** Lengths that forms accept; the fields of a page show them without carrying the schemas. */
export const MIN_PASSWORD_LENGTH = 10;
/** Longer ones only cost hashing time. */
export const MAX_PASSWORD_LENGTH = 128;
export const MAX_NAME_LENGTH = 80;
export const MAX_NOTE_LENGTH = 500;
