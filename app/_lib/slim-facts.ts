/** The facts of a brief without the parts that only the server reads: what is sent to the browser for trying pushes. */
import type { BriefFacts } from '@/lib/brief/facts';

export function slimFacts(facts: BriefFacts): BriefFacts {
  const { report } = facts;
  return {
    ...facts,
    backtest: undefined,
    identifiability: undefined,
    report: {
      ...report,
      cloud: [],
      history: { focal: [], rival: [] },
      diagnostics: { ...report.diagnostics, starts: [] },
    },
  };
}
