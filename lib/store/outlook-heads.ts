/** The few numbers of each market's newest outlook that a list shows, without reading whole results. */
import { z } from 'zod';
import type { FitOptions } from '../estimate/types';
import { OUTCOMES, type Outcome } from '../forecast/outcomes';
import { type Interval, intervalSchema, type Odds, oddsSchema } from '../forecast/report';
import type { Month } from '../series/types';
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
  /** The focal firm's share: in the first month of the forecast and in its last one. */
  share: { first: Interval; last: Interval; lastMonth: Month };
}

const decidedSchema = z.enum(OUTCOMES).nullable();
const monthSchema = z.number().int();

interface HeadRow {
  id: string;
  marketId: string;
  revisionId: string;
  engineVersion: string;
  options: unknown;
  odds: unknown;
  decided: unknown;
  firstShare: unknown;
  lastShare: unknown;
  lastMonth: unknown;
}

/** One for each market of the workspace that has a fit which ended well, keyed by the market's id. */
export async function listOutlookHeads(args: { workspaceId: string }): Promise<Map<string, OutlookHead>> {
  const rows = await getPrisma().$queryRaw<HeadRow[]>`
    SELECT DISTINCT ON ("marketId") "id", "marketId", "revisionId", "options",
      "result"->>'engineVersion' AS "engineVersion",
      "result"->'outlook'->'odds' AS "odds",
      "result"->'outlook'->>'decided' AS "decided",
      ("result"->'outlook'->>'firstMonth')::int + ("result"->'outlook'->>'horizonMonths')::int - 1 AS "lastMonth",
      (SELECT jsonb_object_agg("key", "value"->0) FROM jsonb_each("result"->'outlook'->'levels'->'share'))
        AS "firstShare",
      (SELECT jsonb_object_agg("key", "value"->-1) FROM jsonb_each("result"->'outlook'->'levels'->'share'))
        AS "lastShare"
    FROM "fit"
    WHERE "workspaceId" = ${args.workspaceId} AND "state" = 'done'
    ORDER BY "marketId", "createdAt" DESC, "id" DESC`;
  return new Map(rows.map((row) => [row.marketId, toHead(row)]));
}

function toHead(row: HeadRow): OutlookHead {
  const { id, options, odds, decided, firstShare, lastShare, lastMonth, ...columns } = row;
  return {
    fitId: id,
    ...columns,
    options: readJson(fitOptionsSchema, options, 'fit.options', id),
    odds: readJson(oddsSchema, odds, 'fit.result odds', id),
    decided: readJson(decidedSchema, decided, 'fit.result decided', id),
    share: {
      first: readJson(intervalSchema, firstShare, 'fit.result share', id),
      last: readJson(intervalSchema, lastShare, 'fit.result share', id),
      lastMonth: readJson(monthSchema, lastMonth, 'fit.result last month', id),
    },
  };
}
