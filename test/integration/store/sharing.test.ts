/** Issued forecasts stay as they were; a link opens one as long as it is good. */
import { beforeEach, expect, it } from 'vitest';
import { getPrisma } from '@/lib/store/client';
import * as links from '@/lib/store/forecast-links';
import { createId } from '@/lib/store/ids';
import * as issued from '@/lib/store/issued-forecasts';
import { describeOnDatabases } from '../database';
import { HOUR, makeIssued, makeWorkspace, storeIssued, storeLink, storeMarket } from './fixtures';

describeOnDatabases('issued forecasts and their links', () => {
  let workspaceId: string;
  beforeEach(async () => {
    workspaceId = await makeWorkspace();
  });

  it('give back the frozen content as it was', async () => {
    const { marketId, issuedId } = await storeIssued(workspaceId);
    expect((await issued.readIssuedForecast({ workspaceId, issuedId }))!.content).toEqual(makeIssued());
    expect(await issued.listIssuedForecasts({ workspaceId, marketId })).toEqual([
      expect.objectContaining({
        id: issuedId,
        issuedByName: 'Ines Marlow',
        formatVersion: makeIssued().formatVersion,
        links: [],
      }),
    ]);
  });

  it('of a later format are an error that names the reason, not a guess', async () => {
    const { issuedId } = await storeIssued(workspaceId);
    const content = { ...makeIssued(), formatVersion: 99 };
    await getPrisma().issuedForecast.update({ where: { id: issuedId }, data: { content } });
    const failure = await issued
      .readIssuedForecast({ workspaceId, issuedId })
      .catch((error: unknown) => error);
    expect(failure).toMatchObject({
      code: 'inconsistent-row',
      message: expect.stringContaining('unknown-version'),
    });
  });

  it('cannot be issued from a fit that has not ended well', async () => {
    const { marketId, fitId } = await storeMarket(workspaceId);
    const content = makeIssued();
    expect(
      await issued.createIssuedForecast({ workspaceId, marketId, fitId, issuedById: null, content }),
    ).toBeNull();
  });

  it('open by the hash of a token and count the visits', async () => {
    const { issuedId, tokenHash, linkId } = await storeLink(workspaceId);
    expect(await links.openForecastLink({ tokenHash, now: new Date() })).toEqual(makeIssued());
    const now = new Date();
    await links.openForecastLink({ tokenHash, now });
    expect(await links.listForecastLinks({ workspaceId, issuedId })).toEqual([
      expect.objectContaining({ id: linkId, openedCount: 2, lastOpenedAt: now, revokedAt: null }),
    ]);
  });

  it('do not open when wrong, expired or revoked, and do not count that', async () => {
    const expiresAt = new Date(Date.now() + HOUR);
    const { issuedId, tokenHash, linkId } = await storeLink(workspaceId, expiresAt);
    expect(await links.openForecastLink({ tokenHash: createId(), now: new Date() })).toBeNull();
    expect(await links.openForecastLink({ tokenHash, now: expiresAt })).toBeNull();
    expect(await links.revokeForecastLink({ workspaceId, linkId })).toBe(true);
    expect(await links.revokeForecastLink({ workspaceId, linkId })).toBe(false);
    expect(await links.openForecastLink({ tokenHash, now: new Date() })).toBeNull();
    expect(await links.listForecastLinks({ workspaceId, issuedId })).toEqual([
      expect.objectContaining({ openedCount: 0, revokedAt: expect.any(Date) }),
    ]);
  });
});
