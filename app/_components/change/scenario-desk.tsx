'use client';

/** Where a scenario is tried: its pushes under controls, the answer in sentences, the figures, and further questions. */
import { type ReactNode, useMemo } from 'react';
import { buildPushBrief } from '@/lib/brief/push-brief';
import type { PhaseMap } from '@/lib/brief/types';
import type { PreparedScenario } from '@/lib/scenario/prepare-scenario';
import { NumberLocale } from '../controls/number-locale';
import { AnswersPanel } from './answers-panel';
import styles from './change.module.css';
import { MoneyPanel } from './money-panel';
import { PushAnswer } from './push-answer';
import { PushControls } from './push-controls';
import { PushFigures } from './push-figures';
import { PushPathMap } from './push-path-map';
import { PushTabs } from './push-tabs';
import { useScenario } from './scenario-state';
import { useComparison } from './use-comparison';

interface ScenarioDeskProps {
  /** null: the draws are not there yet. */
  prepared: PreparedScenario | null;
  phaseMap: PhaseMap;
  /** Stands where the answer will. */
  waiting: ReactNode;
}

export function ScenarioDesk({ prepared, phaseMap, waiting }: ScenarioDeskProps) {
  const { facts, pushes, draft } = useScenario();
  const comparison = useComparison(prepared, pushes, draft.money);
  const brief = useMemo(() => comparison && buildPushBrief(comparison, facts), [comparison, facts]);
  return (
    <NumberLocale>
      <div className={styles.layout}>
        <div className={styles.edit}>
          <PushTabs />
          <PushControls isDisabled={!brief} />
        </div>
        <div className={styles.answer}>
          {brief ? <PushAnswer push={brief} /> : waiting}
          <div className={styles.figuresPlace}>{brief ? <PushFigures push={brief} /> : null}</div>
        </div>
      </div>
      {comparison && prepared ? (
        <div className={styles.further}>
          <PushPathMap map={phaseMap} comparison={comparison} />
          <MoneyPanel prepared={prepared} comparison={comparison} />
          <AnswersPanel prepared={prepared} />
        </div>
      ) : null}
    </NumberLocale>
  );
}
