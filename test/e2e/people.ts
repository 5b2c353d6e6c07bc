import { expect, type Browser, type BrowserContext, type Page } from '@playwright/test';

export const password = 'drawing table 26';
export const emails = {
  lead: 'quellen@quellmere.example',
  varo: 'varo@quellmere.example',
  oduya: 'oduya@quellmere.example',
  lindqvist: 'lindqvist@quellmere.example',
  amadi: 'amadi@quellmere.example',
  thorne: 'thorne@chambers.example',
  castellane: 'castellane@chambers.example',
} as const;
export type Who = keyof typeof emails;

export const address = (): string => {
  const url = process.env['CENTRODE_E2E_URL'];
  if (url === undefined) throw new Error('Run the browser suite with `npm test`.');
  return url;
};

export interface Look {
  width?: number;
  height?: number;
  scheme?: 'light' | 'dark';
}

/**
 * A browser of one's own, signed in through the form. Whatever the console reports as an error, and
 * every violation of the content security policy, fails the test that was running.
 */
export async function enter(browser: Browser, who: Who, look: Look = {}): Promise<Page> {
  const context = await open(browser, look);
  const page = await watched(context);
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(emails[who]);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page).not.toHaveURL(/sign-in/);
  return page;
}

export function open(browser: Browser, look: Look = {}): Promise<BrowserContext> {
  return browser.newContext({
    baseURL: address(),
    viewport: { width: look.width ?? 1280, height: look.height ?? 800 },
    colorScheme: look.scheme ?? 'light',
    acceptDownloads: true,
  });
}

export async function watched(context: BrowserContext): Promise<Page> {
  const page = await context.newPage();
  const troubles: string[] = [];
  page.on('pageerror', (error) => troubles.push(`error: ${error.message}`));
  page.on('console', (message) => {
    const text = message.text();
    // A refused request is part of some stories; the page shows it, and Chromium logs it as well.
    if (message.type() === 'error' && !text.startsWith('Failed to load resource')) {
      troubles.push(text);
    }
  });
  troublesOf.set(page, troubles);
  return page;
}

const troublesOf = new WeakMap<Page, string[]>();

/** What went wrong on a page behind the user's back since the last call. */
export function troubles(page: Page): string[] {
  return troublesOf.get(page)?.splice(0) ?? [];
}
