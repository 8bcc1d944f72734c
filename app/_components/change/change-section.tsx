'use client';

/** What would change it? Pushes to try, what they do, and the scenarios that were kept. The trial loads when it is wanted. */
import dynamic from 'next/dynamic';
import { useRef } from 'react';
import { useIsWanted } from '@/app/_lib/use-is-wanted';
import type { ChangeSection as ChangeSectionData, PhaseMap } from '@/lib/brief/types';
import { Question } from '../frame/question';
import { SensitivityFigure } from '../identifiability/sensitivity-figure';
import { SentenceText } from '../text/sentence-text';
import styles from './change.module.css';
import type { KeptScenario } from './kept-scenarios';

const PushTrial = dynamic(() => import('./push-trial').then((module) => module.PushTrial), {
  ssr: false,
  loading: Loading,
});

interface ChangeSectionProps {
  change: ChangeSectionData;
  marketId: string;
  fitId: string;
  scenarios: KeptScenario[];
  phaseMap: PhaseMap;
  canWrite: boolean;
}

export function ChangeSection({ change, ...trial }: ChangeSectionProps) {
  const place = useRef<HTMLDivElement>(null);
  const isWanted = useIsWanted(place);
  return (
    <Question id="change" question={change.question} note={<SentenceText sentence={change.note} />}>
      <div className={styles.trial} ref={place}>
        {isWanted ? <PushTrial {...trial} /> : <Loading />}
      </div>
      {change.sensitivity ? <SensitivityFigure figure={change.sensitivity} /> : null}
    </Question>
  );
}

function Loading() {
  return <p className={styles.loading}>Getting ready to try a push.</p>;
}
