/**
 * Speed of the brief in a real browser: `npm run -s bench:web`.
 *
 * Starts the app as a person would, signs the owner in, waits for the demonstration markets and opens one brief several times
 * with an empty cache: server answer (first byte of the document), largest paint, layout shift, JavaScript sent (compressed,
 * until the page is idle), and how long a push control takes to redraw its figures. Medians; goals beside them; exit code 1 when
 * one is missed.
 */
import type { Browser, Page } from 'playwright-core';
import { openBrowser, openPage } from '../browser/browser';
import { startApp } from '../browser/running-app';

const MARKET = /Ferry passes/;
const LOADS = 5;
const REDRAWS = 15;
const FIT_LIMIT_MS = 180_000;
const IDLE_MS = 2500;

interface Goal {
  name: string;
  unit: string;
  limit: number;
  digits: number;
}

const GOALS = {
  answer: { name: 'server answer', unit: 'ms', limit: 150, digits: 0 },
  paint: { name: 'largest paint', unit: 'ms', limit: 1000, digits: 0 },
  shift: { name: 'layout shift', unit: '', limit: 0, digits: 3 },
  script: { name: 'JavaScript, compressed', unit: 'KB', limit: 250, digits: 0 },
  redraw: { name: 'push control to redraw', unit: 'ms', limit: 50, digits: 0 },
} satisfies Record<string, Goal>;

type Measure = keyof typeof GOALS;

function median(values: number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[sorted.length >> 1];
}

interface Load {
  answer: number;
  paint: number;
  shift: number;
  script: number;
  pieces: [url: string, bytes: number][];
}

/** What the page itself saw of its loading; installed before the first script runs. */
function watchPaints(): void {
  const seen = { paint: 0, shift: 0 };
  Object.assign(window, { seen });
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) seen.paint = Math.max(seen.paint, entry.startTime);
  }).observe({ type: 'largest-contentful-paint', buffered: true });
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) seen.shift += (entry as unknown as { value: number }).value;
  }).observe({ type: 'layout-shift', buffered: true });
}

async function measureLoad(browser: Browser, address: string, storageState: Storage): Promise<Load> {
  const { page, context } = await openPage(browser, { storageState });
  const devtools = await context.newCDPSession(page);
  const scripts = new Map<string, string>();
  const pieces: [string, number][] = [];
  await devtools.send('Network.enable');
  await devtools.send('Network.setCacheDisabled', { cacheDisabled: true });
  devtools.on('Network.responseReceived', ({ requestId, response, type }) => {
    if (type === 'Script') scripts.set(requestId, response.url);
  });
  devtools.on('Network.loadingFinished', ({ requestId, encodedDataLength }) => {
    const url = scripts.get(requestId);
    if (url) pieces.push([url, encodedDataLength]);
  });
  await page.addInitScript(watchPaints);
  await page.goto(address, { waitUntil: 'load' });
  await page.waitForTimeout(IDLE_MS);
  const { answer, paint, shift } = await page.evaluate(() => {
    const [document] = performance.getEntriesByType('navigation') as PerformanceNavigationTiming[];
    const { seen } = window as unknown as { seen: { paint: number; shift: number } };
    return { answer: document.responseStart - document.requestStart, ...seen };
  });
  await context.close();
  return { answer, paint, shift, script: pieces.reduce((sum, [, bytes]) => sum + bytes, 0) / 1024, pieces };
}

type Storage = Awaited<ReturnType<Awaited<ReturnType<typeof openPage>>['context']['storageState']>>;

/** Leaves a promise of the time from the next key press to the second frame after it. */
function watchNextKey(): void {
  // Functions without names: the bundler's helper for names does not exist in the page.
  const redrawn = new Promise<number>((resolve) => {
    document.addEventListener(
      'keydown',
      () => {
        const started = performance.now();
        requestAnimationFrame(() => requestAnimationFrame(() => resolve(performance.now() - started)));
      },
      { once: true, capture: true },
    );
  });
  Object.assign(window, { redrawn });
}

/** Time from a key press on the first slider of the push to the second frame after it, once its figures have changed. */
async function measureRedraws(page: Page): Promise<number[]> {
  const slider = page.locator('#change').getByRole('slider').first();
  await page.locator('#change').scrollIntoViewIfNeeded();
  await slider.waitFor();
  await page.waitForTimeout(IDLE_MS);
  const times: number[] = [];
  for (let i = 0; i < REDRAWS; i++) {
    await slider.focus();
    await page.evaluate(watchNextKey);
    await page.keyboard.press(i % 2 === 0 ? 'ArrowRight' : 'ArrowLeft');
    times.push(await page.evaluate(() => (window as unknown as { redrawn: Promise<number> }).redrawn));
    await page.waitForTimeout(150);
  }
  return times;
}

async function main(): Promise<number> {
  const [app, browser] = await Promise.all([startApp(), openBrowser()]);
  try {
    const owner = await openPage(browser);
    const address = await openMarket(owner.page, app.ownerLink, app.address);
    const storage = await owner.context.storageState();
    const loads: Load[] = [];
    for (let i = 0; i < LOADS; i++) loads.push(await measureLoad(browser, address, storage));
    await owner.page.goto(address);
    const redraws = await measureRedraws(owner.page);
    printPieces(loads[LOADS - 1]);
    return printGoals({
      answer: median(loads.map((load) => load.answer)),
      paint: median(loads.map((load) => load.paint)),
      shift: median(loads.map((load) => load.shift)),
      script: median(loads.map((load) => load.script)),
      redraw: median(redraws),
    });
  } finally {
    await browser.close();
    await app.stop();
  }
}

/** Makes the owner, waits until the demonstration markets are fitted and analysed. @returns address of the brief */
async function openMarket(page: Page, ownerLink: string, address: string): Promise<string> {
  await page.goto(ownerLink);
  await page.getByLabel('Your name').fill('Mira Tarn');
  await page.getByLabel('E-mail address').fill('mira@example.org');
  await page.getByLabel('Password').fill('correct horse battery staple');
  await page.getByRole('button', { name: 'Make the account' }).click();
  await page.waitForURL(`${address}/`);
  await page.getByRole('link', { name: MARKET }).first().click();
  await page.getByText('Where is it heading?').waitFor({ timeout: FIT_LIMIT_MS });
  const until = performance.now() + FIT_LIMIT_MS;
  for (const analysis of ['backtest', 'identifiability']) {
    const read = async () => (await page.request.get(`${page.url()}/${analysis}`)).json();
    while ((await read()).state !== 'done' && performance.now() < until) await page.waitForTimeout(1000);
  }
  return page.url();
}

function printPieces({ pieces }: Load): void {
  for (const [url, bytes] of [...pieces].sort((a, b) => b[1] - a[1])) {
    console.log(`  ${(bytes / 1024).toFixed(1).padStart(7)} KB  ${new URL(url).pathname}`);
  }
}

function printGoals(measured: Record<Measure, number>): number {
  let missed = 0;
  for (const [id, { name, unit, limit, digits }] of Object.entries(GOALS) as [Measure, Goal][]) {
    const isMet = measured[id] <= limit;
    if (!isMet) missed += 1;
    const value = `${measured[id].toFixed(digits)} ${unit}`.padStart(10);
    console.log(`${name.padEnd(26)} ${value}   goal ${limit} ${unit}${isMet ? '' : '   missed'}`);
  }
  return missed > 0 ? 1 : 0;
}

process.exitCode = await main();
