/**
 * The brief as a document in a browser: its figures as files, forced colours, 200 % zoom, print, a market archived and restored. The
 * demonstration markets are enough; they are fitted when the app starts.
 */
import { readFileSync } from 'node:fs';
import Papa from 'papaparse';
import type { Browser, Download, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { findViolations, openBrowser, openPage, shoot, type WatchedPage } from './browser';
import { signUp } from './people';
import { type RunningApp, startApp } from './running-app';

const FIT_LIMIT_MS = 120_000;

let app: RunningApp;
let browser: Browser;
let analyst: WatchedPage;
let briefUrl = '';

beforeAll(async () => {
  [app, browser] = await Promise.all([startApp(), openBrowser()]);
  analyst = await openPage(browser);
  const { page } = analyst;
  await signUp(page, app, app.ownerLink, { name: 'Mira Tarn', email: 'mira@example.org' });
  await page
    .getByRole('link', { name: /Ferry passes/ })
    .first()
    .click();
  await page.getByText('Where is it heading?').waitFor({ timeout: FIT_LIMIT_MS });
  briefUrl = page.url();
});

afterAll(async () => {
  await browser?.close();
  expect(await app?.stop()).toBe(0);
});

async function save(page: Page, name: RegExp): Promise<Download> {
  const pending = page.waitForEvent('download');
  await page.getByRole('button', { name }).first().click();
  return pending;
}

const contentOf = async (download: Download) => readFileSync(await download.path());

describe.sequential('the main figure is saved', () => {
  test('as its unrounded numbers, which a spreadsheet reads as numbers', async () => {
    const download = await save(analyst.page, /^CSV/);
    expect(download.suggestedFilename()).toMatch(/^[\p{L}\p{N}-]+\.csv$/u);
    const text = (await contentOf(download)).toString('utf8').replace('\uFEFF', '');
    const [header, ...rows] = Papa.parse<string[]>(text, { skipEmptyLines: true }).data;
    expect(header!.join(' ')).toContain('Ostrel');
    expect(rows.length).toBeGreaterThan(24);
    for (const row of rows) {
      expect(row).toHaveLength(header!.length);
      for (const cell of row.slice(1)) expect(Number(cell)).not.toBeNaN();
    }
  });

  test('as an SVG that stands alone: title, description, no variables, no class', async () => {
    const text = (await contentOf(await save(analyst.page, /^SVG/))).toString('utf8');
    expect(text.slice(0, 900)).toContain('xmlns="http://www.w3.org/2000/svg"');
    expect(/<title>.+<\/title><desc>.+<\/desc>/s.test(text)).toBe(true);
    expect(/var\(--/.test(text)).toBe(false);
    expect(text.includes('class=')).toBe(false);
    const { page, context } = await openPage(browser);
    await page.setContent(`<img alt="" src="data:image/svg+xml;charset=utf-8,${encodeURIComponent(text)}">`);
    expect(
      await page.evaluate(async () => {
        const image = document.querySelector('img')!;
        await image.decode();
        return image.naturalWidth;
      }),
    ).toBeGreaterThan(300);
    await context.close();
  });

  test('as a PNG at twice its size', async () => {
    const bytes = await contentOf(await save(analyst.page, /^PNG/));
    expect([...bytes.subarray(1, 4)].map((code) => String.fromCharCode(code)).join('')).toBe('PNG');
    const width = await analyst.page
      .locator('figure svg')
      .first()
      .evaluate((svg) => svg.clientWidth);
    // bytes 16 to 19 of a PNG hold its width
    expect(bytes.readUInt32BE(16)).toBeGreaterThanOrEqual(2 * Math.min(width, 300));
  });
});

describe.sequential('the brief is read', () => {
  test('in the colours of the reader’s own palette', async () => {
    const { page, context, errors } = await openPage(browser, {
      forcedColors: 'active',
      storageState: await analyst.context.storageState(),
    });
    await page.goto(briefUrl);
    await page.getByText('Where is it heading?').waitFor();
    await page.mouse.wheel(0, 900);
    await page
      .getByText(/the destination/)
      .first()
      .waitFor({ timeout: 30_000 });
    expect(await findViolations(page)).toEqual([]);
    expect(errors).toEqual([]);
    await shoot(page, 'brief-forced-colours');
    await context.close();
  });

  test('at 200 % zoom of a small window, without sideways scroll', async () => {
    const { page, context } = await openPage(browser, {
      viewport: { width: 640, height: 480 },
      deviceScaleFactor: 2,
      storageState: await analyst.context.storageState(),
    });
    await page.goto(briefUrl);
    await page.getByText('Where is it heading?').waitFor();
    await page.mouse.wheel(0, 900);
    await page
      .getByText(/the destination/)
      .first()
      .waitFor({ timeout: 30_000 });
    expect(
      await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth),
    ).toBe(0);
    await context.close();
  });

  test('by keyboard: the first stop skips to the text, and every stop can be seen', async () => {
    const { page } = analyst;
    await page.goto(briefUrl);
    await page.getByText('Where is it heading?').waitFor();
    for (let stop = 0; stop < 25; stop++) {
      await page.keyboard.press('Tab');
      const focused = await page.evaluate(() => {
        const element = document.activeElement!;
        const { width, height } = element.getBoundingClientRect();
        return { name: element.tagName, area: width * height };
      });
      if (focused.name !== 'BODY') expect(focused.area, `stop ${stop}: ${focused.name}`).toBeGreaterThan(0);
    }
  });
});

describe.sequential('a market', () => {
  test('is archived and restored, and its brief can be read meanwhile', async () => {
    const { page } = analyst;
    await page.goto(app.address);
    await page.getByRole('button', { name: /^Archive Night bus/ }).click();
    await page.getByText('One archived market').waitFor();
    expect(await page.getByRole('button', { name: /^Archive Night bus/ }).count()).toBe(0);
    await page.getByText('One archived market').click();
    await page.getByRole('link', { name: /Night bus/ }).click();
    await page.getByText(/This market is archived/).waitFor();
    await page.getByRole('button', { name: /^Restore Night bus/ }).click();
    await page.getByText(/This market is archived/).waitFor({ state: 'detached' });
    await page.goto(app.address);
    await page.getByRole('button', { name: /^Archive Night bus/ }).waitFor();
    expect(await findViolations(page)).toEqual([]);
    expect(analyst.errors).toEqual([]);
  });
});
