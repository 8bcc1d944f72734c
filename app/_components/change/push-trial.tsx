'use client';

/** The scenario being tried, on the posterior draws that the browser fetched once: controls, what it does, figures, answers, what is kept. */
import type { PhaseMap } from '@/lib/brief/types';
import { Button } from '../controls/button';
import styles from './change.module.css';
import { type KeptScenario, KeptScenarios } from './kept-scenarios';
import { ScenarioDesk } from './scenario-desk';
import { useScenario } from './scenario-state';
import { usePrepared } from './use-comparison';
import { useDraws } from './use-draws';

interface PushTrialProps {
  marketId: string;
  fitId: string;
  scenarios: KeptScenario[];
  phaseMap: PhaseMap;
  canWrite: boolean;
}

export function PushTrial({ marketId, fitId, scenarios, phaseMap, canWrite }: PushTrialProps) {
  const { facts } = useScenario();
  const [fetched, retry] = useDraws(marketId, fitId);
  const draws = fetched.state === 'ready' ? fetched.draws : null;
  const { outlook, seed } = facts.report;
  const prepared = usePrepared(draws, outlook.horizonMonths, seed);
  return (
    <>
      <ScenarioDesk
        prepared={prepared}
        phaseMap={phaseMap}
        waiting={<Waiting isFailed={fetched.state === 'failed'} onRetry={retry} />}
      />
      <KeptScenarios
        marketId={marketId}
        fitId={fitId}
        scenarios={scenarios}
        prepared={prepared}
        canWrite={canWrite}
      />
    </>
  );
}

function Waiting({ isFailed, onRetry }: { isFailed: boolean; onRetry: () => void }) {
  if (!isFailed) return <p role="status">Fetching the draws of this fit.</p>;
  return (
    <div role="alert" className={styles.waiting}>
      <p>
        The draws did not arrive, so a push cannot be tried. Perhaps the connection broke, or you are signed
        out.
      </p>
      <Button onClick={onRetry}>Fetch them again</Button>
    </div>
  );
}
