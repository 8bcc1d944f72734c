/** The market of a page, read once for each request; a market of another workspace is not found, like one that does not exist. */
import 'server-only';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { type MarketPage, readMarket } from '@/lib/services/read-market';
import type { Viewer } from '@/lib/services/viewer';
import { requireViewer } from './require-viewer';

export interface RequestedMarket {
  viewer: Viewer;
  page: MarketPage;
}

export const requestMarket = cache(async (marketId: string, path: string): Promise<RequestedMarket> => {
  const viewer = await requireViewer(path);
  const outcome = await readMarket(viewer, marketId);
  if (!outcome.ok) notFound();
  return { viewer, page: outcome.value };
});
