'use server';

import { revalidatePath } from 'next/cache';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { requestAnalysis } from '@/lib/services/request-analysis';
import { requireViewer } from '../_lib/require-viewer';

/** Has past forecasts of a market tested again. null: asked for. */
export async function requestBacktestAction(marketId: string): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await requestAnalysis(viewer, String(marketId), 'backtest');
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath(`/markets/${marketId}`);
  return null;
}
