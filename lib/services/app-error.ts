/** A failure of the outside world (settings, database, file system): thrown, and mapped to a response in one place. */
export type AppErrorCode = 'bad-settings' | 'no-secret' | 'inconsistent-data';

export class AppError extends Error {
  override readonly name = 'AppError';
  readonly code: AppErrorCode;

  /** `message` is for the log; people see the sentence that `explain.ts` has for the code. */
  constructor(code: AppErrorCode, message: string, options?: { cause?: unknown }) {
    super(message, options);
    this.code = code;
  }
}
