/**
 * What the forms accept, one schema each: the page checks with it before sending, the service after receiving.
 * Free of server code, so that a page may import it.
 */
import { z } from 'zod';
import { priorSettingsSchema, RELATIVE_ERROR_RANGE } from '../estimate/prior-schema';
import { targetSchema } from '../scenario/answers';
import { moneySchema } from '../scenario/money';
import { MAX_SIDE_BY_SIDE } from '../scenario/push-bounds';
import { pushesSchema, pushSchema } from '../scenario/push-schema';
import { MAX_CANONICAL_LENGTH } from '../series/canonical-text';
import { cleanName } from '../series/clean-name';
import { MAX_SERIES_MONTHS, MAX_YEAR, MIN_YEAR } from '../series/limits';
import { makeMonth } from '../series/month';
import { cleanNote } from './clean-note';
import {
  MAX_EVENT_LENGTH,
  MAX_NAME_LENGTH,
  MAX_NOTE_LENGTH,
  MAX_PASSWORD_LENGTH,
  MAX_REASON_LENGTH,
  MIN_PASSWORD_LENGTH,
} from './form-limits';

/** RFC 5321: 254 characters fit in a mail path. */
const MAX_EMAIL_LENGTH = 254;
const MAX_FILE_NAME_LENGTH = 255;
const SHA_256 = /^[0-9a-f]{64}$/;
/** Sentences about how a file was read. */
const MAX_READING_NOTES = 40;
const MAX_READING_NOTE_LENGTH = 300;
/** Measurement error of a firm's counts, sd of ln users: 1 is "anything from a third to three times". */
const MAX_MEASUREMENT_ERROR = 1;
/** More people than there are. */
const MAX_ADDRESSABLE = 1e11;
/** Ten years: a link that should outlive that has no expiry. */
const MAX_LINK_DAYS = 3653;

const name = z.string().trim().max(MAX_NAME_LENGTH).transform(cleanName).pipe(z.string().min(1));
const line = (longest: number) => z.string().trim().max(longest).transform(cleanName).pipe(z.string().min(1));
const note = z
  .string()
  .max(MAX_NOTE_LENGTH)
  .transform((text) => cleanNote(text) || null)
  .nullable();
const month = z.int().min(makeMonth(MIN_YEAR, 1)).max(makeMonth(MAX_YEAR, 12));
const email = z.string().trim().toLowerCase().max(MAX_EMAIL_LENGTH).pipe(z.email());
const measurementError = z.number().min(0).max(MAX_MEASUREMENT_ERROR);

const addressable = z.number().positive().max(MAX_ADDRESSABLE).nullable();

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

/** A series as it was understood, and how it came about. The service reads `canonicalText` again, strictly. */
const contentFields = z.object({
  canonicalText: z.string().max(MAX_CANONICAL_LENGTH),
  /** Months that the fit leaves out. */
  exclusions: z.array(z.object({ month, reason: line(MAX_REASON_LENGTH) })).max(MAX_SERIES_MONTHS),
  fileName: z
    .string()
    .max(MAX_FILE_NAME_LENGTH)
    .transform((text) => cleanNote(text) || null)
    .nullable(),
  /** Of the file's bytes as they were given. */
  fileHash: z.string().regex(SHA_256).nullable(),
  readingNotes: z.array(z.string().max(MAX_READING_NOTE_LENGTH).transform(cleanNote)).max(MAX_READING_NOTES),
  /** Where the rival's figures come from. */
  sourceNote: note,
  /** Why there is this revision. */
  note,
});

export const revisionFormSchema = contentFields.extend({
  /** Number of the revision that the change was made from. */
  basedOn: z.int().min(1),
});
export type RevisionForm = z.input<typeof revisionFormSchema>;

export const restoreFormSchema = z.object({
  /** The revision to bring back. */
  number: z.int().min(1),
  basedOn: z.int().min(1),
});
export type RestoreForm = z.infer<typeof restoreFormSchema>;

export const eventFormSchema = z.object({
  month,
  note: line(MAX_EVENT_LENGTH),
  /** The firms may behave otherwise from this month on. */
  changesParameters: z.boolean(),
});
export type EventForm = z.input<typeof eventFormSchema>;

const marketFields = z.object({
  name,
  /** What is counted: "monthly active users". */
  unit: name,
  focalName: name,
  rivalName: name,
  focalError: measurementError,
  rivalError: measurementError,
  /** How many could use such a product at all, in users; null: not estimated. */
  focalAddressable: addressable.optional(),
  rivalAddressable: addressable.optional(),
  /** One sd of both, as a share of them. */
  addressableError: z.number().min(RELATIVE_ERROR_RANGE.min).max(RELATIVE_ERROR_RANGE.max).optional(),
});

export const marketFormSchema = marketFields.extend(contentFields.shape);
export type MarketForm = z.input<typeof marketFormSchema>;

export const marketEditSchema = marketFields.partial();
export type MarketEdit = z.input<typeof marketEditSchema>;

export const priorFormSchema = z.object({
  /** null: back to the usual ones. */
  priors: priorSettingsSchema.nullable(),
});
export type PriorForm = z.infer<typeof priorFormSchema>;

/** A named set of pushes, and what is assumed to count money; null: no money is counted. */
const namedPushes = z.object({ name, pushes: pushesSchema.min(1), money: moneySchema.nullable().optional() });

export const scenarioFormSchema = namedPushes.extend({
  /** An existing scenario to change; absent: a new one. */
  scenarioId: z.string().min(1).optional(),
});
export type ScenarioForm = z.infer<typeof scenarioFormSchema>;

export const issueFormSchema = z.object({
  /** What the forecast is compared under; empty: the outlook alone. */
  scenarios: z
    .array(
      namedPushes.extend({
        /** What the counter-push is asked for; absent: nothing. */
        question: z.object({ target: targetSchema, counter: pushSchema }).nullable().optional(),
      }),
    )
    .max(MAX_SIDE_BY_SIDE),
  /** Readers of a link may move the sliders of the pushes. */
  mayReadersTry: z.boolean(),
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
