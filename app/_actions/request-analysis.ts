'use server';

import { revalidatePath } from 'next/cache';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { requestAnalysis } from '@/lib/services/request-analysis';
import { requireViewer } from '../_lib/require-viewer';

/** Has an analysis of the outlook that is shown made again. null: asked for. */
export async function requestAnalysisAction(
  marketId: string,
  kind: 'backtest' | 'identifiability',
): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await requestAnalysis(viewer, String(marketId), kind);
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath(`/markets/${marketId}`);
  return null;
}
