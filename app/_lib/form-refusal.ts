/** A service's refusal of a form as a page shows it: sentences by field, and one for the whole form. */
import { type Explanation, explainCode, type ServiceCode } from '@/lib/services/explain';
import type { FieldProblem } from '@/lib/services/field-problems';
import { explainFields, type FieldSentences } from './explain-field';

export interface FormRefusal {
  fields: FieldSentences;
  explanation: Explanation;
}

export function readRefusal(refusal: { code: ServiceCode; fields?: FieldProblem[] }): FormRefusal {
  return { fields: explainFields(refusal.fields ?? []), explanation: explainCode(refusal.code) };
}
