/** The counts of a market: the newest revision and its small corrections, the next one, events, all revisions, the market itself. */
import type { Metadata } from 'next';
import Link from 'next/link';
import { CountGrid } from '@/app/_components/data/count-grid';
import { EventSection } from '@/app/_components/data/event-section';
import { HistoryList } from '@/app/_components/data/history-list';
import type { RevisionBase } from '@/app/_components/data/store-revision';
import { HistoryFigure } from '@/app/_components/figures/history-figure';
import { PageFrame } from '@/app/_components/frame/page-frame';
import { Question } from '@/app/_components/frame/question';
import { EditMarketForm } from '@/app/_components/import/edit-market-form';
import { NewRevisionFlow } from '@/app/_components/import/new-revision-flow';
import { Headline } from '@/app/_components/text/headline';
import { formatDay } from '@/app/_lib/locale';
import { requestMarket } from '@/app/_lib/request-market';
import { listHistory } from '@/lib/services/list-history';
import type { MarketPage } from '@/lib/services/read-market';
import { canWrite as canWriteMarkets } from '@/lib/services/viewer';
import styles from './page.module.css';

export const metadata: Metadata = { title: 'Data' };

export default async function DataPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params;
  const { viewer, page } = await requestMarket(id, `/markets/${id}/data`);
  const history = await listHistory(viewer, id);
  const { market, revision, series, exclusions, events } = page;
  const canWrite = canWriteMarkets(viewer);
  const base = toBase(page);
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
            exclusions={exclusions}
            events={events}
            focalName={market.focalName}
            rivalName={market.rivalName}
            unit={market.unit}
          >
            {canWrite ? <CountGrid base={base} /> : null}
          </HistoryFigure>
        </div>
      </Question>
      {canWrite ? (
        <NewRevisionFlow
          base={base}
          unit={market.unit}
          knownFiles={history.flatMap(({ number, fileHash }) => (fileHash ? [{ number, fileHash }] : []))}
        />
      ) : null}
      <Question
        id="events"
        question="What happened?"
        note={
          <p>
            Price changes, outages, launches: they stand on the charts. The fit looks for changes by itself;
            one from which strengths may have changed tells it where.
          </p>
        }
      >
        <EventSection marketId={id} events={events} canWrite={canWrite} />
      </Question>
      <Question
        id="revisions"
        question="What was stored before?"
        note={<p>Each revision can be seen, compared, downloaded and brought back.</p>}
      >
        <HistoryList marketId={id} history={history} />
      </Question>
      {canWrite ? (
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
              focalAddressable: market.focalAddressable,
              rivalAddressable: market.rivalAddressable,
              addressableError: market.addressableError,
            }}
          />
        </Question>
      ) : null}
    </PageFrame>
  );
}

function toBase({ market, revision, series, exclusions }: MarketPage): RevisionBase {
  const { id: marketId, focalName, rivalName } = market;
  const { number, sourceNote } = revision;
  return { marketId, focalName, rivalName, number, sourceNote, series, exclusions };
}

function RevisionNote({ page: { market, revision } }: { page: MarketPage }) {
  return (
    <>
      <p>
        Revision {revision.number}, stored {formatDay(revision.createdAt)}
        {revision.createdByName ? ` by ${revision.createdByName}` : ''}
        {revision.fileName ? ` from ${revision.fileName}` : ''}. Revisions are never changed; the next one
        replaces it.
      </p>
      {revision.sourceNote ? <p>Source: {revision.sourceNote}</p> : null}
      <p>
        <a href={`/markets/${market.id}/data/csv`} download>
          Download these counts as CSV
        </a>
      </p>
    </>
  );
}
