/**
 * The four demo markets, all in one invented place: the Skerrow Isles, where small firms sell passes and memberships to islanders.
 * Region, firms and figures are invented; the counts in `markets/` were simulated once by `simulate-markets.ts`.
 * Ids are fixed, so that seeding twice finds what is there.
 */
import { readFileSync } from 'node:fs';
import type { SimulatedTruth } from './simulate-market';

export interface DemoMarket {
  id: string;
  revisionId: string;
  fitId: string;
  name: string;
  unit: string;
  focalName: string;
  rivalName: string;
  /** Measurement error, sd of ln users: 0 for the firm's own counts, more for what it can learn of its rival. */
  focalError: number;
  rivalError: number;
  fileName: string;
  sourceNote: string;
  /** What the counts were simulated from, and so what a good fit should find. */
  truth: SimulatedTruth;
}

const SOURCE_NOTE =
  'Invented for this demo: simulated from the competitive growth system, with measurement error.';

export const DEMO_MARKETS: readonly DemoMarket[] = [
  {
    id: 'demo-ferry-passes',
    revisionId: 'demo-ferry-passes-1',
    fitId: 'demo-ferry-passes-1-fit',
    name: 'Ferry passes, Skerrow Isles',
    unit: 'monthly pass holders',
    focalName: 'Ostrel',
    rivalName: 'Pelloway',
    focalError: 0,
    rivalError: 0.05,
    fileName: 'ferry-passes.csv',
    sourceNote: SOURCE_NOTE,
    truth: {
      system: { r1: 0.19, r2: 0.13, k1: 46_000, k2: 44_000, alpha: 0.62, beta: 0.45 },
      start: [2_600, 900],
      firstMonth: '2021-10',
      months: 48,
      noise: { focal: 0.02, rival: 0.05 },
      seed: 4,
    },
  },
  {
    id: 'demo-cargo-bikes',
    revisionId: 'demo-cargo-bikes-1',
    fitId: 'demo-cargo-bikes-1-fit',
    name: 'Shared cargo bikes, Skerrow Isles',
    unit: 'monthly active riders',
    focalName: 'Hobbleton',
    rivalName: 'Cargrove',
    focalError: 0,
    rivalError: 0.05,
    fileName: 'cargo-bikes.csv',
    sourceNote: SOURCE_NOTE,
    truth: {
      system: { r1: 0.24, r2: 0.2, k1: 21_000, k2: 27_000, alpha: 1.25, beta: 0.6 },
      start: [1_500, 350],
      firstMonth: '2023-01',
      months: 33,
      noise: { focal: 0.025, rival: 0.06 },
      seed: 4,
    },
  },
  {
    id: 'demo-parcel-lockers',
    revisionId: 'demo-parcel-lockers-1',
    fitId: 'demo-parcel-lockers-1-fit',
    name: 'Parcel lockers, Skerrow Isles',
    unit: 'households that collected a parcel in the month',
    focalName: 'Latchby',
    rivalName: 'Corvane',
    focalError: 0,
    rivalError: 0.05,
    fileName: 'parcel-lockers.csv',
    sourceNote: SOURCE_NOTE,
    truth: {
      system: { r1: 0.21, r2: 0.19, k1: 33_000, k2: 31_000, alpha: 1.5, beta: 1.4 },
      start: [1_300, 1_050],
      firstMonth: '2021-04',
      months: 54,
      noise: { focal: 0.025, rival: 0.05 },
      seed: 2,
    },
  },
  {
    id: 'demo-night-buses',
    revisionId: 'demo-night-buses-1',
    fitId: 'demo-night-buses-1-fit',
    name: 'Night bus memberships, Skerrow Isles',
    unit: 'monthly members',
    focalName: 'Lampern',
    rivalName: 'Noctery',
    focalError: 0,
    rivalError: 0.05,
    fileName: 'night-buses.csv',
    sourceNote: SOURCE_NOTE,
    truth: {
      system: { r1: 0.17, r2: 0.2, k1: 9_000, k2: 8_000, alpha: 0.8, beta: 1.2 },
      start: [3_500, 1_200],
      firstMonth: '2024-08',
      months: 14,
      noise: { focal: 0.02, rival: 0.06 },
      seed: 1,
    },
  },
];

/** The committed counts of a demo market, as CSV. */
export function readDemoCsv(market: Pick<DemoMarket, 'fileName'>): string {
  return readFileSync(new URL(`markets/${market.fileName}`, import.meta.url), 'utf8');
}
