/** Changes a market's names, unit or measurement errors. What was issued before stays as it was. */
import { editMarket as storeEdit } from '../store/markets';
import { type MarketEdit, marketEditSchema } from './forms';
import { refuse, type Success, succeed } from './outcome';
import { type InvalidInput, type NotAllowed, type NotFound, parseWrite } from './parse-form';
import type { Viewer } from './viewer';

export async function editMarket(
  viewer: Viewer,
  marketId: string,
  edit: MarketEdit,
): Promise<Success<{ marketId: string }> | NotAllowed | InvalidInput | NotFound> {
  const parsed = parseWrite(viewer, marketEditSchema, edit);
  if (!parsed.ok) return parsed;
  const { workspaceId, userId } = viewer;
  const detail = { fields: Object.keys(parsed.value).join(' ') };
  const audit = { userId, action: 'edit-market', detail };
  const isEdited = await storeEdit({ workspaceId, marketId, changes: parsed.value, audit });
  return isEdited ? succeed({ marketId }) : refuse('not-found');
}
