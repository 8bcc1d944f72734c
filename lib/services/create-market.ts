/** Stores a new market with its first revision and has it fitted. */
import { enqueueFit } from '../jobs/enqueue-fit';
import { createMarket as storeMarket } from '../store/markets';
import { type MarketForm, marketFormSchema } from './forms';
import { newFit } from './new-fit';
import { type Success, succeed } from './outcome';
import { type InvalidInput, type NotAllowed, parseWrite } from './parse-form';
import { readFormSeries, type UnreadableSeries } from './read-form-series';
import type { Viewer } from './viewer';

export async function createMarket(
  viewer: Viewer,
  form: MarketForm,
): Promise<Success<{ marketId: string; fitId: string }> | NotAllowed | InvalidInput | UnreadableSeries> {
  const parsed = parseWrite(viewer, marketFormSchema, form);
  if (!parsed.ok) return parsed;
  const content = readFormSeries(parsed.value, parsed.value);
  if (!content.ok) return content;
  const { workspaceId, userId, userName } = viewer;
  const {
    canonicalText: _text,
    exclusions: _exclusions,
    fileName,
    fileHash,
    readingNotes,
    sourceNote,
    note,
    ...market
  } = parsed.value;
  const source = { fileName, fileHash, readingNotes, sourceNote, note };
  const fit = newFit(viewer, market);
  const { marketId } = await storeMarket({
    workspaceId,
    market,
    revision: { ...content.value, ...source, createdById: userId, createdByName: userName },
    fit,
    audit: { userId, action: 'create-market', detail: { months: content.value.series.focal.length } },
  });
  await enqueueFit({ fitId: fit.id, workspaceId });
  return succeed({ marketId, fitId: fit.id });
}
