/** A market without an outlook: how its fit stands, and what is known meanwhile. */
import Link from 'next/link';
import type { MarketPage } from '@/lib/services/read-market';
import { canWrite, type Viewer } from '@/lib/services/viewer';
import { HistoryFigure } from '../figures/history-figure';
import { FitStanding } from '../fit/fit-standing';
import { PageFrame } from '../frame/page-frame';
import { Question } from '../frame/question';
import { ArchivedNote } from '../markets/archived-note';

interface WaitingMarketProps {
  viewer: Viewer;
  page: MarketPage;
}

export function WaitingMarket({ viewer, page }: WaitingMarketProps) {
  const { market, revision, series } = page;
  const months = `${series.focal.length} ${series.focal.length === 1 ? 'month' : 'months'}`;
  return (
    <PageFrame title={market.name} facts={`revision ${revision.number} · ${months}`} viewer={viewer}>
      <ArchivedNote market={market} canWrite={canWrite(viewer)} />
      <FitStanding page={page} canWrite={canWrite(viewer)} />
      <Question
        id="known"
        question="What is known?"
        note={
          <p>
            The counts of revision {revision.number}.{' '}
            <Link href={`/markets/${market.id}/data`}>See or replace them</Link>.
          </p>
        }
      >
        <HistoryFigure
          series={series}
          focalName={market.focalName}
          rivalName={market.rivalName}
          unit={market.unit}
        />
      </Question>
    </PageFrame>
  );
}
