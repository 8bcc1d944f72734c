/** The few numbers of each market's newest outlook that a list shows, without reading whole results. */
import { z } from 'zod';
import type { FitOptions } from '../estimate/types';
import { OUTCOMES, type Outcome } from '../forecast/outcomes';
import { type Odds, oddsSchema } from '../forecast/report';
import { getPrisma } from './client';
import { fitOptionsSchema, readJson } from './json-columns';

export interface OutlookHead {
  fitId: string;
  marketId: string;
  revisionId: string;
  /** Of the engine that made the result. */
  engineVersion: string;
  options: FitOptions;
  odds: Odds;
  /** null: the data do not decide yet. */
  decided: Outcome | null;
}

const decidedSchema = z.enum(OUTCOMES).nullable();

interface HeadRow {
  id: string;
  marketId: string;
  revisionId: string;
  engineVersion: string;
  options: unknown;
  odds: unknown;
  decided: unknown;
}

/** One for each market of the workspace that has a fit which ended well, keyed by the market's id. */
export async function listOutlookHeads(args: { workspaceId: string }): Promise<Map<string, OutlookHead>> {
  const rows = await getPrisma().$queryRaw<HeadRow[]>`
    SELECT DISTINCT ON ("marketId") "id", "marketId", "revisionId", "options",
      "result"->>'engineVersion' AS "engineVersion",
      "result"->'outlook'->'odds' AS "odds",
      "result"->'outlook'->>'decided' AS "decided"
    FROM "fit"
    WHERE "workspaceId" = ${args.workspaceId} AND "state" = 'done'
    ORDER BY "marketId", "createdAt" DESC, "id" DESC`;
  return new Map(rows.map((row) => [row.marketId, toHead(row)]));
}

function toHead({ id, options, odds, decided, ...columns }: HeadRow): OutlookHead {
  return {
    fitId: id,
    ...columns,
    options: readJson(fitOptionsSchema, options, 'fit.options', id),
    odds: readJson(oddsSchema, odds, 'fit.result odds', id),
    decided: readJson(decidedSchema, decided, 'fit.result decided', id),
  };
}
