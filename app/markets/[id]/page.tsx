/** The brief of one market; while there is none, how its fit stands and what is known. */
import type { Metadata } from 'next';
import { MarketBrief } from '@/app/_components/brief/market-brief';
import { WaitingMarket } from '@/app/_components/brief/waiting-market';
import { requestMarket } from '@/app/_lib/request-market';

export async function generateMetadata({ params }: { params: Promise<{ id: string }> }): Promise<Metadata> {
  const { id } = await params;
  const { page } = await requestMarket(id, `/markets/${id}`);
  return { title: page.market.name };
}

export default async function MarketPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params;
  const { viewer, page } = await requestMarket(id, `/markets/${id}`);
  return page.facts ? (
    <MarketBrief viewer={viewer} page={page} facts={page.facts} />
  ) : (
    <WaitingMarket viewer={viewer} page={page} />
  );
}
