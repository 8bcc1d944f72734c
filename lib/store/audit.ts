/** The audit trail: who did what to which row. Entries are inserted in the transaction of what they tell of, never changed. */
import { z } from 'zod';
import type { Prisma } from '../../prisma/generated/client';
import { getPrisma, type Queryable } from './client';
import { createId } from './ids';
import { readJson } from './json-columns';

export interface AuditInput {
  userId: string | null;
  /** Verb of lib/services, e.g. "issue-forecast". */
  action: string;
  subjectType: string;
  subjectId: string;
  /** Small and free of personal data and tokens. */
  detail?: Record<string, string | number | boolean | null>;
}

/** Who did what; the function that does it adds to which row. */
export type Deed = Omit<AuditInput, 'subjectType' | 'subjectId'>;

export interface AuditEntry {
  id: string;
  userId: string | null;
  action: string;
  subjectType: string;
  subjectId: string;
  detail: Record<string, unknown> | null;
  createdAt: Date;
}

const detailSchema = z.record(z.string(), z.unknown()).nullable();

export async function addAuditEntry(args: { workspaceId: string } & AuditInput): Promise<void> {
  const { workspaceId, ...entry } = args;
  await insertAuditEntry(getPrisma(), workspaceId, entry);
}

/** For the other files of the store, inside their transactions. */
export async function insertAuditEntry(db: Queryable, workspaceId: string, entry: AuditInput): Promise<void> {
  const { detail, ...columns } = entry;
  await db.auditEntry.create({
    data: { id: createId(), workspaceId, ...columns, detail: detail as Prisma.InputJsonObject | undefined },
    select: { id: true },
  });
}

/** Newest first. */
export async function listAuditEntries(args: { workspaceId: string; limit: number }): Promise<AuditEntry[]> {
  const rows = await getPrisma().auditEntry.findMany({
    where: { workspaceId: args.workspaceId },
    orderBy: [{ createdAt: 'desc' }, { id: 'asc' }],
    take: args.limit,
    select: {
      id: true,
      userId: true,
      action: true,
      subjectType: true,
      subjectId: true,
      detail: true,
      createdAt: true,
    },
  });
  return rows.map((row) => ({
    ...row,
    detail: readJson(detailSchema, row.detail, 'audit_entry.detail', row.id),
  }));
}
