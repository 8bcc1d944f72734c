/** Withdraws a forecast link for good. */
import { revokeForecastLink as storeRevocation } from '../store/forecast-links';
import { refuse, type Success, succeed } from './outcome';
import type { NotAllowed, NotFound } from './parse-form';
import { canWrite, type Viewer } from './viewer';

export async function revokeForecastLink(
  viewer: Viewer,
  linkId: string,
): Promise<Success<{ linkId: string }> | NotAllowed | NotFound> {
  if (!canWrite(viewer)) return refuse('not-allowed');
  const { workspaceId, userId } = viewer;
  const audit = { userId, action: 'revoke-forecast-link' };
  const isRevoked = await storeRevocation({ workspaceId, linkId, audit });
  return isRevoked ? succeed({ linkId }) : refuse('not-found');
}
