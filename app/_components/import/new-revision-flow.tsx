'use client';

/** The next revision of a market's counts: the table, its columns, what was understood. Earlier revisions stay as they are. */
import { keepExclusions } from '@/lib/series/exclusions';
import { type RevisionBase, StoreRevision } from '../data/store-revision';
import { Question } from '../frame/question';
import { ColumnsStep } from './columns-step';
import styles from './flow.module.css';
import { SourceStep } from './source-step';
import { UnderstoodStep } from './understood-step';
import { useReading } from './use-reading';

interface NewRevisionFlowProps {
  base: RevisionBase;
  unit: string;
}

export function NewRevisionFlow({ base, unit }: NewRevisionFlowProps) {
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
                  focalName={base.focalName}
                  rivalName={base.rivalName}
                  unit={unit}
                />
              </div>
              {series.series && reading.canFit ? (
                <StoreRevision
                  base={base}
                  proposal={{
                    series: series.series,
                    exclusions: keepExclusions(base.exclusions, series.series),
                    fileName: reading.source.fileName,
                    fileHash: null,
                    readingNotes: [],
                  }}
                />
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
