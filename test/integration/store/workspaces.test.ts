/** Workspaces, their members and set-up links, and the trail of what was done. */
import { setTimeout as wait } from 'node:timers/promises';
import { beforeEach, describe, expect, it } from 'vitest';
import { addAuditEntry, listAuditEntries } from '@/lib/store/audit';
import { getPrisma } from '@/lib/store/client';
import { createId } from '@/lib/store/ids';
import * as markets from '@/lib/store/markets';
import { addMember, findMembership, hasOwner, listMembers } from '@/lib/store/members';
import { createSetupLink, findSetupLink, replaceSetupLink } from '@/lib/store/setup-links';
import { ensureWorkspace, findWorkspace } from '@/lib/store/workspaces';
import { describeOnDatabases } from '../database';
import { AUDIT, HOUR, makeWorkspace, storeMarket } from './fixtures';

describeOnDatabases('workspaces', () => {
  let workspaceId: string;
  let otherWorkspaceId: string;
  beforeEach(async () => {
    workspaceId = await makeWorkspace();
    otherWorkspaceId = await makeWorkspace();
  });

  describe('with members and set-up links', () => {
    it('are made once: making sure of a workspace leaves its name alone', async () => {
      const id = createId();
      await ensureWorkspace({ id, name: 'First' });
      await ensureWorkspace({ id, name: 'Second' });
      expect(await findWorkspace({ workspaceId: id })).toEqual({ id, name: 'First' });
    });

    it('tell members and roles of a workspace', async () => {
      const userId = createId();
      await getPrisma().user.create({ data: { id: userId, name: 'Ada', email: `${userId}@example.org` } });
      expect(await hasOwner({ workspaceId })).toBe(false);
      await addMember({ workspaceId, userId, role: 'owner' });
      expect(await hasOwner({ workspaceId })).toBe(true);
      expect(await hasOwner({ workspaceId: otherWorkspaceId })).toBe(false);
      expect(await findMembership({ userId })).toEqual({
        userId,
        userName: 'Ada',
        workspaceId,
        workspaceName: 'Umbra Analytics',
        role: 'owner',
      });
      expect(await listMembers({ workspaceId })).toMatchObject([{ userId, name: 'Ada', role: 'owner' }]);
    });

    it('replace an unused link by the next one of the same role only', async () => {
      const expiresAt = new Date(Date.now() + HOUR);
      const [owner, analyst, next] = [createId(), createId(), createId()];
      await createSetupLink({ workspaceId, tokenHash: owner, role: 'owner', expiresAt });
      await createSetupLink({ workspaceId, tokenHash: analyst, role: 'analyst', expiresAt });
      await replaceSetupLink({ workspaceId, tokenHash: next, role: 'owner', expiresAt });
      const now = new Date();
      expect(await findSetupLink({ tokenHash: owner, now })).toBeNull();
      expect(await findSetupLink({ tokenHash: analyst, now })).toMatchObject({
        role: 'analyst',
        workspaceId,
      });
      expect(await findSetupLink({ tokenHash: next, now })).toMatchObject({ role: 'owner' });
      expect(await findSetupLink({ tokenHash: next, now: expiresAt })).toBeNull();
    });
  });

  describe('with an audit trail', () => {
    it('holds what was done, newest first, written with the deed', async () => {
      const { marketId } = await storeMarket(workspaceId, AUDIT);
      await wait(2);
      await addAuditEntry({
        workspaceId,
        ...AUDIT,
        subjectType: 'x',
        subjectId: 'y',
        detail: { months: 4, ok: true },
      });
      expect(await listAuditEntries({ workspaceId, limit: 10 })).toMatchObject([
        { subjectType: 'x', subjectId: 'y', detail: { months: 4, ok: true } },
        { ...AUDIT, subjectType: 'market', subjectId: marketId, detail: null },
      ]);
    });

    it('has no entry for a deed that was refused', async () => {
      const { marketId } = await storeMarket(workspaceId);
      const refused = { workspaceId: otherWorkspaceId, marketId, changes: { name: 'x' }, audit: AUDIT };
      expect(await markets.editMarket(refused)).toBe(false);
      expect(await listAuditEntries({ workspaceId: otherWorkspaceId, limit: 10 })).toEqual([]);
      expect(await listAuditEntries({ workspaceId, limit: 10 })).toEqual([]);
    });
  });
});
