/** How all analyses of an outlook stand, and what those that are done add to the facts of its brief. */
import type { BriefFacts } from '../brief/facts';
import { type AnalysisStanding, readAnalysisOf } from './read-analysis';
import type { Viewer } from './viewer';

export interface OutlookAnalyses {
  backtest: AnalysisStanding<'backtest'>;
  identifiability: AnalysisStanding<'identifiability'>;
}

/** @param revisionId of the fit whose outlook is shown */
export async function readOutlookAnalyses(viewer: Viewer, revisionId: string): Promise<OutlookAnalyses> {
  const [backtest, identifiability] = await Promise.all([
    readAnalysisOf(viewer, revisionId, 'backtest'),
    readAnalysisOf(viewer, revisionId, 'identifiability'),
  ]);
  return { backtest, identifiability };
}

/** Nothing for those that are not done. */
export function toAnalysisFacts(analyses: OutlookAnalyses): Pick<BriefFacts, 'backtest' | 'identifiability'> {
  const { result: backtest } = analyses.backtest;
  const { result: identifiability } = analyses.identifiability;
  return { ...(backtest && { backtest }), ...(identifiability && { identifiability }) };
}
