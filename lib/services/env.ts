/**
 * Settings of the services, read from the environment on first use, so that a build needs none.
 * A blank variable counts as unset.
 */
import { z } from 'zod';
import { AppError } from './app-error';

const DEFAULT_PORT = 3000;
/** Better-auth's own lower limit; 32 random characters are well over 128 bits. */
const MIN_SECRET_LENGTH = 32;

const environmentSchema = z.object({
  /** Public address of the app, without a path. */
  APP_URL: z.url({ protocol: /^https?$/ }).optional(),
  PORT: z.coerce.number().int().min(1).max(65_535).default(DEFAULT_PORT),
  /** Signs the session cookies. */
  AUTH_SECRET: z.string().min(MIN_SECRET_LENGTH).optional(),
  /** Folder of the embedded database and of the generated secret. */
  DATA_DIR: z.string().default('.data'),
});

export interface Settings {
  /** Origin only, e.g. "https://forecast.example.org". */
  appUrl: string;
  isHttps: boolean;
  authSecret: string | null;
  dataFolder: string;
}

let settings: Settings | null = null;

export function getSettings(): Settings {
  settings ??= readSettings(process.env);
  return settings;
}

/** @throws AppError 'bad-settings' naming each variable that cannot be used. */
export function readSettings(environment: Record<string, string | undefined>): Settings {
  const filled = Object.fromEntries(Object.entries(environment).filter(([, value]) => value?.trim()));
  const parsed = environmentSchema.safeParse(filled);
  if (!parsed.success) {
    const reasons = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
    throw new AppError('bad-settings', `Environment variables that cannot be used: ${reasons.join('; ')}`);
  }
  const { APP_URL, PORT, AUTH_SECRET, DATA_DIR } = parsed.data;
  const appUrl = new URL(APP_URL ?? `http://localhost:${PORT}`).origin;
  return {
    appUrl,
    isHttps: appUrl.startsWith('https:'),
    authSecret: AUTH_SECRET ?? null,
    dataFolder: DATA_DIR,
  };
}
