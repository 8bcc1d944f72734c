/**
 * The whole path in one browser: set-up link, account, upload of an open series, progress, verdict, push, issued forecast,
 * link opened signed out, new data, revoked link. Pages are checked by axe on the way, in light and dark, wide and narrow.
 */
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { findViolations, openBrowser, openPage, shoot, type WatchedPage } from './browser';
import { giveFile, signUp } from './people';
import { type RunningApp, startApp } from './running-app';

const SERIES_FILE = fileURLToPath(new URL('data/gause-paramecium.csv', import.meta.url));
/** A fit takes seconds here; a busy machine may need more. */
const FIT_LIMIT_MS = 120_000;

let app: RunningApp;
let browser: Browser;
let analyst: WatchedPage;
let marketUrl = '';
let linkUrl = '';

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp(), openBrowser()]);
  analyst = await openPage(browser);
});

afterAll(async () => {
  await browser?.close();
  expect(await app?.stop()).toBe(0);
});

describe.sequential('from a file to a link', () => {
  test('somebody signed out is sent to the sign-in page', async () => {
    const { page, context, errors } = await openPage(browser);
    await page.goto(app.address);
    await page.waitForURL(`${app.address}/sign-in*`);
    await page.getByRole('button', { name: 'Sign in' }).waitFor();
    expect(await findViolations(page)).toEqual([]);
    expect(errors).toEqual([]);
    await context.close();
  });

  test('the set-up link makes the owner, once', async () => {
    const { page } = analyst;
    await page.goto(app.ownerLink);
    expect(await findViolations(page)).toEqual([]);
    await signUp(page, app, app.ownerLink, { name: 'Mira Tarn', email: 'mira@example.org' });
    const second = await openPage(browser);
    await second.page.goto(app.ownerLink);
    expect(await second.page.getByRole('button', { name: 'Make the account' }).count()).toBe(0);
    await second.context.close();
  });

  test('the four demo markets are fitted and listed with their verdicts', async () => {
    const { page } = analyst;
    await expect
      .poll(
        async () => {
          await page.reload();
          return page.getByText(/waiting for a worker|being fitted|starting|fit is running/i).count();
        },
        { timeout: FIT_LIMIT_MS, interval: 2000 },
      )
      .toBe(0);
    await expect
      .poll(() =>
        page
          .getByRole('main')
          .getByRole('link', { name: /Skerrow/ })
          .count(),
      )
      .toBe(4);
    expect(await findViolations(page)).toEqual([]);
    await shoot(page, 'markets');
  });

  test('an open series is uploaded, understood and stored', async () => {
    const { page } = analyst;
    await page.goto(`${app.address}/markets/new`);
    expect(await findViolations(page)).toEqual([]);
    await giveFile(page, SERIES_FILE);
    await page.getByText(/26 months, January 2020 to February 2022/).waitFor();
    await page.getByText(/both firms known in/).waitFor();
    await page.getByLabel('Name of the market').fill('Two species in one tube');
    await page.getByLabel('What is counted').fill('individuals per 0.5 cc');
    expect(await findViolations(page)).toEqual([]);
    await shoot(page, 'import');
    await page.getByRole('button', { name: 'Store the counts and fit' }).click();
    await page.waitForURL((url) => /^\/markets\/(?!new$)[^/]+$/.test(url.pathname));
    marketUrl = page.url();
  });

  test('the fit shows its progress and ends in a verdict with odds', async () => {
    const { page } = analyst;
    await page
      .getByText('Starts done')
      .or(page.getByRole('heading', { level: 1 }).first())
      .first()
      .waitFor();
    await page.getByText('Where is it heading?').waitFor({ timeout: FIT_LIMIT_MS });
    const headline = await page.getByRole('heading', { level: 1 }).textContent();
    expect(headline).toMatch(/P\. aurelia|P\. caudatum|decide/);
    await page
      .getByText(/room that P\. caudatum takes from P\. aurelia/i)
      .first()
      .waitFor();
    expect(await findViolations(page)).toEqual([]);
    await shoot(page, 'brief-gause');
  });

  test('a push redraws the forecast and says whether it moves the destination or only the path', async () => {
    const { page } = analyst;
    await scrollOn(page);
    const answer = page
      .getByText(/path, not the destination|moves the destination|may move the destination|path/i)
      .first();
    await answer.waitFor({ timeout: 30_000 });
    const size = page
      .getByRole('textbox', { name: 'Recruits' })
      .or(page.getByRole('spinbutton', { name: 'Recruits' }))
      .first();
    const before = await page.getByRole('main').textContent();
    await size.fill('60');
    await size.press('Enter');
    await expect.poll(async () => (await page.getByRole('main').textContent()) !== before).toBe(true);
    await page.getByRole('radio', { name: 'Faster growth' }).check();
    await page.getByText('Growth is higher by').first().waitFor();
    expect(await findViolations(page)).toEqual([]);
  });

  test('a forecast is issued and its link opens without an account', async () => {
    const { page } = analyst;
    await page
      .getByRole('button', { name: /^Issue/ })
      .first()
      .click();
    await page.getByRole('button', { name: 'Make a link' }).click();
    linkUrl = await page.getByLabel('Forecast link').inputValue();
    const reader = await openPage(browser);
    const response = await reader.page.goto(linkUrl);
    expect(response?.headers()).toMatchObject({ 'referrer-policy': 'no-referrer' });
    expect(response?.headers()['cache-control']).toMatch(/no-store/);
    expect(response?.headers()['x-robots-tag']).toMatch(/noindex/);
    await reader.page.getByText('by Mira Tarn').first().waitFor();
    expect(await reader.page.getByRole('main').textContent()).toMatch(/no investment advice/);
    expect(await findViolations(reader.page)).toEqual([]);
    expect(reader.errors).toEqual([]);
    await shoot(reader.page, 'forecast-link');
    await reader.context.close();
  });

  test('the issued forecast stays as it was when a market gets new counts', async () => {
    const { page } = analyst;
    // Without scripts: what the server sends is the forecast; figures that draw themselves later add nothing to it.
    const reader = await openPage(browser, { javaScriptEnabled: false });
    await reader.page.goto(linkUrl);
    const frozen = await reader.page.getByRole('main').textContent();
    expect(frozen).toContain('P. aurelia');
    await page.goto(`${marketUrl}/data`);
    expect(await findViolations(page)).toEqual([]);
    const rows = readFileSync(SERIES_FILE, 'utf8').trimEnd();
    await page.getByLabel('Or paste the cells, with their header').fill(`${rows}\n2022-03,350,18\n`);
    await page.getByRole('button', { name: /Store revision 2/ }).click();
    await page.waitForURL(marketUrl);
    await reader.page.reload();
    expect(await reader.page.getByRole('main').textContent()).toBe(frozen);
    await reader.context.close();
  });

  test('a revoked link is gone, and looks like a wrong one', async () => {
    const { page } = analyst;
    await page.goto(marketUrl);
    await page.getByText('Where is it heading?').waitFor({ timeout: FIT_LIMIT_MS });
    await page
      .getByRole('button', { name: /^Revoke the link/ })
      .first()
      .click();
    await page.getByRole('button', { name: 'Withdraw it' }).click();
    await page
      .getByText(/withdrawn/)
      .first()
      .waitFor();
    const reader = await openPage(browser);
    const gone = await reader.page.goto(linkUrl);
    expect(gone?.status()).toBe(404);
    const goneText = await reader.page.getByRole('main').textContent();
    const wrong = await reader.page.goto(`${app.address}/f/${'A'.repeat(linkUrl.split('/f/')[1].length)}`);
    expect(wrong?.status()).toBe(404);
    expect(await reader.page.getByRole('main').textContent()).toBe(goneText);
    expect(await findViolations(reader.page)).toEqual([]);
    await reader.context.close();
  });

  test('nothing went wrong in the analyst’s browser', () => {
    expect(analyst.errors).toEqual([]);
  });
});

describe.sequential('the brief on other screens', () => {
  test.each([
    { name: 'brief-desktop', viewport: { width: 1440, height: 1000 }, colorScheme: 'light' as const },
    { name: 'brief-dark', viewport: { width: 1440, height: 1000 }, colorScheme: 'dark' as const },
    { name: 'brief-phone', viewport: { width: 390, height: 844 }, colorScheme: 'light' as const },
    { name: 'brief-phone-dark', viewport: { width: 390, height: 844 }, colorScheme: 'dark' as const },
    { name: 'brief-narrow', viewport: { width: 320, height: 640 }, colorScheme: 'light' as const },
  ])('$name has no violations and no sideways scroll', async ({ name, viewport, colorScheme }) => {
    const { page, context, errors } = await openPage(browser, {
      viewport,
      colorScheme,
      reducedMotion: 'reduce',
      storageState: await analyst.context.storageState(),
    });
    await page.goto(app.address);
    await page
      .getByRole('link', { name: /Ferry passes/ })
      .first()
      .click();
    await page.getByText('Where is it heading?').waitFor();
    await scrollOn(page);
    await page
      .getByText(/path, not the destination/)
      .first()
      .waitFor({ timeout: 30_000 });
    expect(await findViolations(page)).toEqual([]);
    const overflow = await page.evaluate(
      () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
    );
    expect(overflow).toBe(0);
    expect(errors).toEqual([]);
    await shoot(page, name);
    await context.close();
  });
});

/** What lies below the first screen comes once somebody reads on. */
function scrollOn(page: Page): Promise<void> {
  return page.mouse.wheel(0, 400);
}
