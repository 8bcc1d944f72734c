/** Adds the next revision of a market's series and has it fitted. Earlier revisions stay as they are. */
import { enqueueFit } from '../jobs/enqueue-fit';
import { readMarket } from '../store/markets';
import { hashSeries, latestRevision, addRevision as storeRevision } from '../store/revisions';
import { type RevisionForm, revisionFormSchema } from './forms';
import { newFit } from './new-fit';
import { type Refusal, refuse, type Success, succeed } from './outcome';
import { type InvalidInput, type NotAllowed, type NotFound, parseWrite } from './parse-form';
import { readFormSeries, type UnreadableSeries } from './read-form-series';
import type { Viewer } from './viewer';

export async function addRevision(
  viewer: Viewer,
  marketId: string,
  form: RevisionForm,
): Promise<
  | Success<{ revisionNumber: number; fitId: string }>
  | NotAllowed
  | InvalidInput
  | NotFound
  | UnreadableSeries
  | Refusal<'same-series'>
> {
  const parsed = parseWrite(viewer, revisionFormSchema, form);
  if (!parsed.ok) return parsed;
  const { workspaceId, userId } = viewer;
  const market = await readMarket({ workspaceId, marketId });
  if (!market) return refuse('not-found');
  const series = readFormSeries(parsed.value);
  if (!series.ok) return series;
  const newest = await latestRevision({ workspaceId, marketId });
  if (newest?.contentHash === hashSeries(series.value)) return refuse('same-series');
  const { fileName, sourceNote } = parsed.value;
  const fit = newFit(viewer, market);
  const stored = await storeRevision({
    workspaceId,
    marketId,
    revision: { series: series.value, fileName, sourceNote, createdById: userId },
    fit,
    audit: { userId, action: 'add-revision', detail: { months: series.value.focal.length } },
  });
  if (!stored) return refuse('not-found');
  await enqueueFit({ fitId: fit.id, workspaceId });
  return succeed({ revisionNumber: stored.revisionNumber, fitId: fit.id });
}
