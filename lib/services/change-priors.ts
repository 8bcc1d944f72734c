/** Changes what is assumed of a market before its counts speak, and has it fitted so. */
import { setPriors } from '../store/markets';
import { type PriorForm, priorFormSchema } from './forms';
import { refuse, type Success } from './outcome';
import { type InvalidInput, type NotAllowed, type NotFound, parseWrite } from './parse-form';
import { requestFit } from './request-fit';
import type { Viewer } from './viewer';

export async function changePriors(
  viewer: Viewer,
  marketId: string,
  form: PriorForm,
): Promise<Success<{ fitId: string }> | NotAllowed | InvalidInput | NotFound> {
  const parsed = parseWrite(viewer, priorFormSchema, form);
  if (!parsed.ok) return parsed;
  const { workspaceId, userId } = viewer;
  const { priors } = parsed.value;
  const audit = { userId, action: 'change-priors', detail: { usual: priors === null ? 'yes' : 'no' } };
  const isSet = await setPriors({ workspaceId, marketId, priors, audit });
  return isSet ? requestFit(viewer, marketId) : refuse('not-found');
}
