/** Accounts on real databases: one-time set-up links, sign-in, counted tries, roles. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { APIError } from 'better-auth/api';
import { afterAll, beforeAll, beforeEach, expect, it, vi } from 'vitest';
import { acceptSetupLink, checkSetupLink } from '@/lib/services/accept-setup-link';
import { getAuth } from '@/lib/services/auth';
import { TRY_LIMITS } from '@/lib/services/count-tries';
import { createMemberLink } from '@/lib/services/create-member-link';
import { createOwnerSetupLink } from '@/lib/services/create-owner-setup-link';
import { findViewer } from '@/lib/services/find-viewer';
import { listMembers } from '@/lib/services/list-members';
import type { SessionCookie } from '@/lib/services/session-cookies';
import { signIn } from '@/lib/services/sign-in';
import { signOut } from '@/lib/services/sign-out';
import type { Viewer } from '@/lib/services/viewer';
import { getPrisma } from '@/lib/store/client';
import { describeOnDatabases } from './database';
import { asMember, PASSWORD, signUp, tokenOf, visitorHeaders } from './people';

const dataFolder = mkdtempSync(join(tmpdir(), 'elbowroom-accounts-'));

beforeAll(() => {
  vi.stubEnv('DATA_DIR', dataFolder);
  vi.stubEnv('APP_URL', 'https://forecast.example.org');
});
afterAll(() => {
  vi.unstubAllEnvs();
  rmSync(dataFolder, { recursive: true });
});

describeOnDatabases('accounts', () => {
  beforeEach(async () => {
    await getPrisma().workspace.deleteMany();
    await getPrisma().user.deleteMany();
    await getPrisma().rateLimit.deleteMany();
  });

  async function signUpOwner(
    email = 'ines@example.org',
  ): Promise<{ viewer: Viewer; cookies: SessionCookie[] }> {
    const link = await createOwnerSetupLink();
    const outcome = await signUp(link!, email);
    if (!outcome.ok) throw new Error(outcome.code);
    const { cookies } = outcome.value;
    const viewer = await findViewer(visitorHeaders(cookies));
    return { viewer: viewer!, cookies };
  }

  it('the first set-up link makes its holder the owner and signs them in', async () => {
    const link = await createOwnerSetupLink();
    expect(link).toMatch(/^https:\/\/forecast\.example\.org\/setup\/[\w-]{43}$/);
    expect(await checkSetupLink(tokenOf(link!), visitorHeaders())).toMatchObject({
      ok: true,
      value: { role: 'owner' },
    });
    const outcome = await signUp(link!, 'Ines@Example.org');
    expect(outcome).toMatchObject({ ok: true });
    const cookies = outcome.ok ? outcome.value.cookies : [];
    expect(await findViewer(visitorHeaders(cookies))).toMatchObject({
      userName: 'Ines Marlow',
      role: 'owner',
    });
    expect(await createOwnerSetupLink()).toBeNull();
  });

  it('a set-up link makes one account only, even for two visitors at once', async () => {
    const link = await createOwnerSetupLink();
    const ends = await Promise.all(['a@example.org', 'b@example.org'].map((email) => signUp(link!, email)));
    expect(ends.filter((end) => end.ok)).toHaveLength(1);
    expect(ends.find((end) => !end.ok)).toEqual({ ok: false, code: 'not-available' });
    expect(await signUp(link!, 'c@example.org')).toEqual({ ok: false, code: 'not-available' });
    expect(await getPrisma().user.count()).toBe(1);
    expect(await getPrisma().member.count()).toBe(1);
  });

  it('while there is no owner each start prints a new link, and the one before no longer opens', async () => {
    const first = await createOwnerSetupLink();
    const second = await createOwnerSetupLink();
    expect(second).not.toBe(first);
    expect(await signUp(first!, 'ines@example.org')).toEqual({ ok: false, code: 'not-available' });
    expect(await signUp(second!, 'ines@example.org')).toMatchObject({ ok: true });
  });

  it('an expired link looks like a wrong one', async () => {
    const link = await createOwnerSetupLink();
    await getPrisma().setupLink.updateMany({ data: { expiresAt: new Date(Date.now() - 1000) } });
    const wrong = await checkSetupLink('A'.repeat(43), visitorHeaders());
    expect(await checkSetupLink(tokenOf(link!), visitorHeaders())).toEqual(wrong);
    expect(await signUp(link!, 'ines@example.org')).toEqual(wrong);
    expect(await getPrisma().user.count()).toBe(0);
  });

  it('neither the token nor the password is stored', async () => {
    const link = await createOwnerSetupLink();
    await signUp(link!, 'ines@example.org');
    const stored = JSON.stringify([
      await getPrisma().setupLink.findMany(),
      await getPrisma().account.findMany(),
      await getPrisma().auditEntry.findMany(),
    ]);
    expect(stored).not.toContain(tokenOf(link!));
    expect(stored).not.toContain(PASSWORD);
  });

  it('an address that has an account is refused, and the link stays good for another', async () => {
    const { viewer } = await signUpOwner('ines@example.org');
    const link = await createMemberLink(viewer, { role: 'analyst' });
    const path = link.ok ? link.value.path : '';
    expect(await signUp(path, 'INES@example.org')).toEqual({ ok: false, code: 'email-taken' });
    expect(await signUp(path, 'otto@example.org')).toMatchObject({ ok: true });
  });

  it('a weak password and a mistyped address are named by field, and the link stays good', async () => {
    const link = await createOwnerSetupLink();
    const form = { token: tokenOf(link!), name: ' ', email: 'ines', password: 'short' };
    const outcome = await acceptSetupLink(form, visitorHeaders());
    expect(outcome).toMatchObject({ ok: false, code: 'invalid-input' });
    expect(!outcome.ok && 'fields' in outcome && outcome.fields).toEqual([
      { field: 'name', code: 'missing' },
      { field: 'email', code: 'wrong-format' },
      { field: 'password', code: 'too-small' },
    ]);
    expect(await signUp(link!, 'ines@example.org')).toMatchObject({ ok: true });
  });

  it('nobody signs up without a link', async () => {
    const body = { name: 'Eve', email: 'eve@example.org', password: PASSWORD };
    await expect(getAuth().api.signUpEmail({ body })).rejects.toThrow(APIError);
    expect(await getPrisma().user.count()).toBe(0);
  });

  it('behind an https address the session cookie is secure, http-only and same-site', async () => {
    const { cookies } = await signUpOwner();
    expect(cookies[0]).toMatchObject({
      name: '__Secure-elbowroom.session_token',
      options: { secure: true, httpOnly: true, sameSite: 'lax', path: '/' },
    });
  });

  it('sign-in works in any case of the address, and a wrong password looks like an unknown account', async () => {
    await signUpOwner('ines@example.org');
    const outcome = await signIn({ email: 'Ines@Example.ORG', password: PASSWORD }, visitorHeaders());
    expect(outcome).toMatchObject({ ok: true });
    const wrong = await signIn({ email: 'ines@example.org', password: 'wrong horse' }, visitorHeaders());
    expect(wrong).toEqual({ ok: false, code: 'wrong-credentials' });
    expect(await signIn({ email: 'nobody@example.org', password: PASSWORD }, visitorHeaders())).toEqual(
      wrong,
    );
  });

  it('after too many wrong passwords even the right one is refused, for that address alone', async () => {
    await signUpOwner('ines@example.org');
    const guesser = visitorHeaders();
    for (let i = 0; i < TRY_LIMITS.signInPair.points; i++) {
      const end = await signIn({ email: 'ines@example.org', password: `guess ${i}` }, guesser);
      expect(end).toEqual({ ok: false, code: 'wrong-credentials' });
    }
    const right = { email: 'ines@example.org', password: PASSWORD };
    expect(await signIn(right, guesser)).toEqual({ ok: false, code: 'too-many-tries' });
    expect(await signIn(right, visitorHeaders())).toMatchObject({ ok: true });
  });

  it('right passwords use up no tries', async () => {
    await signUpOwner('ines@example.org');
    const visitor = visitorHeaders();
    await signIn({ email: 'ines@example.org', password: PASSWORD }, visitor);
    const left = await getPrisma().rateLimit.findMany({ where: { points: { not: 0 } } });
    expect(left).toEqual([]);
  });

  it('guessing at set-up links is stopped', async () => {
    const guesser = visitorHeaders();
    const guess = (i: number) => checkSetupLink(`${i}`.padStart(42, 'x').concat('A'), guesser);
    for (let i = 0; i < TRY_LIMITS.setupLink.points; i++) {
      expect(await guess(i)).toEqual({ ok: false, code: 'not-available' });
    }
    expect(await guess(-1)).toEqual({ ok: false, code: 'too-many-tries' });
  });

  it('signing out ends the session on the server', async () => {
    const { cookies } = await signUpOwner();
    const headers = visitorHeaders(cookies);
    const out = await signOut(headers);
    expect(out.cookies[0]).toMatchObject({ value: '', options: { maxAge: 0 } });
    expect(await findViewer(headers)).toBeNull();
  });

  it('an altered cookie and no cookie belong to nobody', async () => {
    const { cookies } = await signUpOwner();
    const altered = cookies.map((cookie) => ({ ...cookie, value: cookie.value.replace(/.$/, 'x') }));
    expect(await findViewer(visitorHeaders(altered))).toBeNull();
    expect(await findViewer(visitorHeaders())).toBeNull();
  });

  it('owners invite analysts and readers; others do not', async () => {
    const { viewer } = await signUpOwner();
    for (const role of ['analyst', 'reader'] as const) {
      const link = await createMemberLink(viewer, { role });
      const outcome = await signUp(link.ok ? link.value.path : '', `${role}@example.org`);
      const cookies = outcome.ok ? outcome.value.cookies : [];
      expect(await findViewer(visitorHeaders(cookies))).toMatchObject({
        role,
        workspaceId: viewer.workspaceId,
      });
      expect(await createMemberLink(asMember(viewer, role), { role })).toEqual({
        ok: false,
        code: 'not-allowed',
      });
    }
    const asOwner = { role: 'owner' } as unknown as { role: 'reader' };
    expect(await createMemberLink(viewer, asOwner)).toMatchObject({ ok: false, code: 'invalid-input' });
  });

  it('members see each other, owners also the addresses', async () => {
    const { viewer } = await signUpOwner('ines@example.org');
    expect(await listMembers(viewer)).toMatchObject([
      { name: 'Ines Marlow', email: 'ines@example.org', role: 'owner' },
    ]);
    expect(await listMembers(asMember(viewer, 'reader'))).toMatchObject([
      { name: 'Ines Marlow', email: null },
    ]);
    expect(await listMembers({ ...viewer, workspaceId: 'another' })).toEqual([]);
  });
});
