/** Takes a market off the list. Its counts, outlooks and issued forecasts stay, and so do forecast links. */
import { archiveMarket as storeArchive } from '../store/markets';
import { refuse, type Success, succeed } from './outcome';
import type { NotAllowed, NotFound } from './parse-form';
import { canWrite, type Viewer } from './viewer';

export async function archiveMarket(
  viewer: Viewer,
  marketId: string,
): Promise<Success<{ marketId: string }> | NotAllowed | NotFound> {
  if (!canWrite(viewer)) return refuse('not-allowed');
  const { workspaceId, userId } = viewer;
  const isArchived = await storeArchive({
    workspaceId,
    marketId,
    audit: { userId, action: 'archive-market' },
  });
  return isArchived ? succeed({ marketId }) : refuse('not-found');
}
