'use client';

/** What would change it? A push to try, what it does, and the scenarios that were kept. The trial loads after the page. */
import dynamic from 'next/dynamic';
import type { ChangeSection as ChangeSectionData } from '@/lib/brief/types';
import { Question } from '../frame/question';
import { SensitivityFigure } from '../identifiability/sensitivity-figure';
import { SentenceText } from '../text/sentence-text';
import styles from './change.module.css';
import type { KeptScenario } from './save-scenario';

const PushTrial = dynamic(() => import('./push-trial').then((module) => module.PushTrial), {
  ssr: false,
  loading: () => <p className={styles.loading}>Getting ready to try a push.</p>,
});

interface ChangeSectionProps {
  change: ChangeSectionData;
  marketId: string;
  fitId: string;
  scenarios: KeptScenario[];
  canWrite: boolean;
}

export function ChangeSection({ change, ...trial }: ChangeSectionProps) {
  return (
    <Question id="change" question={change.question} note={<SentenceText sentence={change.note} />}>
      <div className={styles.trial}>
        <PushTrial {...trial} />
      </div>
      {change.sensitivity ? <SensitivityFigure figure={change.sensitivity} /> : null}
    </Question>
  );
}
