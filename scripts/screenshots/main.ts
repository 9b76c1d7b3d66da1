import { fileURLToPath } from 'node:url';
import { chromium, type Browser, type Page } from 'playwright-core';
import { demoAccounts, demoPassword } from '../../server/demo/accounts';
import { CHROMIUM, ensureBrowser } from '../setup/browser.mjs';
import { startProduct } from '../demonstration-product';

const folder = fileURLToPath(new URL('../../public/screenshots/', import.meta.url));

interface Picture {
  readonly name: string;
  readonly role: string;
  readonly size: { readonly width: number; readonly height: number };
  /** Leads from the role's first page to what is shown. */
  readonly open: (page: Page) => Promise<void>;
}

const desktop = { width: 1280, height: 900 };

const pictures: readonly Picture[] = [
  {
    name: 'worksheet',
    role: 'physician',
    size: desktop,
    open: async (page) => {
      await page.getByRole('link', { name: 'Open worksheet' }).first().click();
      await page.getByRole('heading', { name: 'Cautions' }).waitFor();
    },
  },
  {
    name: 'floor',
    role: 'nurse',
    size: { width: 1180, height: 820 },
    open: async (page) => {
      await page.getByLabel('Site').selectOption('Quayside');
      const tiles = page.getByRole('region', { name: 'Patients of this class' });
      await tiles.getByRole('button').first().click();
      await page.getByRole('complementary', { name: 'The open visit' }).waitFor();
    },
  },
  {
    name: 'my-range',
    role: 'patient',
    size: { width: 390, height: 844 },
    open: async (page) => {
      await page.getByRole('link', { name: 'My range' }).click();
      await page.getByRole('heading', { level: 1 }).waitFor();
    },
  },
  {
    name: 'completion',
    role: 'director',
    size: desktop,
    open: async (page) => {
      await page.getByRole('table').waitFor();
    },
  },
];

async function take(browser: Browser, url: string, picture: Picture): Promise<void> {
  const email =
    demoAccounts.find(({ email: it }) => it.startsWith(`${picture.role}@`))?.email ?? '';
  const context = await browser.newContext({ viewport: picture.size, reducedMotion: 'reduce' });
  const page = await context.newPage();
  await page.goto(`${url}/sign-in`);
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(demoPassword);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL((at) => at.pathname !== '/sign-in');
  await picture.open(page);
  await page.waitForLoadState('networkidle');
  await page.screenshot({ path: `${folder}${picture.name}.png` });
  await context.close();
  console.log(`${picture.name}.png`);
}

await ensureBrowser(console.log);
const product = await startProduct('screenshots');
const browser = await chromium.launch({
  executablePath: CHROMIUM,
  args: ['--no-sandbox', '--disable-gpu'],
});
try {
  for (const picture of pictures) await take(browser, product.url, picture);
} finally {
  await browser.close();
  await product.stop();
}
