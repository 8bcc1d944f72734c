/** Signing up and giving files, as people do it in a browser. */
import type { Page } from 'playwright-core';
import type { RunningApp } from './running-app';

const PASSWORD = 'correct horse battery staple';

export interface Person {
  name: string;
  email: string;
}

/** Makes an account with a set-up link. */
export async function signUp(page: Page, app: RunningApp, link: string, person: Person): Promise<void> {
  await page.goto(link);
  await page.getByLabel('Your name').fill(person.name);
  await page.getByLabel('E-mail address').fill(person.email);
  await page.getByLabel('Password').fill(PASSWORD);
  await page.getByRole('button', { name: 'Make the account' }).click();
  await page.waitForURL(`${app.address}/`);
}

export type GivenFile = string | { name: string; mimeType: string; buffer: Buffer };

/** Chooses a file, by its path or made up. */
export async function giveFile(page: Page, file: GivenFile): Promise<void> {
  const chooser = page.waitForEvent('filechooser');
  await page.getByRole('button', { name: 'Choose a file' }).click();
  await (await chooser).setFiles(file);
}

/** Presses Tab until what has the focus is called so. */
export async function tabTo(page: Page, name: RegExp): Promise<void> {
  for (let presses = 0; presses < 80; presses++) {
    await page.keyboard.press('Tab');
    const focused = await page.evaluate(() => {
      const element = document.activeElement;
      if (!element || element === document.body) return '';
      const label = (element as HTMLInputElement).labels?.[0]?.textContent;
      return label ?? element.getAttribute('aria-label') ?? element.textContent ?? '';
    });
    if (name.test(focused)) return;
  }
  throw new Error(`Tab never reached ${name}`);
}
