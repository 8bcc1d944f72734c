'use client';

/** The push being tried: controls, what it does, its figures. Computed in the browser on the posterior draws, fetched once. */
import { useMemo } from 'react';
import { buildPushBrief } from '@/lib/brief/push-brief';
import { Button } from '../controls/button';
import { NumberLocale } from '../controls/number-locale';
import styles from './change.module.css';
import { PushAnswer } from './push-answer';
import { PushControls } from './push-controls';
import { PushFigures } from './push-figures';
import { usePush } from './push-state';
import { type KeptScenario, SaveScenario } from './save-scenario';
import { useComparison } from './use-comparison';
import { useDraws } from './use-draws';

interface PushTrialProps {
  marketId: string;
  fitId: string;
  scenarios: KeptScenario[];
  canWrite: boolean;
}

export function PushTrial({ marketId, fitId, scenarios, canWrite }: PushTrialProps) {
  const { facts, push } = usePush();
  const [fetched, retry] = useDraws(marketId, fitId);
  const draws = fetched.state === 'ready' ? fetched.draws : null;
  const options = { horizonMonths: facts.report.outlook.horizonMonths, seed: facts.report.seed };
  const comparison = useComparison(draws, push, options);
  const brief = useMemo(() => comparison && buildPushBrief(comparison, facts), [comparison, facts]);
  return (
    <>
      <div className={styles.layout}>
        <NumberLocale>
          <PushControls isDisabled={!brief} />
        </NumberLocale>
        <div className={styles.answer}>
          {brief ? (
            <PushAnswer push={brief} />
          ) : (
            <Waiting isFailed={fetched.state === 'failed'} onRetry={retry} />
          )}
        </div>
      </div>
      <div className={styles.figuresPlace}>{brief ? <PushFigures push={brief} /> : null}</div>
      <SaveScenario marketId={marketId} scenarios={scenarios} canWrite={canWrite} />
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
