/** What is wrong with a form, field by field, without sentences. */
import type { z } from 'zod';

export interface FieldProblem {
  /** Name of the field, nested ones joined with dots. */
  field: string;
  code: 'missing' | 'too-small' | 'too-large' | 'wrong-format';
}

export function listFieldProblems(error: z.ZodError): FieldProblem[] {
  return error.issues.map((issue) => ({ field: issue.path.join('.'), code: classify(issue) }));
}

function classify(issue: z.core.$ZodIssue): FieldProblem['code'] {
  if (issue.code === 'too_small')
    return issue.origin === 'string' && issue.minimum === 1 ? 'missing' : 'too-small';
  if (issue.code === 'too_big') return 'too-large';
  if (issue.code === 'invalid_type' && issue.input == null) return 'missing';
  return 'wrong-format';
}
