/** The gate of every writing service: rights first, then the form. */
import type { z } from 'zod';
import { type FieldProblem, listFieldProblems } from './field-problems';
import { type Refusal, refuse, type Success, succeed } from './outcome';
import { canWrite, type Viewer } from './viewer';

export type NotAllowed = Refusal<'not-allowed'>;
export type NotFound = Refusal<'not-found'>;
export type InvalidInput = Refusal<'invalid-input', { fields: FieldProblem[] }>;

export function parseForm<T>(schema: z.ZodType<T>, form: unknown): Success<T> | InvalidInput {
  const parsed = schema.safeParse(form);
  return parsed.success
    ? succeed(parsed.data)
    : refuse('invalid-input', { fields: listFieldProblems(parsed.error) });
}

export function parseWrite<T>(
  viewer: Viewer,
  schema: z.ZodType<T>,
  form: unknown,
): Success<T> | InvalidInput | NotAllowed {
  return canWrite(viewer) ? parseForm(schema, form) : refuse('not-allowed');
}
