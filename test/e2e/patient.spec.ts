import type { Page } from 'playwright-core';
import { expect, inject, it } from 'vitest';
import { expectAccessible, useDesk } from './browser';

const desk = useDesk();

/** Opens a day of next month on which there is a class that the patient pays: Tuesdays, Thursdays and Saturdays. */
async function openSelfPayDay(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Next month' }).click();
  const day = page.getByRole('gridcell', {
    name: /^(Tuesday|Thursday|Saturday), \w+ \d+, \d+ free/,
  });
  await day.nth(2).click();
  await page
    .getByRole('button', { name: /, you pay/ })
    .first()
    .waitFor();
}

interface Mail {
  readonly subject: string;
  readonly to: unknown;
}

async function mailTo(address: string): Promise<string[]> {
  const response = await fetch(`${inject('product').mailUrl}/api/messages`);
  const answer = (await response.json()) as { items: Mail[] } | Mail[];
  const mails = Array.isArray(answer) ? answer : answer.items;
  return mails
    .filter(({ to }) => JSON.stringify(to).includes(address))
    .map(({ subject }) => subject);
}

it('books a class, pays it on the payment service’s page, and has the confirmation and the receipt by e-mail', async () => {
  const page = await desk.signIn('patient', 'phone');
  await page.waitForURL(/\/my\/sessions/);
  await expectAccessible(page);
  await page.getByRole('link', { name: 'Book a session' }).click();
  await page.getByRole('heading', { name: 'Soonest free' }).waitFor();
  await expectAccessible(page);

  await openSelfPayDay(page);
  const book = page.getByRole('button', { name: /, you pay/ }).first();
  expect(await book.textContent()).toContain('$18.00');
  await book.click();

  await page.goto(`${inject('product').url}/my/payments`);
  await page.getByRole('heading', { name: 'To pay' }).waitFor();
  await expectAccessible(page);
  const owed = await page.getByRole('button', { name: /^Pay \$18\.00/ }).count();
  expect(owed).toBeGreaterThan(0);
  await page
    .getByRole('button', { name: /^Pay \$18\.00/ })
    .last()
    .click();
  await page.waitForURL((url) => url.origin !== inject('product').url);
  await expectAccessible(page);
  await page.getByRole('button', { name: /^Pay/ }).click();
  await page.waitForURL((url) => url.origin === inject('product').url);
  await page.getByRole('heading', { name: 'Payment received' }).waitFor({ timeout: 60_000 });
  await expectAccessible(page);

  await page.goto(`${inject('product').url}/my/payments`);
  await page.getByRole('heading', { name: 'To pay' }).waitFor();
  expect(await page.getByRole('button', { name: /^Pay \$18\.00/ }).count()).toBe(owed - 1);

  await expect
    .poll(() => mailTo('patient@harborlane.example'), { timeout: 60_000, interval: 1000 })
    .toEqual(
      expect.arrayContaining([
        expect.stringMatching(/receipt/i),
        expect.stringMatching(/booked|appointment/i),
      ]),
    );
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
