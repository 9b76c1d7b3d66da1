import { expect, inject, it } from 'vitest';
import { expectAccessible, useDesk } from './browser';
import { mailsFromNow } from './mail';

const desk = useDesk();

it('finds the soonest free classes, what there is to pay, and how far the course has come', async () => {
  const page = await desk.signIn('patient', 'phone');
  await page.waitForURL(/\/my\/sessions/);
  await expectAccessible(page);
  await page.getByRole('link', { name: 'Book a session' }).click();
  await page.getByRole('heading', { name: 'Soonest free' }).waitFor();
  await expectAccessible(page);
  await page.goto(`${inject('product').url}/my/payments`);
  await page.getByRole('heading', { name: 'To pay' }).waitFor();
  await page.goto(`${inject('product').url}/my/progress`);
  await page.getByRole('heading', { name: 'Sessions done' }).waitFor();
  await page.getByText('See the numbers').click();
  await expectAccessible(page);
  await page.context().close();
});

it('cancels a session and is told that it is cancelled', async () => {
  const page = await desk.signIn('patient', 'phone');
  const sessions = page.getByRole('button', { name: /^Cancel/ });
  await sessions.last().waitFor();
  const before = await sessions.count();
  await sessions.last().click();
  await expect.poll(() => sessions.count(), { timeout: 20_000 }).toBe(before - 1);
  await expectAccessible(page);
  await page.context().close();
});

it('books a class and pays for one, and has confirmation and receipt by e-mail', async () => {
  const page = await desk.signIn('patient', 'phone');
  const newMails = await mailsFromNow('patient@harborlane.example');
  await page.goto(`${inject('product').url}/my/sessions/book`);
  await page.getByRole('heading', { name: 'Soonest free' }).waitFor();
  await expectAccessible(page);
  await page.getByRole('button', { name: 'Next month' }).click();
  const free = page.getByRole('gridcell', { name: /day, \w+ \d+, \d+ free$/ });
  await free.first().click();
  await page
    .getByRole('button', { name: /^Book .*day/ })
    .last()
    .click();
  await page.getByText('You are booked: ').first().waitFor();
  await expect
    .poll(newMails, { timeout: 30_000 })
    .toContainEqual(expect.stringMatching(/^Your appointment on .* booked$/));

  await page.getByRole('link', { name: 'Payments' }).click();
  const owed = page.getByRole('region', { name: 'To pay' });
  const pay = owed.getByRole('button', { name: /^Pay \$18\.00/ });
  await pay.first().waitFor();
  await expectAccessible(page);
  const before = await pay.count();
  await pay.first().click();
  await page.getByRole('button', { name: 'Pay $18.00', exact: true }).click();
  await page.getByRole('heading', { name: 'Payment received' }).waitFor();
  await expectAccessible(page);
  await expect.poll(newMails, { timeout: 30_000 }).toContain('Your receipt');

  await page.getByRole('link', { name: 'Payments' }).last().click();
  await page.getByRole('heading', { name: 'Paid', exact: true }).waitFor();
  expect(await pay.count()).toBe(before - 1);
  await page.context().close();
});
