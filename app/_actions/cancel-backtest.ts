'use server';

import { revalidatePath } from 'next/cache';
import { cancelAnalysis } from '@/lib/services/cancel-analysis';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { requireViewer } from '../_lib/require-viewer';

/** Cancels the test of past forecasts that waits or runs. null: asked for. */
export async function cancelBacktestAction(marketId: string): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await cancelAnalysis(viewer, String(marketId), 'backtest');
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath(`/markets/${marketId}`);
  return null;
}
