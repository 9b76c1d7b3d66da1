import { expect, it } from 'vitest';
import { expectAccessible, useDesk } from './browser';

const desk = useDesk();

it('reads completion, and finds as many people behind a count as it says', async () => {
  const page = await desk.signIn('director');
  await page.getByRole('heading', { name: 'Completion', level: 1 }).waitFor();
  const table = page.getByRole('table');
  await table.waitFor();
  await expectAccessible(page);

  await page.getByRole('combobox', { name: 'Group by' }).click();
  await page.getByRole('option', { name: 'Site' }).click();
  await page.getByRole('heading', { name: 'By site' }).waitFor();
  const row = table.getByRole('row').nth(1);
  const completed = row.getByRole('link').nth(1);
  const count = Number(await completed.textContent());
  await completed.click();
  await page.getByRole('heading', { name: 'Completed', level: 1 }).waitFor();
  await page.getByText(new RegExp(`^${count} courses?$`)).waitFor();
  await expectAccessible(page);
  while (await page.getByRole('button', { name: 'Show more' }).isVisible()) {
    await page.getByRole('button', { name: 'Show more' }).click();
    await page.waitForLoadState('networkidle');
  }
  expect(await table.getByRole('row').count()).toBe(count + 1);

  await page.getByRole('link', { name: 'Back to the report' }).click();
  await page.getByRole('heading', { name: 'By site' }).waitFor();
  await page.context().close();
});
