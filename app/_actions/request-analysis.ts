'use server';

import { revalidatePath } from 'next/cache';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { requestAnalysis } from '@/lib/services/request-analysis';
import { isAnalysisKind } from '@/lib/store/analysis-kinds';
import { requireViewer } from '../_lib/require-viewer';

/** Has an analysis of the outlook that is shown made again. null: asked for. */
export async function requestAnalysisAction(marketId: string, kind: string): Promise<Explanation | null> {
  const viewer = await requireViewer();
  if (!isAnalysisKind(kind)) return explainCode('invalid-input');
  const outcome = await requestAnalysis(viewer, String(marketId), kind);
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath(`/markets/${marketId}`);
  return null;
}
