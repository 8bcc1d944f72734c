/** Lengths that forms accept; the fields of a page show them without carrying the schemas. */
export const MIN_PASSWORD_LENGTH = 10;
/** Longer ones only cost hashing time. */
export const MAX_PASSWORD_LENGTH = 128;
export const MAX_NAME_LENGTH = 80;
export const MAX_NOTE_LENGTH = 500;
/** A dated event and the reason for leaving out a month stand beside a chart: a line, not a page. */
export const MAX_EVENT_LENGTH = 160;
export const MAX_REASON_LENGTH = 160;
