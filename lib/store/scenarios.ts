/** Scenarios: named sets of pushes on a market. */
import type { Prisma } from '../../prisma/generated/client';
import type { Push } from '../dynamics/push';
import { pushesSchema } from '../scenario/push-schema';
import { getPrisma } from './client';
import { createId } from './ids';
import { readJson } from './json-columns';

export interface Scenario {
  id: string;
  marketId: string;
  name: string;
  pushes: Push[];
  createdAt: Date;
  updatedAt: Date;
}

const SCENARIO = {
  id: true,
  marketId: true,
  name: true,
  pushes: true,
  createdAt: true,
  updatedAt: true,
} as const satisfies Prisma.ScenarioSelect;

/** @returns null when the workspace has no such market */
export async function createScenario(args: {
  workspaceId: string;
  marketId: string;
  id?: string;
  name: string;
  pushes: Push[];
}): Promise<{ scenarioId: string } | null> {
  const { workspaceId, marketId, id = createId(), name, pushes } = args;
  return getPrisma().$transaction(async (db) => {
    const found = await db.market.count({ where: { id: marketId, workspaceId } });
    if (found !== 1) return null;
    await db.scenario.create({
      data: { id, workspaceId, marketId, name, pushes: toColumn(pushes) },
      select: { id: true },
    });
    return { scenarioId: id };
  });
}

/** @returns false when the workspace has no such scenario */
export async function changeScenario(args: {
  workspaceId: string;
  scenarioId: string;
  name: string;
  pushes: Push[];
}): Promise<boolean> {
  const { count } = await getPrisma().scenario.updateMany({
    where: { id: args.scenarioId, workspaceId: args.workspaceId },
    data: { name: args.name, pushes: toColumn(args.pushes) },
  });
  return count === 1;
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
export async function removeScenario(args: { workspaceId: string; scenarioId: string }): Promise<boolean> {
  const { count } = await getPrisma().scenario.deleteMany({
    where: { id: args.scenarioId, workspaceId: args.workspaceId },
  });
  return count === 1;
}

function toColumn(pushes: Push[]): Prisma.InputJsonArray {
  return pushesSchema.parse(pushes) as unknown as Prisma.InputJsonArray;
}

function toScenario(row: Prisma.ScenarioGetPayload<{ select: typeof SCENARIO }>): Scenario {
  return { ...row, pushes: readJson(pushesSchema, row.pushes, 'scenario.pushes', row.id) };
}
