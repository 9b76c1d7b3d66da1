import AxeBuilder from '@axe-core/playwright';
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core';
import { afterAll, beforeAll, expect, inject } from 'vitest';
import { demoPassword } from '../../server/demo/accounts';
import { CHROMIUM } from '../../scripts/setup/browser.mjs';

const flags = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export const sizes = {
  phone: { width: 390, height: 844 },
  tablet: { width: 1180, height: 820 },
  desktop: { width: 1280, height: 900 },
} as const;

export type Who =
  'physiologist' | 'nurse' | 'physician' | 'frontdesk' | 'director' | 'admin' | 'patient';

export interface Desk {
  /** Signs a demonstration account in, in a browser of its own. */
  readonly signIn: (who: Who, size?: keyof typeof sizes) => Promise<Page>;
}

function watch(page: Page, problems: string[]): void {
  page.on('pageerror', (error) => problems.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error') problems.push(message.text());
  });
}

async function signInTo(context: BrowserContext, who: Who, problems: string[]): Promise<Page> {
  const page = await context.newPage();
  watch(page, problems);
  await page.goto(`${inject('product').url}/sign-in`);
  await page.getByLabel('E-mail').fill(`${who}@harborlane.example`);
  await page.getByLabel('Password', { exact: true }).fill(demoPassword);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL((url) => url.pathname !== '/sign-in');
  return page;
}

/** Browsers of one spec file. After it, no page may have thrown or logged an error. */
export function useDesk(): Desk {
  let browser: Browser;
  const problems: string[] = [];
  beforeAll(async () => {
    browser = await chromium.launch({ executablePath: CHROMIUM, args: flags });
  });
  afterAll(async () => {
    await browser.close();
    expect(problems).toEqual([]);
  });
  return {
    signIn: async (who, size = 'desktop') => {
      const context = await browser.newContext({ viewport: sizes[size], reducedMotion: 'reduce' });
      context.setDefaultTimeout(20_000);
      return signInTo(context, who, problems);
    },
  };
}

const standards = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];

/** Holds the page as it stands against WCAG 2.2 AA, in the light and in the dark scheme. */
export async function expectAccessible(page: Page): Promise<void> {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    const { violations } = await new AxeBuilder({ page }).withTags(standards).analyze();
    const found = violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html ?? ''}`);
    expect(found, `${page.url()}, ${colorScheme}`).toEqual([]);
  }
  await page.emulateMedia({ colorScheme: 'light' });
}
