'use client';

/** On a forecast link: a reader moves the pushes and sees what changes, computed in the browser on the thinned draws that were frozen. */
import dynamic from 'next/dynamic';
import { useMemo, useRef } from 'react';
import { useIsWanted } from '@/app/_lib/use-is-wanted';
import type { BriefFacts } from '@/lib/brief/facts';
import type { PhaseMap } from '@/lib/brief/types';
import type { PricedPush } from '@/lib/scenario/spend';
import type { Trial } from '@/lib/scenario/trial-draws';
import styles from './change.module.css';
import { ScenarioProvider } from './scenario-state';

const ReaderDesk = dynamic(() => import('./reader-desk').then((module) => module.ReaderDesk), { ssr: false });

interface ReaderTrialProps {
  facts: BriefFacts;
  trial: Trial;
  /** Where the controls begin. */
  pushes: PricedPush[];
  phaseMap: PhaseMap;
}

export function ReaderTrial({ facts, trial, pushes, phaseMap }: ReaderTrialProps) {
  const place = useRef<HTMLDivElement>(null);
  const isWanted = useIsWanted(place);
  const start = useMemo(() => ({ pushes, open: 0, money: null }), [pushes]);
  return (
    <section className={styles.readerTrial} aria-label="Try it yourself" ref={place}>
      <h3 className={styles.figureName}>Try it yourself</h3>
      <p className={styles.note}>
        Move the pushes. What you see is computed in your browser on {trial.draws.count} of the draws; what
        was issued, above, stays as it is.
      </p>
      {isWanted ? (
        <ScenarioProvider facts={facts} start={start}>
          <ReaderDesk trial={trial} phaseMap={phaseMap} />
        </ScenarioProvider>
      ) : null}
    </section>
  );
}
