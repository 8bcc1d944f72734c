'use client';

/** A first import: the table, its columns, what was understood, what the market is. Nothing is stored before the last step. */
import { useState, useTransition } from 'react';
import { createMarketAction } from '@/app/_actions/create-market';
import type { FieldSentences } from '@/app/_lib/explain-field';
import { toCanonicalText } from '@/lib/series/canonical-text';
import { Button } from '../controls/button';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import { Question } from '../frame/question';
import { ColumnsStep } from './columns-step';
import styles from './flow.module.css';
import { MarketFields, UNTOUCHED_DETAILS } from './market-fields';
import { SourceNote } from './source-note';
import { SourceStep } from './source-step';
import { UnderstoodStep } from './understood-step';
import { useReading } from './use-reading';

export function NewMarketFlow() {
  const reading = useReading();
  const { table, mapping, series } = reading;
  const [details, setDetails] = useState(UNTOUCHED_DETAILS);
  const [sourceNote, setSourceNote] = useState('');
  const [fields, setFields] = useState<FieldSentences>({});
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();

  const focalName = details.focalName ?? series?.focalName ?? '';
  const rivalName = details.rivalName ?? series?.rivalName ?? '';

  function store() {
    if (!series?.series) return;
    const canonicalText = toCanonicalText(series.series);
    startTransition(async () => {
      const refusal = await createMarketAction({
        name: details.name,
        unit: details.unit,
        focalName,
        rivalName,
        focalError: Number(details.focalError),
        rivalError: Number(details.rivalError),
        fileName: reading.source.fileName,
        fileHash: null,
        canonicalText,
        exclusions: [],
        readingNotes: [],
        sourceNote,
        note: null,
      });
      setFields(refusal.fields);
      setExplanation(refusal.explanation);
    });
  }

  return (
    <>
      <Question id="counts" question="What are the counts?" note={<CountsNote />}>
        <SourceStep source={reading.source} onChange={reading.setSource} />
      </Question>
      {table && mapping && series ? (
        <>
          <Question
            id="columns"
            question="Which column is which?"
            note={<p>Guessed from the header and the cells. Change what is wrong.</p>}
          >
            <ColumnsStep
              table={table}
              mapping={mapping}
              problems={series.problems}
              onChange={reading.setMapping}
            />
          </Question>
          <Question
            id="understood"
            question="What was understood?"
            note={<p>Check it against your own sheet. Nothing is stored yet.</p>}
          >
            <UnderstoodStep
              reading={series}
              focalName={focalName}
              rivalName={rivalName}
              unit={details.unit}
            />
          </Question>
          {reading.canFit ? (
            <Question
              id="market"
              question="What is this market?"
              note={<p>All of it can be changed later.</p>}
            >
              <MarketFields
                details={details}
                columnNames={{ focal: series.focalName, rival: series.rivalName }}
                problems={fields}
                onChange={setDetails}
              />
              <SourceNote value={sourceNote} onChange={setSourceNote} />
              <div className={styles.end}>
                <ProblemNote explanation={explanation} />
                <Button kind="main" onClick={store} isBusy={isPending} busyLabel="Storing the counts">
                  Store the counts and fit
                </Button>
              </div>
            </Question>
          ) : null}
        </>
      ) : null}
      {table && !mapping ? (
        <Question id="understood" question="What was understood?">
          <UnderstoodStep
            reading={{ series: null, focalName: '', rivalName: '', problems: table.problems }}
            focalName=""
            rivalName=""
            unit=""
          />
        </Question>
      ) : null}
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
