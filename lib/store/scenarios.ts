/** Scenarios: named sets of pushes on a market, with what is assumed to count money and the fit they were last looked at with. */
import { Prisma } from '../../prisma/generated/client';
import { type Money, moneySchema } from '../scenario/money';
import { pushesSchema } from '../scenario/push-schema';
import type { PricedPush } from '../scenario/spend';
import { type Deed, insertAuditEntry } from './audit';
import { getPrisma } from './client';
import { createId } from './ids';
import { readJson } from './json-columns';

export interface ScenarioContent {
  name: string;
  pushes: PricedPush[];
  /** Absent or null: no money is counted. */
  money?: Money | null | undefined;
  /** The fit whose draws it was last compared on; absent or null: not known. */
  fitId?: string | null | undefined;
}

export interface Scenario extends Required<ScenarioContent> {
  id: string;
  marketId: string;
  createdAt: Date;
  updatedAt: Date;
}

const SCENARIO = {
  id: true,
  marketId: true,
  name: true,
  pushes: true,
  money: true,
  fitId: true,
  createdAt: true,
  updatedAt: true,
} as const satisfies Prisma.ScenarioSelect;

/** @returns null when the workspace has no such market */
export async function createScenario(
  args: ScenarioContent & { workspaceId: string; marketId: string; id?: string; audit?: Deed },
): Promise<{ scenarioId: string } | null> {
  const { workspaceId, marketId, id = createId(), audit, ...content } = args;
  return getPrisma().$transaction(async (db) => {
    const found = await db.market.count({ where: { id: marketId, workspaceId } });
    if (found !== 1) return null;
    await db.scenario.create({
      data: { id, workspaceId, marketId, ...toColumns(content) },
      select: { id: true },
    });
    if (audit) await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'scenario', subjectId: id });
    return { scenarioId: id };
  });
}

/** @returns false when the workspace has no such scenario */
export async function changeScenario(
  args: ScenarioContent & { workspaceId: string; scenarioId: string; audit?: Deed },
): Promise<boolean> {
  const { workspaceId, scenarioId, audit, ...content } = args;
  return getPrisma().$transaction(async (db) => {
    const where = { id: scenarioId, workspaceId };
    const { count } = await db.scenario.updateMany({ where, data: toColumns(content) });
    if (count === 1 && audit)
      await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'scenario', subjectId: scenarioId });
    return count === 1;
  });
}

export async function readScenario(args: {
  workspaceId: string;
  scenarioId: string;
}): Promise<Scenario | null> {
  const row = await getPrisma().scenario.findFirst({
    where: { id: args.scenarioId, workspaceId: args.workspaceId },
    select: SCENARIO,
  });
  return row && toScenario(row);
}

/** Last changed first. */
export async function listScenarios(args: { workspaceId: string; marketId: string }): Promise<Scenario[]> {
  const rows = await getPrisma().scenario.findMany({
    where: { marketId: args.marketId, workspaceId: args.workspaceId },
    orderBy: [{ updatedAt: 'desc' }, { id: 'asc' }],
    select: SCENARIO,
  });
  return rows.map(toScenario);
}

/** @returns false when the workspace has no such scenario */
export async function removeScenario(args: {
  workspaceId: string;
  scenarioId: string;
  audit?: Deed;
}): Promise<boolean> {
  const { workspaceId, scenarioId, audit } = args;
  return getPrisma().$transaction(async (db) => {
    const { count } = await db.scenario.deleteMany({ where: { id: scenarioId, workspaceId } });
    if (count === 1 && audit)
      await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'scenario', subjectId: scenarioId });
    return count === 1;
  });
}

function toColumns({ name, pushes, money, fitId }: ScenarioContent) {
  return {
    name,
    pushes: pushesSchema.parse(pushes) as unknown as Prisma.InputJsonArray,
    money: money ? (moneySchema.parse(money) as unknown as Prisma.InputJsonObject) : Prisma.DbNull,
    fitId: fitId ?? null,
  };
}

function toScenario(row: Prisma.ScenarioGetPayload<{ select: typeof SCENARIO }>): Scenario {
  return {
    ...row,
    pushes: readJson(pushesSchema, row.pushes, 'scenario.pushes', row.id),
    money: readJson(moneySchema.nullable(), row.money, 'scenario.money', row.id),
  };
}
