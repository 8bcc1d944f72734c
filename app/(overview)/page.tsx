/** The markets of the workspace, those that ask for something first. */
import type { Metadata } from 'next';
import Link from 'next/link';
import { makeMonth } from '@/lib/series/month';
import { listArchivedMarkets, listMarkets, type MarketSummary } from '@/lib/services/list-markets';
import { canWrite, type Viewer } from '@/lib/services/viewer';
import { buttonClass } from '../_components/controls/button-class';
import { PageFrame } from '../_components/frame/page-frame';
import { Question } from '../_components/frame/question';
import { ArchiveList } from '../_components/markets/archive-list';
import { MarketList } from '../_components/markets/market-list';
import { Headline } from '../_components/text/headline';
import { requireViewer } from '../_lib/require-viewer';
import styles from './page.module.css';

export const metadata: Metadata = { title: 'Markets' };

export default async function MarketsPage() {
  const viewer = await requireViewer('/');
  const [markets, archived] = await Promise.all([listMarkets(viewer), listArchivedMarkets(viewer)]);
  return (
    <PageFrame title={viewer.workspaceName} viewer={viewer}>
      <Question
        id="markets"
        question="Where do our markets stand?"
        note={<ImportNote viewer={viewer} markets={markets} />}
        isFirst
      >
        {markets.length === 0 ? (
          <EmptyList viewer={viewer} />
        ) : (
          <FilledList viewer={viewer} markets={markets} />
        )}
        <ArchiveList markets={archived} canWrite={canWrite(viewer)} />
      </Question>
    </PageFrame>
  );
}

interface ListProps {
  viewer: Viewer;
  markets: MarketSummary[];
}

function FilledList({ viewer, markets }: ListProps) {
  const now = new Date();
  return (
    <>
      <Headline>{headline(markets)}</Headline>
      {canWrite(viewer) ? (
        <p className={styles.action}>
          <Link href="/markets/new" className={buttonClass('main')}>
            Import a market
          </Link>
        </p>
      ) : null}
      <MarketList
        markets={markets}
        thisMonth={makeMonth(now.getUTCFullYear(), now.getUTCMonth() + 1)}
        canWrite={canWrite(viewer)}
      />
    </>
  );
}

/** "Four markets; the data do not decide one of them yet." */
function headline(markets: MarketSummary[]): string {
  const fitted = markets.filter((market) => market.fit?.odds);
  const open = fitted.filter((market) => market.fit?.decided === null).length;
  const count = markets.length === 1 ? 'One market' : `${spellCount(markets.length)} markets`;
  if (fitted.length === 0) return `${count}, none fitted yet.`;
  if (open === 0) return `${count}; the data decide ${fitted.length === 1 ? 'it' : 'each that is fitted'}.`;
  return `${count}; the data do not decide ${open === markets.length ? 'yet' : `${spellCount(open).toLowerCase()} of them yet`}.`;
}

const SMALL_COUNTS = ['No', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine', 'Ten'];

function spellCount(count: number): string {
  return SMALL_COUNTS[count] ?? String(count);
}

function EmptyList({ viewer }: { viewer: Viewer }) {
  return (
    <>
      <Headline
        support={
          <p>
            Bring the monthly users of two firms, yours and its rival, as a table with one row a month. You
            read where the market is heading, how sure that is, and what would change it.
          </p>
        }
      >
        No market yet.
      </Headline>
      <p className={styles.action}>
        {canWrite(viewer) ? (
          <Link href="/markets/new" className={buttonClass('main')}>
            Import the first market
          </Link>
        ) : (
          'An owner or an analyst of this workspace can import the first one.'
        )}
      </p>
    </>
  );
}

function ImportNote({ viewer, markets }: ListProps) {
  if (markets.length === 0)
    return <p>Twelve months of both firms are enough for a first look; three years say far more.</p>;
  return (
    <>
      <p>
        The strip shows the odds of the four outcomes: both stay, either firm alone, the head start decides.
      </p>
      {canWrite(viewer) ? null : <p>You read this workspace; its analysts change it.</p>}
    </>
  );
}
