import { expect, inject, it } from 'vitest';
import { expectAccessible, useDesk } from './browser';

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
