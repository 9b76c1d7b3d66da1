import { readFile } from 'node:fs/promises';
import { expect, inject, it } from 'vitest';
import { readPdf } from '../builders/read-pdf';
import { expectAccessible, useDesk } from './browser';

const desk = useDesk();

it('tells a patient the own range, counts ten seconds, and hands it over as a page to print', async () => {
  const page = await desk.signIn('patient', 'phone');
  await page.goto(`${inject('product').url}/my/range`);
  await page.getByRole('heading', { name: 'How it should feel' }).waitFor();
  await expectAccessible(page);
  const range = await page.locator('.big').first().innerText();
  const downloading = page.waitForEvent('download');
  await page.getByRole('link', { name: /PDF/ }).click();
  const bytes = await readFile(await (await downloading).path());
  for (const { pages, text } of await readPdf(bytes)) {
    expect(pages).toBe(1);
    expect(text).toContain(range.trim());
    expect(text).toContain('stop and call 911');
  }
  const start = page.getByRole('button', { name: 'Start 10 seconds' });
  if ((await start.count()) > 0) {
    await start.click();
    await page.getByText('seconds left').waitFor();
    await page.getByLabel('How many beats?').fill('90');
    await page.getByText('Above your range. Slow down').waitFor();
    await expectAccessible(page);
  }
  await page.context().close();
});
