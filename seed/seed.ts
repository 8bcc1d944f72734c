/**
 * Puts the demo markets into the first workspace, each with a queued fit: a worker computes the results like any other.
 * Seeding again changes nothing; a demo market that somebody renamed or archived stays as they left it.
 */
import { DEFAULT_FIT_OPTIONS } from '../lib/estimate/defaults';
import { ENGINE_VERSION } from '../lib/estimate/engine-version';
import { canFit, readSeries } from '../lib/series/read-series';
import type { MonthlySeries } from '../lib/series/types';
import { createMarket, readMarket } from '../lib/store/markets';
import { createWorkspace, FIRST_WORKSPACE_NAME, findFirstWorkspace } from '../lib/store/workspaces';
import { DEMO_MARKETS, type DemoMarket, readDemoCsv } from './demo-markets';

const FIRST_WORKSPACE = { id: 'first-workspace', name: FIRST_WORKSPACE_NAME };

export interface SeedResult {
  workspaceId: string;
  /** Ids of the markets that were not there before. */
  created: string[];
}

/** @throws what the database throws; and when a committed file cannot be fitted, which the tests rule out */
export async function seedDemo(): Promise<SeedResult> {
  const { id: workspaceId } = (await findFirstWorkspace()) ?? (await createWorkspace(FIRST_WORKSPACE));
  const created: string[] = [];
  for (const market of DEMO_MARKETS) {
    if (await readMarket({ workspaceId, marketId: market.id })) continue;
    await storeDemoMarket(workspaceId, market);
    created.push(market.id);
  }
  return { workspaceId, created };
}

async function storeDemoMarket(workspaceId: string, demo: DemoMarket): Promise<void> {
  const { id, name, unit, focalName, rivalName, focalError, rivalError, fileName, sourceNote } = demo;
  const measurementFloor = { focal: focalError, rival: rivalError };
  await createMarket({
    workspaceId,
    market: { id, name, unit, focalName, rivalName, focalError, rivalError, isDemo: true },
    revision: { id: demo.revisionId, series: readDemoSeries(demo), fileName, sourceNote, createdById: null },
    fit: {
      id: demo.fitId,
      options: { ...DEFAULT_FIT_OPTIONS, measurementFloor },
      engineVersion: ENGINE_VERSION,
      requestedById: null,
    },
  });
}

/** Through the import code that every file takes. */
export function readDemoSeries(demo: DemoMarket): MonthlySeries {
  const mapping = { month: 'Month', focal: demo.focalName, rival: demo.rivalName };
  const reading = readSeries(readDemoCsv(demo), mapping);
  if (!canFit(reading)) throw new Error(`seed/markets/${demo.fileName} cannot be fitted`);
  return reading.series!;
}
