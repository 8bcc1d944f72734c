/** Sentences for what is wrong with a form's fields, by field name; one for each. */

import type { FieldProblem } from '@/lib/services/field-problems';
import { MAX_NAME_LENGTH, MIN_PASSWORD_LENGTH } from '@/lib/services/form-limits';

const BY_FIELD: Record<string, Partial<Record<FieldProblem['code'], string>>> = {
  email: { 'wrong-format': 'This is not an e-mail address.' },
  password: { 'too-small': `A password needs at least ${MIN_PASSWORD_LENGTH} characters.` },
  focalError: {
    'wrong-format': 'Give a percentage between 0 and 100.',
    'too-large': 'Give a percentage between 0 and 100.',
  },
  rivalError: {
    'wrong-format': 'Give a percentage between 0 and 100.',
    'too-large': 'Give a percentage between 0 and 100.',
  },
  focalAddressable: {
    'wrong-format': 'Write a number of users, or leave it empty.',
    'too-small': 'Write a number of users above zero, or leave it empty.',
    'too-large': 'This is more than there are people.',
  },
  rivalAddressable: {
    'wrong-format': 'Write a number of users, or leave it empty.',
    'too-small': 'Write a number of users above zero, or leave it empty.',
    'too-large': 'This is more than there are people.',
  },
  expiresAt: { 'wrong-format': 'This is not a date.' },
};

const BY_CODE: Record<FieldProblem['code'], string> = {
  missing: 'This is empty.',
  'too-small': 'This is too short.',
  'too-large': `This is too long: at most ${MAX_NAME_LENGTH} characters.`,
  'wrong-format': 'This cannot be read.',
};

export type FieldSentences = Record<string, string>;

export function explainFields(problems: FieldProblem[]): FieldSentences {
  const sentences: FieldSentences = {};
  for (const { field, code } of problems) sentences[field] ??= BY_FIELD[field]?.[code] ?? BY_CODE[code];
  return sentences;
}
