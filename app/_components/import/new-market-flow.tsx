'use client';

/** A first import: the table, its columns, what was understood, what the market is. Nothing is stored before the last step. */
import { useState, useTransition } from 'react';
import { createMarketAction } from '@/app/_actions/create-market';
import type { FormRefusal } from '@/app/_lib/form-refusal';
import { toCanonicalText } from '@/lib/series/canonical-text';
import { Button } from '../controls/button';
import { ProblemNote } from '../controls/problem-note';
import { Question } from '../frame/question';
import { ColumnsStep } from './columns-step';
import styles from './flow.module.css';
import { type MarketDetails, MarketFields, readDetails, UNTOUCHED_DETAILS } from './market-fields';
import { SourceNote } from './source-note';
import { SourceStep } from './source-step';
import { hasColumns } from './understood';
import { UnderstoodStep } from './understood-step';
import { type Reading, useReading } from './use-reading';

export function NewMarketFlow() {
  const reading = useReading();
  const { understood } = reading;
  const [details, setDetails] = useState(UNTOUCHED_DETAILS);
  return (
    <>
      <Question id="counts" question="What are the counts?" note={<CountsNote />}>
        <SourceStep reading={reading} />
      </Question>
      {understood && hasColumns(understood) ? (
        <Question
          id="columns"
          question="Which column is which?"
          note={<p>Guessed from the header and the cells. Change what is wrong.</p>}
        >
          <ColumnsStep key={reading.sourceNumber} understood={understood} onChoose={reading.choose} />
        </Question>
      ) : null}
      {understood ? (
        <Question
          id="understood"
          question="What was understood?"
          note={<p>Check it against your own sheet. Nothing is stored yet.</p>}
        >
          <UnderstoodStep
            understood={understood}
            onFix={reading.chooseFix}
            focalName={details.focalName ?? understood.reading.focalName}
            rivalName={details.rivalName ?? understood.reading.rivalName}
            unit={details.unit}
          />
        </Question>
      ) : null}
      {reading.canFit ? (
        <Question id="market" question="What is this market?" note={<p>All of it can be changed later.</p>}>
          <StoreMarket reading={reading} details={details} onChange={setDetails} />
        </Question>
      ) : null}
    </>
  );
}

interface StoreMarketProps {
  reading: Reading;
  details: MarketDetails;
  onChange: (details: MarketDetails) => void;
}

function StoreMarket({ reading, details, onChange }: StoreMarketProps) {
  const [sourceNote, setSourceNote] = useState('');
  const [refusal, setRefusal] = useState<FormRefusal | null>(null);
  const [isPending, startTransition] = useTransition();
  const { understood, source, fileHash } = reading;
  const columnNames = {
    focal: understood?.reading.focalName ?? '',
    rival: understood?.reading.rivalName ?? '',
  };

  function store() {
    const series = understood?.reading.series;
    if (!series) return;
    startTransition(async () => {
      const answer = await createMarketAction({
        ...readDetails(details),
        focalName: details.focalName ?? columnNames.focal,
        rivalName: details.rivalName ?? columnNames.rival,
        fileName: source?.fileName ?? null,
        fileHash,
        canonicalText: toCanonicalText(series),
        exclusions: [],
        readingNotes: understood.notes,
        sourceNote,
        note: null,
      });
      setRefusal(answer);
    });
  }

  return (
    <>
      <MarketFields
        details={details}
        columnNames={columnNames}
        problems={refusal?.fields ?? {}}
        onChange={onChange}
      />
      <SourceNote value={sourceNote} onChange={setSourceNote} />
      <div className={styles.end}>
        <ProblemNote explanation={refusal?.explanation ?? null} />
        <Button kind="main" onClick={store} isBusy={isPending} busyLabel="Storing the counts">
          Store the counts and fit
        </Button>
      </div>
    </>
  );
}

function CountsNote() {
  return (
    <>
      <p>One row a month: the month, your users, the rival’s users. At least twelve months.</p>
      <p>A month without a count stays empty. A zero before the first count means not launched.</p>
    </>
  );
}
