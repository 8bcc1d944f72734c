/** Markets for tests of jobs and services: a sample's series as an analyst would upload it. */
import { toCanonicalText } from '@/lib/series/canonical-text';
import type { MonthlySeries } from '@/lib/series/types';
import { createMarket } from '@/lib/services/create-market';
import type { MarketForm, RevisionForm } from '@/lib/services/forms';
import type { Viewer } from '@/lib/services/viewer';
import { makeSample } from '../unit/brief/sample-report';

export const SAMPLE_SERIES = makeSample('coexistence').facts.series;

export function marketForm(changes: Partial<MarketForm> = {}): MarketForm {
  return {
    name: 'Ferry tickets, north',
    unit: 'monthly active users',
    focalName: 'Norrland',
    rivalName: 'Halcyon',
    focalError: 0,
    rivalError: 0.1,
    fileName: 'tickets.csv',
    fileHash: null,
    canonicalText: toCanonicalText(SAMPLE_SERIES),
    exclusions: [],
    readingNotes: [],
    sourceNote: null,
    note: null,
    ...changes,
  };
}

/** The next revision of a market, made from revision 1. */
export function revisionForm(series: MonthlySeries, changes: Partial<RevisionForm> = {}): RevisionForm {
  const { fileName, fileHash, exclusions, readingNotes, sourceNote, note } = marketForm();
  const canonicalText = toCanonicalText(series);
  const source = { fileName, fileHash, readingNotes, sourceNote, note };
  return { basedOn: 1, canonicalText, exclusions, ...source, ...changes };
}

export async function uploadMarket(viewer: Viewer, changes: Partial<MarketForm> = {}) {
  const outcome = await createMarket(viewer, marketForm(changes));
  if (!outcome.ok) throw new Error(`upload refused: ${JSON.stringify(outcome)}`);
  return outcome.value;
}
