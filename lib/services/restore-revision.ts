/** Brings back the content of an earlier revision, as a new revision: nothing that came after it is lost. */
import { readMarket } from '../store/markets';
import { readRevisionByNumber } from '../store/revisions';
import { type RestoreForm, restoreFormSchema } from './forms';
import { type Refusal, refuse, type Success } from './outcome';
import { type InvalidInput, type NotAllowed, type NotFound, parseWrite } from './parse-form';
import { type StoredRevision, storeRevision } from './store-revision';
import type { Viewer } from './viewer';

export async function restoreRevision(
  viewer: Viewer,
  marketId: string,
  form: RestoreForm,
): Promise<
  | Success<StoredRevision>
  | NotAllowed
  | InvalidInput
  | NotFound
  | Refusal<'same-series'>
  | Refusal<'newer-revision'>
> {
  const parsed = parseWrite(viewer, restoreFormSchema, form);
  if (!parsed.ok) return parsed;
  const { workspaceId } = viewer;
  const { number, basedOn } = parsed.value;
  const [market, earlier] = await Promise.all([
    readMarket({ workspaceId, marketId }),
    readRevisionByNumber({ workspaceId, marketId, number }),
  ]);
  if (!market || !earlier) return refuse('not-found');
  const { series, exclusions, fileName, fileHash, sourceNote, readingNotes } = earlier;
  const revision = {
    series,
    exclusions,
    fileName,
    fileHash,
    sourceNote,
    readingNotes,
    restoredFrom: number,
  };
  return storeRevision(viewer, market, { basedOn, revision, action: 'restore-revision' });
}
