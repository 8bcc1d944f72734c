/** Which analysis of a market is meant: that of the fit whose outlook is shown, by this version of the engine. */
import { ENGINE_VERSION } from '../estimate/engine-version';
import type { AnalysisKey } from '../store/analyses';
import type { AnalysisKind } from '../store/analysis-kinds';
import type { Viewer } from './viewer';

export function analysisKey<Kind extends AnalysisKind>(
  viewer: Viewer,
  revisionId: string,
  kind: Kind,
): AnalysisKey & { kind: Kind } {
  return { workspaceId: viewer.workspaceId, revisionId, kind, engineVersion: ENGINE_VERSION };
}
