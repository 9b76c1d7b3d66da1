import { expect, inject, it } from 'vitest';
import { expectAccessible, useDesk } from './browser';

const desk = useDesk();

it('lets a nurse check a patient in by two identifiers, log readings, and sign the record', async () => {
  const page = await desk.signIn('nurse', 'tablet');
  await page.waitForURL(/\/floor/);
  await page.getByLabel('Site').selectOption('Quayside');
  const tile = page
    .getByRole('region', { name: 'Patients of this class' })
    .getByRole('button', { name: /not here yet Target/ })
    .first();
  await tile.waitFor();
  await expectAccessible(page);
  await tile.click();
  const visit = page.getByRole('complementary', { name: 'The open visit' });
  await visit.getByRole('button', { name: 'Check in', exact: true }).click();
  await visit.getByRole('button', { name: 'Name and date of birth match' }).click();
  await visit.getByLabel('Heart rate').fill('72');
  await expectAccessible(page);
  await visit.getByRole('button', { name: /^Save/ }).click();
  const readings = visit.getByRole('region', { name: 'Readings of this visit' });
  await readings.getByText('72').first().waitFor();

  await visit.getByText('Exercise', { exact: true }).click();
  await visit.getByLabel('Heart rate').fill('190');
  await visit
    .getByText(/^(past|over) /)
    .first()
    .waitFor();
  await expectAccessible(page);
  await visit.getByRole('button', { name: /^Save/ }).click();
  await readings.getByText('190').first().waitFor();

  await visit.getByRole('button', { name: 'Review and sign' }).click();
  await visit.getByRole('heading', { name: 'Readings to sign' }).waitFor();
  await expectAccessible(page);
  await visit.getByRole('button', { name: /^Sign/ }).click();
  await visit.getByText(/Signed \d/).waitFor();
  await expectAccessible(page);
  await page.context().close();
});

it('shows patients their own range in plain words', async () => {
  const page = await desk.signIn('patient', 'phone');
  await page.goto(`${inject('product').url}/my/range`);
  await page
    .getByText(/stay under/i)
    .first()
    .waitFor();
  await expectAccessible(page);
  expect(await page.getByRole('heading', { level: 1 }).count()).toBe(1);
  await page.context().close();
});
