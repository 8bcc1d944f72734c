/**
 * Adds the next revision of a market's series and has it fitted. Earlier revisions stay as they are. A change that was made from
 * a revision which is no longer the newest is not stored: its maker gets the newest one to compare with.
 */
import type { SeriesContent } from '../series/compare-series';
import { readMarket } from '../store/markets';
import { latestRevision } from '../store/revisions';
import { type RevisionForm, revisionFormSchema } from './forms';
import type { Refusal, Success } from './outcome';
import { refuse } from './outcome';
import { type InvalidInput, type NotAllowed, type NotFound, parseWrite } from './parse-form';
import { readFormSeries, type UnreadableSeries } from './read-form-series';
import { type StoredRevision, storeRevision } from './store-revision';
import type { Viewer } from './viewer';

/** The revision that came in between. */
export interface NewestContent extends SeriesContent {
  number: number;
  createdByName: string | null;
  createdAt: Date;
}

export type RevisionRefusal =
  | NotAllowed
  | InvalidInput
  | NotFound
  | UnreadableSeries
  | Refusal<'same-series'>
  | Refusal<'newer-revision', { newest: NewestContent }>;

export async function addRevision(
  viewer: Viewer,
  marketId: string,
  form: RevisionForm,
): Promise<Success<StoredRevision> | RevisionRefusal> {
  const parsed = parseWrite(viewer, revisionFormSchema, form);
  if (!parsed.ok) return parsed;
  const { workspaceId } = viewer;
  const market = await readMarket({ workspaceId, marketId });
  if (!market) return refuse('not-found');
  const content = readFormSeries(parsed.value, market);
  if (!content.ok) return content;
  const { basedOn, fileName, fileHash, readingNotes, sourceNote, note } = parsed.value;
  const revision = { ...content.value, fileName, fileHash, readingNotes, sourceNote, note };
  const stored = await storeRevision(viewer, market, { basedOn, revision, action: 'add-revision' });
  return !stored.ok && stored.code === 'newer-revision' ? withNewest(viewer, marketId) : stored;
}

async function withNewest(
  { workspaceId }: Viewer,
  marketId: string,
): Promise<NotFound | Refusal<'newer-revision', { newest: NewestContent }>> {
  const latest = await latestRevision({ workspaceId, marketId });
  if (!latest) return refuse('not-found');
  const { number, createdByName, createdAt, series, exclusions } = latest;
  return refuse('newer-revision', { newest: { number, createdByName, createdAt, series, exclusions } });
}
