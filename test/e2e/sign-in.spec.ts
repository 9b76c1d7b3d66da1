import { expect, it } from 'vitest';
import { expectAccessible, useDesk, type Who } from './browser';

const desk = useDesk();

const firstPages: readonly [Who, RegExp][] = [
  ['physiologist', /\/today/],
  ['physician', /\/today/],
  ['nurse', /\/floor/],
  ['frontdesk', /\/today/],
  ['director', /\/reports/],
  ['patient', /\/my\/sessions/],
];

it.each(firstPages)('leads the %s to the page of the first task of the day', async (who, path) => {
  const page = await desk.signIn(who);
  await page.waitForURL(path);
  await page.getByRole('heading', { level: 1 }).waitFor();
  await expectAccessible(page);
  await page.context().close();
});

it('signs out, and the way back leads to the sign-in page', async () => {
  const page = await desk.signIn('nurse');
  await page.getByRole('button', { name: 'Account' }).click();
  await page.getByRole('button', { name: 'Sign out' }).click();
  await page.waitForURL(/\/sign-in/);
  await expectAccessible(page);
  await page.goBack();
  await page.waitForURL(/\/sign-in/);
  expect(await page.getByRole('heading', { level: 1 }).textContent()).toContain('Sign in');
});
