/** Debian's Chromium through playwright-core, with axe and with every console error and failed request kept. */
import { existsSync, mkdirSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core';

const CHROMIUM = ['/usr/bin/chromium', '/usr/bin/chromium-browser', process.env.CHROMIUM_PATH ?? ''];
const FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];
/** How long a page may take to show what is waited for. */
const PATIENCE_MS = 20_000;
const AXE_FILE = createRequire(import.meta.url).resolve('axe-core/axe.min.js');
export const SCREENSHOT_FOLDER = fileURLToPath(new URL('.shots/', import.meta.url));

/** Path of a Chromium, or null where none is installed. */
export function findChromium(): string | null {
  return CHROMIUM.find((path) => path !== '' && existsSync(path)) ?? null;
}

export function openBrowser(): Promise<Browser> {
  const executablePath = findChromium();
  if (executablePath === null) throw new Error('No Chromium found: install it or set CHROMIUM_PATH.');
  return chromium.launch({ executablePath, args: FLAGS });
}

export interface WatchedPage {
  context: BrowserContext;
  page: Page;
  /** Console errors and uncaught exceptions since the page was opened, expected ones left out. */
  errors: string[];
}

/** A page in a context of its own: signed out, empty storage. */
export async function openPage(
  browser: Browser,
  options: Parameters<Browser['newContext']>[0] = {},
): Promise<WatchedPage> {
  const context = await browser.newContext({
    viewport: { width: 1440, height: 1000 },
    locale: 'en-GB',
    ...options,
  });
  const page = await context.newPage();
  page.setDefaultTimeout(PATIENCE_MS);
  const errors: string[] = [];
  page.on('pageerror', (error) => errors.push(`uncaught: ${error.message}`));
  page.on('console', (message) => {
    if (message.type() === 'error') errors.push(`${message.text()} (${message.location().url})`);
  });
  return { context, page, errors };
}

interface AxeViolation {
  id: string;
  impact: string | null;
  help: string;
  nodes: { html: string; failureSummary?: string }[];
}

/** All axe violations of the page as readable lines; empty when there are none. */
export async function findViolations(page: Page): Promise<string[]> {
  // Through the debugger's world, so that the page's content security policy stays as it is.
  await page.evaluate(readFileSync(AXE_FILE, 'utf8'));
  const violations = await page.evaluate(async () => {
    const axe = (window as unknown as { axe: { run(): Promise<{ violations: AxeViolation[] }> } }).axe;
    return (await axe.run()).violations;
  });
  return violations.flatMap(({ id, impact, help, nodes }) =>
    nodes.map((node) => `${impact} ${id}: ${help}: ${node.html.slice(0, 160)}`),
  );
}

export async function shoot(page: Page, name: string): Promise<void> {
  mkdirSync(SCREENSHOT_FOLDER, { recursive: true });
  await page.screenshot({ path: join(SCREENSHOT_FOLDER, `${name}.png`), fullPage: true });
}
