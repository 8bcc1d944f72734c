/** One revision of a market's counts: what it holds, what it changed, where it comes from; compared with any other. */
import type { Metadata } from 'next';
import Link from 'next/link';
import { notFound } from 'next/navigation';
import { CompareForm } from '@/app/_components/data/compare-form';
import { DifferenceTable } from '@/app/_components/data/difference-table';
import { RestoreButton } from '@/app/_components/data/restore-button';
import { RevisionSource } from '@/app/_components/data/revision-source';
import { HistoryFigure } from '@/app/_components/figures/history-figure';
import { PageFrame } from '@/app/_components/frame/page-frame';
import { Question } from '@/app/_components/frame/question';
import { Headline } from '@/app/_components/text/headline';
import { LOCALE } from '@/app/_lib/locale';
import { requireViewer } from '@/app/_lib/require-viewer';
import { createMonthFormat } from '@/lib/brief/month-words';
import { type RevisionPage, readRevision } from '@/lib/services/read-revision';
import { canWrite } from '@/lib/services/viewer';
import styles from '../../page.module.css';

export const metadata: Metadata = { title: 'Revision' };

const months = createMonthFormat(LOCALE);

interface PageProps {
  params: Promise<{ id: string; number: string }>;
  searchParams: Promise<{ against?: string | string[] }>;
}

export default async function RevisionDataPage({ params, searchParams }: PageProps) {
  const { id, number } = await params;
  const { against } = await searchParams;
  const viewer = await requireViewer(`/markets/${id}/data/revisions/${number}`);
  const outcome = await readRevision(viewer, id, readNumber(number) ?? 0, readNumber(String(against)));
  if (!outcome.ok) notFound();
  const { market, revision, newestNumber, events } = outcome.value;
  const last = revision.series.firstMonth + revision.series.focal.length - 1;
  return (
    <PageFrame
      title={<Link href={`/markets/${id}`}>{market.name}</Link>}
      facts={<Link href={`/markets/${id}/data`}>all revisions</Link>}
      viewer={viewer}
    >
      <Question
        id="content"
        question="What does it hold?"
        note={<StandingNote page={outcome.value} />}
        isFirst
      >
        <Headline>
          Revision {revision.number}: {revision.series.focal.length} months,{' '}
          {months.long(revision.series.firstMonth)} to {months.long(last)}.
        </Headline>
        <div className={styles.history}>
          <HistoryFigure
            series={revision.series}
            exclusions={revision.exclusions}
            events={events}
            focalName={market.focalName}
            rivalName={market.rivalName}
            unit={market.unit}
          />
        </div>
        <div className={styles.links}>
          <a href={`/markets/${id}/data/csv?revision=${revision.number}`} download>
            Download it as CSV
          </a>
          {canWrite(viewer) && revision.number !== newestNumber ? (
            <RestoreButton marketId={id} number={revision.number} newestNumber={newestNumber} />
          ) : null}
        </div>
      </Question>
      <Changes page={outcome.value} />
      <Question id="source" question="Where does it come from?">
        <RevisionSource revision={revision} />
      </Question>
    </PageFrame>
  );
}

function StandingNote({ page: { revision, newestNumber } }: { page: RevisionPage }) {
  return (
    <p>
      {revision.number === newestNumber
        ? 'The newest revision: fits are made from it.'
        : `Revision ${newestNumber} is the newest.`}{' '}
      A revision is never changed.
    </p>
  );
}

function Changes({ page: { market, revision, newestNumber, comparison } }: { page: RevisionPage }) {
  const others = Array.from({ length: newestNumber }, (_, index) => newestNumber - index).filter(
    (number) => number !== revision.number,
  );
  if (others.length === 0) return null;
  const compared = comparison?.with.number ?? null;
  return (
    <Question
      id="changes"
      question="What changed?"
      note={<p>Month by month, against the revision before or any other.</p>}
    >
      <CompareForm others={others} chosen={compared} />
      {comparison ? (
        <DifferenceTable
          label={`Changes from revision ${compared} to revision ${revision.number}`}
          changes={comparison.changes}
          focalName={market.focalName}
          rivalName={market.rivalName}
        />
      ) : (
        <p>This is the first revision: choose a later one to compare it with.</p>
      )}
    </Question>
  );
}

/** A revision's number, as it stands in an address. */
function readNumber(text: string): number | undefined {
  return /^[1-9]\d{0,8}$/.test(text) ? Number(text) : undefined;
}
