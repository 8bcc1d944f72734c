/**
 * What the forms accept, one schema each: the page checks with it before sending, the service after receiving.
 * Free of server code, so that a page may import it.
 */
import { z } from 'zod';
import { pushesSchema } from '../scenario/push-schema';
import type { SeriesMapping } from '../series/types';
import { MAX_NAME_LENGTH, MAX_NOTE_LENGTH, MAX_PASSWORD_LENGTH, MIN_PASSWORD_LENGTH } from './form-limits';

/** RFC 5321: 254 characters fit in a mail path. */
const MAX_EMAIL_LENGTH = 254;
/** Characters; some 100,000 rows, where a century of months is 1,200. */
const MAX_TABLE_LENGTH = 4_000_000;
const MAX_FILE_NAME_LENGTH = 255;
/** Measurement error of a firm's counts, sd of ln users: 1 is "anything from a third to three times". */
const MAX_MEASUREMENT_ERROR = 1;
/** Ten years: a link that should outlive that has no expiry. */
const MAX_LINK_DAYS = 3653;

const name = z.string().trim().min(1).max(MAX_NAME_LENGTH);
const email = z.string().trim().toLowerCase().max(MAX_EMAIL_LENGTH).pipe(z.email());
const measurementError = z.number().min(0).max(MAX_MEASUREMENT_ERROR);
const columnHeader = z.string().min(1);

export const signInFormSchema = z.object({ email, password: z.string().min(1).max(MAX_PASSWORD_LENGTH) });
export type SignInForm = z.infer<typeof signInFormSchema>;

export const setupFormSchema = z.object({
  name,
  email,
  password: z.string().min(MIN_PASSWORD_LENGTH).max(MAX_PASSWORD_LENGTH),
});
export type SetupForm = z.infer<typeof setupFormSchema>;

export const memberLinkFormSchema = z.object({ role: z.enum(['analyst', 'reader']) });
export type MemberLinkForm = z.infer<typeof memberLinkFormSchema>;

export const revisionFormSchema = z.object({
  fileName: z.string().trim().max(MAX_FILE_NAME_LENGTH).nullable(),
  text: z.string().max(MAX_TABLE_LENGTH),
  /** Headers of the columns to read, and how to read a table that could be read two ways. */
  mapping: z.object({
    month: columnHeader,
    focal: columnHeader,
    rival: columnHeader,
    decimalMark: z.enum(['point', 'comma']).optional(),
    dateOrder: z.enum(['day-first', 'month-first']).optional(),
  }) satisfies z.ZodType<SeriesMapping>,
  sourceNote: z.string().trim().max(MAX_NOTE_LENGTH).nullable(),
});
export type RevisionForm = z.infer<typeof revisionFormSchema>;

const marketFields = z.object({
  name,
  /** What is counted: "monthly active users". */
  unit: name,
  focalName: name,
  rivalName: name,
  focalError: measurementError,
  rivalError: measurementError,
});

export const marketFormSchema = marketFields.extend(revisionFormSchema.shape);
export type MarketForm = z.infer<typeof marketFormSchema>;

export const marketEditSchema = marketFields.partial();
export type MarketEdit = z.infer<typeof marketEditSchema>;

export const scenarioFormSchema = z.object({
  /** An existing scenario to change; absent: a new one. */
  scenarioId: z.string().min(1).optional(),
  name,
  pushes: pushesSchema.min(1),
});
export type ScenarioForm = z.infer<typeof scenarioFormSchema>;

export const issueFormSchema = z.object({
  /** What the forecast is compared under; null or empty: the outlook alone. */
  pushes: pushesSchema.nullable(),
  scenarioName: name.optional(),
});
export type IssueForm = z.infer<typeof issueFormSchema>;

export const forecastLinkFormSchema = z.object({
  expiresAt: z
    .date()
    .refine((date) => date.getTime() > Date.now(), { message: 'must lie ahead' })
    .refine((date) => date.getTime() < Date.now() + MAX_LINK_DAYS * 86_400_000, { message: 'too far ahead' })
    .nullable(),
});
export type ForecastLinkForm = z.infer<typeof forecastLinkFormSchema>;
