/** JSON columns: what each holds, and reading one without trusting it. */
import { z } from 'zod';
import { addressableSchema, priorSettingsSchema } from '../estimate/prior-schema';
import type { FitOptions, FitProgress } from '../estimate/types';
import { StoreError } from './store-error';

export const fitOptionsSchema = z.object({
  seed: z.number().int().nonnegative(),
  horizonMonths: z.number().int().positive(),
  measurementFloor: z.object({ focal: z.number().nonnegative(), rival: z.number().nonnegative() }),
  errorModel: z.enum(['ar1', 'process-noise']),
  changeMonths: z.array(z.number().int()).optional(),
  addressable: addressableSchema.optional(),
  priors: priorSettingsSchema.optional(),
}) satisfies z.ZodType<FitOptions>;

export const fitProgressSchema = z.object({
  stage: z.enum(['starts', 'polish', 'warm-up', 'sampling', 'outlook']),
  startsDone: z.number(),
  startsTotal: z.number(),
  bestValue: z.number().nullable(),
  drawsKept: z.number(),
  drawsTarget: z.number(),
  rHat: z.number().nullable(),
  ess: z.number().nullable(),
}) satisfies z.ZodType<FitProgress>;

/**
 * @param column for the log, e.g. "fit.result"
 * @throws StoreError 'inconsistent-row' when the value is not what the column holds.
 */
export function readJson<T>(schema: z.ZodType<T>, value: unknown, column: string, id: string): T {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const places = parsed.error.issues.slice(0, 3).map((issue) => issue.path.join('.') || 'top level');
  throw new StoreError('inconsistent-row', `${column} of ${id} cannot be read at ${places.join(', ')}`);
}
