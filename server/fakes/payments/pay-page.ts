import express, { type Request, type Response, type Router } from 'express';
import * as z from 'zod';
import { onShelf } from './book';
import { expireDue } from './checkout-sessions';
import type { Desk } from './desk';
import type { Session } from './objects';
import { errorPage, payPage, type PayFault } from './pay-page-html';
import { paySession, type Card, type Decline } from './paying';

/** Published test numbers of the service that this stands in for. */
const testCards = {
  pays: '4242424242424242',
  declined: '4000000000000002',
  poor: '4000000000009995',
};

const declines: Record<Decline['decline_code'], Decline> = {
  generic_decline: {
    code: 'card_declined',
    decline_code: 'generic_decline',
    message: 'Your card was declined.',
  },
  insufficient_funds: {
    code: 'card_declined',
    decline_code: 'insufficient_funds',
    message: 'Your card has insufficient funds.',
  },
  test_mode_live_card: {
    code: 'card_declined',
    decline_code: 'test_mode_live_card',
    message: 'Your card was declined: this page takes test cards only.',
  },
};

const form = z.object({
  number: z.string().max(40).default(''),
  expiry: z.string().max(10).default(''),
  code: z.string().max(10).default(''),
  outcome: z.enum(['declined', 'poor']).optional(),
});
type Form = z.output<typeof form>;

/** The hosted page on which a payer enters a card: the only place that ever sees one. */
export function payPageRoutes(desk: Desk, router: Router): void {
  router.get('/c/pay/:id', (request, response) => {
    showPage(desk, request, response);
  });
  router.post('/c/pay/:id', express.urlencoded({ extended: false }), async (request, response) => {
    const session = openSession(desk, request, response);
    if (!session) return;
    const entered = form.parse(request.body ?? {});
    const faults = faultsOf(entered);
    if (faults.length > 0) {
      sendPage(response, 422, session, payPage(describe(desk, session), faults));
      return;
    }
    const decline = declineOf(entered);
    paySession(desk, session, cardOf(entered), decline);
    await desk.save();
    if (decline) {
      const fault: PayFault = { field: 'number', message: `${decline.message} Try another card.` };
      sendPage(response, 402, session, payPage(describe(desk, session), [fault]));
      return;
    }
    response.redirect(303, successAddress(session));
  });
}

function showPage(desk: Desk, request: Request, response: Response): void {
  const session = openSession(desk, request, response);
  if (session) sendPage(response, 200, session, payPage(describe(desk, session), []));
}

/** The session while it can be paid; else answers for itself and gives null. */
function openSession(desk: Desk, request: Request, response: Response): Session | null {
  expireDue(desk);
  const session = onShelf(desk.book.sessions, String(request.params['id']));
  if (!session) {
    sendPage(response, 404, null, errorPage('This payment page does not exist.', null));
    return null;
  }
  if (session.status === 'open') return session;
  if (session.status === 'complete' && request.method === 'POST') {
    response.redirect(303, successAddress(session));
    return null;
  }
  const text =
    session.status === 'complete'
      ? 'This payment has already been made. You have not been charged again.'
      : 'This payment page is no longer open. Go back and start the payment again.';
  sendPage(response, 410, session, errorPage(text, session.cancel_url));
  return null;
}

function sendPage(response: Response, status: number, session: Session | null, html: string): void {
  // Chromium applies form-action to the redirect after the form too, so it names where that leads.
  const after = session?.success_url ? new URL(session.success_url).origin : '';
  response
    .status(status)
    .set({
      'content-security-policy': `default-src 'none'; style-src 'unsafe-inline'; form-action 'self' ${after}; base-uri 'none'; frame-ancestors 'none'`,
      'cache-control': 'no-store',
      'referrer-policy': 'no-referrer',
    })
    .type('html')
    .send(html);
}

function describe(desk: Desk, session: Session) {
  return {
    amountMinor: session.amount_total ?? 0,
    currency: session.currency ?? 'usd',
    itemName: desk.book.sessionDetails[session.id]?.itemName ?? 'Payment',
    cancelUrl: session.cancel_url,
    cardNumber: testCards.pays,
    declinedNumber: testCards.declined,
  };
}

function successAddress(session: Session): string {
  return (session.success_url ?? '/').replaceAll('{CHECKOUT_SESSION_ID}', session.id);
}

function faultsOf({ number, expiry, code, outcome }: Form): PayFault[] {
  if (outcome) return [];
  const faults: PayFault[] = [];
  if (!passesCheckDigit(number.replace(/\D/g, ''))) {
    faults.push({ field: 'number', message: 'Enter the card number as it stands on the card.' });
  }
  const [, month = '', year = ''] = /^\s*(\d{1,2})\s*\/\s*(\d{2})\s*$/.exec(expiry) ?? [];
  const lastDay = new Date(Date.UTC(2000 + Number(year), Number(month), 1));
  if (month === '' || Number(month) < 1 || Number(month) > 12 || lastDay.getTime() <= Date.now()) {
    faults.push({ field: 'expiry', message: 'Enter a month and year to come, such as 12/34.' });
  }
  if (!/^\s*\d{3,4}\s*$/.test(code)) {
    faults.push({ field: 'code', message: 'Enter the three or four digits of the security code.' });
  }
  return faults;
}

/** ISO/IEC 7812-1 annex B: every second digit from the right doubled, digits summed, modulo 10. */
function passesCheckDigit(digits: string): boolean {
  if (!/^\d{12,19}$/.test(digits)) return false;
  const sum = [...digits].reverse().reduce((total, digit, index) => {
    const value = Number(digit) * (index % 2 === 1 ? 2 : 1);
    return total + (value > 9 ? value - 9 : value);
  }, 0);
  return sum % 10 === 0;
}

function numberOf({ number, outcome }: Form): string {
  return outcome ? testCards[outcome] : number.replace(/\D/g, '');
}

function declineOf(entered: Form): Decline | null {
  switch (numberOf(entered)) {
    case testCards.pays:
      return null;
    case testCards.declined:
      return declines.generic_decline;
    case testCards.poor:
      return declines.insufficient_funds;
    default:
      return declines.test_mode_live_card;
  }
}

function cardOf(entered: Form): Card {
  const digits = numberOf(entered);
  return { brand: digits.startsWith('4') ? 'visa' : 'unknown', last4: digits.slice(-4) };
}
