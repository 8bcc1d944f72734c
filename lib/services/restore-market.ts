/** Puts an archived market back on the list. */
import { restoreMarket as storeRestore } from '../store/markets';
import { refuse, type Success, succeed } from './outcome';
import type { NotAllowed, NotFound } from './parse-form';
import { canWrite, type Viewer } from './viewer';

export async function restoreMarket(
  viewer: Viewer,
  marketId: string,
): Promise<Success<{ marketId: string }> | NotAllowed | NotFound> {
  if (!canWrite(viewer)) return refuse('not-allowed');
  const { workspaceId, userId } = viewer;
  const isRestored = await storeRestore({
    workspaceId,
    marketId,
    audit: { userId, action: 'restore-market' },
  });
  return isRestored ? succeed({ marketId }) : refuse('not-found');
}
