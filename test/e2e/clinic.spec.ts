import { expect, inject, it } from 'vitest';
import { expectAccessible, useDesk } from './browser';

const desk = useDesk();

it('lets a physiologist write a range and sign it, and a physician find and sign what waits', async () => {
  const page = await desk.signIn('physiologist');
  await page.waitForURL(/\/today/);
  await page.goto(`${inject('product').url}/patients`);
  await page.getByRole('table').getByRole('link').first().waitFor();
  await expectAccessible(page);
  await page.getByRole('table').getByRole('link').nth(6).click();
  await page.waitForURL(/\/patients\/[0-9a-f-]{36}/);
  const [id] = /[0-9a-f-]{36}/.exec(page.url()) ?? [''];
  await page.goto(`${inject('product').url}/patients/${id}/prescriptions/new`);
  await page.getByRole('heading', { name: 'Every way to set it' }).waitFor();
  await expectAccessible(page);
  await page.context().close();

  const physician = await desk.signIn('physician');
  await physician.getByRole('heading', { name: 'Ranges for your signature' }).waitFor();
  const sign = physician.getByRole('button', { name: /^Sign/ });
  await sign.first().waitFor();
  await expectAccessible(physician);
  await sign.first().click();
  await physician
    .getByRole('group', { name: 'Confirm the signature' })
    .getByRole('button', { name: /^Sign/ })
    .click();
  await physician
    .getByText(/in force/)
    .first()
    .waitFor();
  await physician.context().close();
});

it('lets a nurse check a patient in by two identifiers, log a reading and sign the record', async () => {
  const page = await desk.signIn('nurse', 'tablet');
  await page.waitForURL(/\/floor/);
  await page.getByLabel('Site').selectOption('Quayside');
  const tile = page
    .getByRole('region', { name: 'Patients of this class' })
    .getByRole('button', { name: /not here yet/ })
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
  await visit.getByText(/saved/i).first().waitFor();
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
