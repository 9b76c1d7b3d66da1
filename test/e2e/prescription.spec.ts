import type { Page } from 'playwright-core';
import { expect, it } from 'vitest';
import { expectAccessible, useDesk } from './browser';

const desk = useDesk();

/** Opens the first range of whoever has none in force: not written yet, or a draft. */
async function openFirstRange(page: Page): Promise<string> {
  const row = page.getByRole('listitem').filter({ hasText: /New intake|Draft not signed/ });
  const link = row.getByRole('link', { name: /^(Write a range|Open): / }).first();
  const label = (await link.getAttribute('aria-label')) ?? '';
  await link.click();
  return label.slice(label.indexOf(': ') + 2);
}

/** Writes and signs a first range; whose it is, and what it says. */
async function signFirstRange(page: Page): Promise<{ name: string; range: string }> {
  const name = await openFirstRange(page);
  await page.getByRole('heading', { name, level: 1 }).waitFor();
  await page.getByRole('region', { name: 'What it comes to' }).getByText('Target range').waitFor();
  await page.getByRole('heading', { name: 'Every way to set it' }).waitFor();
  await expectAccessible(page);
  const range = (await page.locator('app-result-panel .big').first().textContent()) ?? '';
  await page.getByRole('button', { name: 'Sign range' }).click();
  const question = page.getByRole('dialog', { name: 'Sign this range?' });
  await question.getByText('It enters into force when a physician has signed too').waitFor();
  await expectAccessible(page);
  await question.getByRole('button', { name: 'Sign range' }).click();
  await page.getByText('Signed. A physician signs next').waitFor();
  return { name, range: /\d+–\d+/.exec(range)?.[0] ?? '' };
}

it('shows at once what another input would come to, and refuses what cannot be', async () => {
  const page = await desk.signIn('physiologist');
  await openFirstRange(page);
  await page.getByRole('button', { name: 'Try another Resting rate' }).click();
  const rate = page.getByRole('textbox', { name: 'Seated', exact: true });
  const before = await page.locator('app-result-panel').textContent();
  await rate.fill('58');
  await expect.poll(() => page.locator('app-result-panel').textContent()).not.toBe(before);
  await rate.fill('400');
  await page.getByText('Not computed: correct the marked fields').waitFor();
  expect(await rate.inputValue()).toBe('400');
  await expectAccessible(page);
  await page.context().close();
});

it('puts a first range into force by the physiologist’s signature and the physician’s', async () => {
  const physiologist = await desk.signIn('physiologist');
  await expectAccessible(physiologist);
  const { name, range } = await signFirstRange(physiologist);
  expect(range).not.toBe('');

  const physician = await desk.signIn('physician');
  const waiting = physician.getByRole('article', { name });
  await waiting.getByText(`${range} bpm`).first().waitFor();
  await waiting.getByRole('button', { name: `Sign the range of ${name}` }).click();
  const question = waiting.getByRole('group', { name: 'Confirm the signature' });
  await question.getByText('It enters into force at once').waitFor();
  await expectAccessible(physician);
  await question.getByRole('button', { name: 'Yes, sign' }).click();
  await physician.getByText(`${name}, ${range} bpm: in force.`).waitFor();
  await physician.context().close();

  await physiologist.reload();
  await physiologist.getByText(/In force from/).waitFor();
  await physiologist.getByRole('link', { name: 'Patient’s page' }).click();
  await physiologist.getByText(`${range}`).first().waitFor();
  await expectAccessible(physiologist);
  await physiologist.context().close();
});
