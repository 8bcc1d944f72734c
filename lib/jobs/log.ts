/** The log of the server's own processes: one JSON object a line on standard error, ids and codes only, never data or tokens. */
import pino, { type Logger } from 'pino';

export type { Logger };

let logger: Logger | null = null;

export function getLogger(): Logger {
  logger ??= pino(
    { level: process.env.LOG_LEVEL?.trim() || 'info', base: { pid: process.pid } },
    pino.destination({ dest: 2, sync: true }),
  );
  return logger;
}
