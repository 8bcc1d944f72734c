/** Reads a stored issued forecast by the version that it carries. Older versions keep their reader; a newer one is told by its code. */
import { z } from 'zod';
import { ISSUE_FORMAT_VERSION, type IssuedForecast, issuedForecastSchema } from './format';

export type IssuedReading =
  | { ok: true; value: IssuedForecast }
  /** Written by a later release than this one. */
  | { ok: false; code: 'unknown-version'; version: number }
  /** Not an issued forecast, or damaged. */
  | { ok: false; code: 'unreadable' };

const versionedSchema = z.object({ formatVersion: z.number().int().positive() });

/** One reader per version; each gives the current shape. */
const READERS: Record<number, (json: unknown) => z.ZodSafeParseResult<IssuedForecast>> = {
  [ISSUE_FORMAT_VERSION]: (json) => issuedForecastSchema.safeParse(json),
};

export function readIssuedForecast(json: unknown): IssuedReading {
  const versioned = versionedSchema.safeParse(json);
  if (!versioned.success) return { ok: false, code: 'unreadable' };
  const { formatVersion } = versioned.data;
  const read = READERS[formatVersion];
  if (!read) return { ok: false, code: 'unknown-version', version: formatVersion };
  const parsed = read(json);
  return parsed.success ? { ok: true, value: parsed.data } : { ok: false, code: 'unreadable' };
}
