'use client';

/**
 * The last step of every change of counts: the difference to the newest revision, why there is a new one, and storing it. When
 * somebody else stored one meanwhile, both differences are shown, and the two can be brought together.
 */
import { useMemo, useState, useTransition } from 'react';
import { addRevisionAction, type RevisionFormRefusal } from '@/app/_actions/add-revision';
import { LOCALE } from '@/app/_lib/locale';
import { createMonthFormat } from '@/lib/brief/month-words';
import { toCanonicalText } from '@/lib/series/canonical-text';
import { compareSeries, type SeriesContent } from '@/lib/series/compare-series';
import { mergeSeries } from '@/lib/series/merge-series';
import { MAX_NOTE_LENGTH } from '@/lib/services/form-limits';
import { Button } from '../controls/button';
import { ProblemNote } from '../controls/problem-note';
import { TextField } from '../controls/text-field';
import { ProblemList } from '../import/problem-list';
import { SourceNote } from '../import/source-note';
import { DifferenceTable } from './difference-table';
import styles from './store-revision.module.css';

/** What the change was made from, and what the page knows of the market. */
export interface RevisionBase extends SeriesContent {
  marketId: string;
  focalName: string;
  rivalName: string;
  number: number;
  /** Of the base: most often it is that of the next revision too. */
  sourceNote: string | null;
}

/** Counts to store, with what is known of their coming. */
export interface RevisionProposal extends SeriesContent {
  fileName: string | null;
  fileHash: string | null;
  readingNotes: string[];
}

const months = createMonthFormat(LOCALE);

export function StoreRevision({ base, proposal }: { base: RevisionBase; proposal: RevisionProposal }) {
  const [meanwhile, setMeanwhile] = useState<RevisionFormRefusal['newest']>();
  const [isMerged, setIsMerged] = useState(false);
  const newest = meanwhile ?? base;
  const merged = useMemo(() => mergeSeries(base, proposal, newest), [base, proposal, newest]);
  const content: SeriesContent = meanwhile && isMerged ? merged : proposal;
  const changes = useMemo(() => compareSeries(newest, content), [newest, content]);
  const names = { focalName: base.focalName, rivalName: base.rivalName };
  return (
    <div className={styles.step}>
      {meanwhile ? (
        <Meanwhile
          base={base}
          newest={meanwhile}
          conflicts={merged.conflicts}
          isMerged={isMerged}
          onMerge={setIsMerged}
        />
      ) : null}
      <div>
        <h2 className={styles.head}>
          What {meanwhile ? 'would change' : 'changes'} of revision {newest.number}
        </h2>
        <DifferenceTable label={`Changes of revision ${newest.number}`} changes={changes} {...names} />
      </div>
      {changes.length === 0 ? (
        <p>These counts are the same as in revision {newest.number}: there is nothing to store.</p>
      ) : (
        <StoreForm
          base={base}
          basedOn={newest.number}
          proposal={{ ...proposal, series: content.series, exclusions: content.exclusions }}
          onMeanwhile={setMeanwhile}
        />
      )}
    </div>
  );
}

interface MeanwhileProps {
  base: RevisionBase;
  newest: NonNullable<RevisionFormRefusal['newest']>;
  conflicts: number[];
  isMerged: boolean;
  onMerge: (isMerged: boolean) => void;
}

function Meanwhile({ base, newest, conflicts, isMerged, onMerge }: MeanwhileProps) {
  return (
    <div className={styles.meanwhile} role="alert">
      <p>
        <strong>
          Nothing was stored yet: {newest.createdByName ?? 'somebody else'} stored revision {newest.number}{' '}
          meanwhile.
        </strong>{' '}
        Your counts were made from revision {base.number}. They are still here.
      </p>
      <h2 className={styles.head}>What revision {newest.number} changed</h2>
      <DifferenceTable
        label={`Changes made by revision ${newest.number}`}
        changes={compareSeries(base, newest)}
        focalName={base.focalName}
        rivalName={base.rivalName}
      />
      {isMerged ? (
        <p>
          Below, both are together. {tellConflicts(conflicts)}{' '}
          <Button kind="text" onClick={() => onMerge(false)}>
            Take only mine
          </Button>
        </p>
      ) : (
        <p>
          Stored as they are, your counts would undo these.{' '}
          <Button onClick={() => onMerge(true)}>Bring both together</Button>
        </p>
      )}
    </div>
  );
}

function tellConflicts(conflicts: number[]): string {
  if (conflicts.length === 0) return 'No count was changed by both of you.';
  return `In ${conflicts.map(months.long).join(', ')} both of you changed the same: yours stands.`;
}

interface StoreFormProps {
  base: RevisionBase;
  basedOn: number;
  proposal: RevisionProposal;
  onMeanwhile: (newest: RevisionFormRefusal['newest']) => void;
}

function StoreForm({ base, basedOn, proposal, onMeanwhile }: StoreFormProps) {
  const [note, setNote] = useState('');
  const [sourceNote, setSourceNote] = useState(base.sourceNote ?? '');
  const [refusal, setRefusal] = useState<RevisionFormRefusal | null>(null);
  const [isPending, startTransition] = useTransition();

  const store = () =>
    startTransition(async () => {
      const { series, exclusions, ...source } = proposal;
      const answer = await addRevisionAction(base.marketId, {
        ...source,
        basedOn,
        canonicalText: toCanonicalText(series),
        exclusions: [...exclusions],
        sourceNote,
        note,
      });
      if (answer.newest) onMeanwhile(answer.newest);
      else setRefusal(answer);
    });

  return (
    <>
      <div className={styles.fields}>
        <TextField
          label="Why there is a new revision"
          value={note}
          maxLength={MAX_NOTE_LENGTH}
          onChange={(event) => setNote(event.target.value)}
          placeholder="March came in; February was corrected"
        />
        <SourceNote value={sourceNote} onChange={setSourceNote} />
      </div>
      <div className={styles.end}>
        <ProblemNote explanation={refusal?.explanation ?? null} />
        <ProblemList problems={refusal?.problems ?? []} />
        <Button kind="main" onClick={store} isBusy={isPending} busyLabel="Storing the counts">
          Store revision {basedOn + 1} and fit
        </Button>
      </div>
    </>
  );
}
