'use client';

/** The next revision of a market's counts: the table, its columns, what was understood, the difference. Earlier revisions stay. */
import { useState } from 'react';
import { keepExclusions } from '@/lib/series/exclusions';
import { type RevisionBase, StoreRevision } from '../data/store-revision';
import { Question } from '../frame/question';
import { ColumnsStep } from './columns-step';
import styles from './flow.module.css';
import { SourceStep } from './source-step';
import { hasColumns } from './understood';
import { UnderstoodStep } from './understood-step';
import { type Reading, useReading } from './use-reading';

interface NewRevisionFlowProps {
  base: RevisionBase;
  unit: string;
  /** Files of earlier revisions, by their hash: the same file again is told at once. */
  knownFiles: { number: number; fileHash: string }[];
}

export function NewRevisionFlow({ base: newest, unit, knownFiles }: NewRevisionFlowProps) {
  // Kept: when the page comes again with a newer revision, what was read still belongs to this one.
  const [base] = useState(newest);
  const reading = useReading();
  const { understood } = reading;
  const known = knownFiles.find(({ fileHash }) => fileHash === reading.fileHash);
  return (
    <>
      <Question
        id="counts"
        question="Are there newer counts?"
        note={<p>Give the whole series again, old months included: corrections count too.</p>}
      >
        <SourceStep reading={reading} />
        {known ? (
          <p className={styles.known}>
            This is the very file that revision {known.number} came from.{' '}
            {known.number === base.number ? 'Storing it again would change nothing.' : ''}
          </p>
        ) : null}
      </Question>
      {understood ? (
        <Question id="understood" question="What was understood?" note={<p>Nothing is stored yet.</p>}>
          {hasColumns(understood) ? (
            <ColumnsStep key={reading.sourceNumber} understood={understood} onChoose={reading.choose} />
          ) : null}
          <div className={styles.understood}>
            <UnderstoodStep
              understood={understood}
              onFix={reading.chooseFix}
              focalName={base.focalName}
              rivalName={base.rivalName}
              unit={unit}
            />
          </div>
          <StoreReading base={base} reading={reading} />
        </Question>
      ) : null}
    </>
  );
}

function StoreReading({ base, reading }: { base: RevisionBase; reading: Reading }) {
  const { understood, source, fileHash } = reading;
  const series = understood?.reading.series;
  if (!series || !reading.canFit) return null;
  const exclusions = keepExclusions(base.exclusions, series);
  const fileName = source?.fileName ?? null;
  return (
    <StoreRevision
      base={base}
      proposal={{ series, exclusions, fileName, fileHash, readingNotes: understood.notes }}
    />
  );
}
