'use server';

import { revalidatePath } from 'next/cache';
import { createForecastLink } from '@/lib/services/create-forecast-link';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { forecastLinkDaysSchema } from '../_forms/forecast-link-schema';
import { publicUrl } from '../_lib/public-url';
import { requireViewer } from '../_lib/require-viewer';

const DAY_MS = 86_400_000;

export interface ForecastLinkState {
  url: string | null;
  explanation: Explanation | null;
}

/** Makes a link to an issued forecast. Its address is in this answer and nowhere else. */
export async function createForecastLinkAction(
  marketId: string,
  issuedId: string,
  days: number | null,
): Promise<ForecastLinkState> {
  const viewer = await requireViewer();
  const parsed = forecastLinkDaysSchema.safeParse(days);
  if (!parsed.success) return { url: null, explanation: explainCode('invalid-input') };
  const expiresAt = parsed.data === null ? null : new Date(Date.now() + parsed.data * DAY_MS);
  const outcome = await createForecastLink(viewer, String(issuedId), { expiresAt });
  if (!outcome.ok) return { url: null, explanation: explainCode(outcome.code) };
  revalidatePath(`/markets/${marketId}`);
  return { url: publicUrl(outcome.value.path), explanation: null };
}
