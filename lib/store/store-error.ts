/** A failure of the database or of what it holds: thrown, and mapped to a response in one place. */
export type StoreErrorCode =
  /** DATABASE_URL is not set. */
  | 'no-database-url'
  /** DATABASE_URL is not the address of a PostgreSQL database. */
  | 'bad-database-url'
  /** A row holds something that this version cannot read. */
  | 'inconsistent-row';

export class StoreError extends Error {
  override readonly name = 'StoreError';
  readonly code: StoreErrorCode;

  /** `message` is for the log; it never holds a password or a user's data. */
  constructor(code: StoreErrorCode, message: string, options?: { cause?: unknown }) {
    super(message, options);
    this.code = code;
  }
}
