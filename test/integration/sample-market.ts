/** Markets for tests of jobs and services: a sample's series as an analyst would upload it. */
import { formatMonth } from '@/lib/series/month';
import type { MonthlySeries } from '@/lib/series/types';
import { createMarket } from '@/lib/services/create-market';
import type { MarketForm } from '@/lib/services/forms';
import type { Viewer } from '@/lib/services/viewer';
import { makeSample } from '../unit/brief/sample-report';

export const SAMPLE_SERIES = makeSample('coexistence').facts.series;

export function toCsv({ firstMonth, focal, rival }: MonthlySeries): string {
  const rows = focal.map((users, i) => `${formatMonth(firstMonth + i)},${users ?? ''},${rival[i] ?? ''}`);
  return ['month,Norrland,Halcyon', ...rows].join('\n');
}

export function marketForm(changes: Partial<MarketForm> = {}): MarketForm {
  return {
    name: 'Ferry tickets, north',
    unit: 'monthly active users',
    focalName: 'Norrland',
    rivalName: 'Halcyon',
    focalError: 0,
    rivalError: 0.1,
    fileName: 'tickets.csv',
    text: toCsv(SAMPLE_SERIES),
    mapping: { month: 'month', focal: 'Norrland', rival: 'Halcyon' },
    sourceNote: null,
    ...changes,
  };
}

export async function uploadMarket(viewer: Viewer, changes: Partial<MarketForm> = {}) {
  const outcome = await createMarket(viewer, marketForm(changes));
  if (!outcome.ok) throw new Error(`upload refused: ${JSON.stringify(outcome)}`);
  return outcome.value;
}
