// @vitest-environment jsdom
import axe from 'axe-core';
import { describe, expect, it } from 'vitest';
import { errorPage, payPage } from './pay-page-html';

const view = {
  amountMinor: 2500,
  currency: 'usd',
  itemName: '<b>Fee</b> & "more"',
  cancelUrl: 'http://127.0.0.1:3000/back?a=1&b="2"',
  cardNumber: '4242424242424242',
  declinedNumber: '4000000000000002',
};
const pages: [string, string][] = [
  ['the form', payPage(view, [])],
  ['the form with faults', payPage(view, [{ field: 'number', message: 'Enter <i>it</i>.' }])],
  ['the page with nothing to pay', errorPage('It is <b>paid</b>.', view.cancelUrl)],
];

describe.each(pages)('%s', (_, html) => {
  it('has no fault that axe can see in the markup', async () => {
    document.documentElement.innerHTML = html;
    document.documentElement.lang = 'en';
    // Contrast needs a layout, which jsdom has not.
    const rules = { 'color-contrast': { enabled: false } };
    const { violations } = await axe.run(document, { rules });
    expect(violations.map(({ id }) => id)).toEqual([]);
  });

  it('shows text as text and keeps addresses whole', () => {
    document.documentElement.innerHTML = html;
    expect(document.querySelectorAll('main b, main i')).toHaveLength(0);
    expect(document.querySelector('a.back')?.getAttribute('href')).toBe(view.cancelUrl);
  });
});
