/** The counts of a market: the newest revision as it is stored, and the next one. */
import type { Metadata } from 'next';
import Link from 'next/link';
import { HistoryFigure } from '@/app/_components/figures/history-figure';
import { PageFrame } from '@/app/_components/frame/page-frame';
import { Question } from '@/app/_components/frame/question';
import { EditMarketForm } from '@/app/_components/import/edit-market-form';
import { NewRevisionFlow } from '@/app/_components/import/new-revision-flow';
import { Headline } from '@/app/_components/text/headline';
import { formatDay } from '@/app/_lib/locale';
import { requestMarket } from '@/app/_lib/request-market';
import type { MarketPage } from '@/lib/services/read-market';
import { canWrite } from '@/lib/services/viewer';
import styles from './page.module.css';

export const metadata: Metadata = { title: 'Data' };

export default async function DataPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params;
  const { viewer, page } = await requestMarket(id, `/markets/${id}/data`);
  const { market, revision, series } = page;
  return (
    <PageFrame
      title={<Link href={`/markets/${id}`}>{market.name}</Link>}
      facts={`revision ${revision.number}`}
      viewer={viewer}
    >
      <Question id="known" question="What is known?" note={<RevisionNote page={page} />} isFirst>
        <Headline>
          {series.focal.length} months of {market.focalName} and {market.rivalName}.
        </Headline>
        <div className={styles.history}>
          <HistoryFigure
            series={series}
            focalName={market.focalName}
            rivalName={market.rivalName}
            unit={market.unit}
          />
        </div>
        <p className={styles.download}>
          <a href={`/markets/${id}/data/csv`} download>
            Download these counts as CSV
          </a>
        </p>
      </Question>
      {canWrite(viewer) ? (
        <>
          <NewRevisionFlow
            market={{ id, unit: market.unit, focalName: market.focalName, rivalName: market.rivalName }}
            nextNumber={revision.number + 1}
          />
          <Question
            id="market"
            question="What is this market?"
            note={<p>Forecasts that were issued keep the names they had.</p>}
          >
            <EditMarketForm
              marketId={id}
              market={{
                name: market.name,
                unit: market.unit,
                focalName: market.focalName,
                rivalName: market.rivalName,
                focalError: market.focalError,
                rivalError: market.rivalError,
              }}
            />
          </Question>
        </>
      ) : null}
    </PageFrame>
  );
}

function RevisionNote({ page: { revision } }: { page: MarketPage }) {
  return (
    <>
      <p>
        Revision {revision.number}, stored {formatDay(revision.createdAt)}
        {revision.fileName ? ` from ${revision.fileName}` : ''}. Revisions are never changed; the next one
        replaces it.
      </p>
      {revision.sourceNote ? <p>Source: {revision.sourceNote}</p> : null}
    </>
  );
}
