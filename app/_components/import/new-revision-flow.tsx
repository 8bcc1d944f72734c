'use client';

/** The next revision of a market's counts: the table, its columns, what was understood. Earlier revisions stay as they are. */
import { useState, useTransition } from 'react';
import { addRevisionAction } from '@/app/_actions/add-revision';
import { toCanonicalText } from '@/lib/series/canonical-text';
import { Button } from '../controls/button';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import { Question } from '../frame/question';
import { ColumnsStep } from './columns-step';
import styles from './flow.module.css';
import { SourceNote } from './source-note';
import { SourceStep } from './source-step';
import { UnderstoodStep } from './understood-step';
import { type Reading, useReading } from './use-reading';

interface NewRevisionFlowProps {
  market: { id: string; unit: string; focalName: string; rivalName: string };
  nextNumber: number;
}

export function NewRevisionFlow({ market, nextNumber }: NewRevisionFlowProps) {
  const reading = useReading();
  const { table, mapping, series } = reading;
  return (
    <>
      <Question
        id="counts"
        question="Are there newer counts?"
        note={<p>Give the whole series again, old months included: corrections count too.</p>}
      >
        <SourceStep source={reading.source} onChange={reading.setSource} />
      </Question>
      {table ? (
        <Question id="understood" question="What was understood?" note={<p>Nothing is stored yet.</p>}>
          {mapping && series ? (
            <>
              <ColumnsStep
                table={table}
                mapping={mapping}
                problems={series.problems}
                onChange={reading.setMapping}
              />
              <div className={styles.understood}>
                <UnderstoodStep
                  reading={series}
                  focalName={market.focalName}
                  rivalName={market.rivalName}
                  unit={market.unit}
                />
              </div>
              {series.series ? (
                <StoreRevision marketId={market.id} nextNumber={nextNumber} reading={reading} />
              ) : null}
            </>
          ) : (
            <UnderstoodStep
              reading={{ series: null, focalName: '', rivalName: '', problems: table.problems }}
              focalName=""
              rivalName=""
              unit=""
            />
          )}
        </Question>
      ) : null}
    </>
  );
}

function StoreRevision({
  marketId,
  nextNumber,
  reading,
}: {
  marketId: string;
  nextNumber: number;
  reading: Reading;
}) {
  const [sourceNote, setSourceNote] = useState('');
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();
  const { series, source } = reading;

  function store() {
    if (!series?.series) return;
    const canonicalText = toCanonicalText(series.series);
    startTransition(async () => {
      const form = {
        basedOn: nextNumber - 1,
        fileName: source.fileName,
        fileHash: null,
        canonicalText,
        exclusions: [],
        readingNotes: [],
        sourceNote,
        note: null,
      };
      setExplanation((await addRevisionAction(marketId, form)).explanation);
    });
  }

  return (
    <>
      <SourceNote value={sourceNote} onChange={setSourceNote} />
      <div className={styles.end}>
        <ProblemNote explanation={explanation} />
        <Button kind="main" onClick={store} isBusy={isPending} busyLabel="Storing the counts">
          Store revision {nextNumber} and fit
        </Button>
      </div>
    </>
  );
}
