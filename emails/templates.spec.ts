// @vitest-environment jsdom
import axe from 'axe-core';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bookingCancellation } from './booking-cancellation';
import { bookingConfirmation } from './booking-confirmation';
import { invitation } from './invitation';
import { passwordReset } from './password-reset';
import { receipt } from './receipt';
import { reminder } from './reminder';
import type { Letter, RenderedEmail } from './template';

const letter: Letter = {
  firstName: 'Rosa',
  sender: { name: 'Harbor Lane', phone: '555-0100' },
};
const span = { startsAt: '2026-12-02T14:00:00Z', endsAt: '2026-12-02T15:00:00Z' };
const appointment = {
  appointments: [span],
  timeZone: 'America/New_York',
  place: ['Harbor Lane North', '12 Quay Street', 'Portside, ME 04101'],
  link: 'https://harborlane.example/sessions?a=1&b=2',
} as const;
const token = {
  link: 'https://harborlane.example/password#token=abc',
  expiresAt: '2026-12-02T14:00:00Z',
  timeZone: 'America/Chicago',
};
const cancelUntil = '2026-12-01T14:00:00Z';
const unsubscribeLink = 'https://harborlane.example/unsubscribe/abc';

type Render = (letter: Letter) => Promise<RenderedEmail>;
const templates: [string, Render][] = [
  ['invitation', (to) => invitation.render({ ...to, ...token })],
  ['password reset', (to) => passwordReset.render({ ...to, ...token })],
  ['confirmation', (to) => bookingConfirmation.render({ ...to, ...appointment, cancelUntil })],
  [
    'cancellation by staff',
    (to) => bookingCancellation.render({ ...to, ...appointment, by: 'staff' }),
  ],
  [
    'cancellation by the patient',
    (to) => bookingCancellation.render({ ...to, ...appointment, by: 'patient' }),
  ],
  ['reminder', (to) => reminder.render({ ...to, ...appointment, unsubscribeLink })],
  [
    'receipt',
    (to) =>
      receipt.render({
        ...to,
        receiptNumber: 'R-2026-000123',
        amountMinor: 2500,
        currency: 'usd',
        paidAt: '2026-12-02T03:00:00Z',
        timeZone: 'America/New_York',
        link: 'https://harborlane.example/payments',
      }),
  ],
];

/** Words that would tell an onlooker about care; our own list, common practice. */
const telling =
  /cardi|heart|rehab|exercis|diagnos|medic|drug|beta|blood|pressure|vital|prescri|physio|nurse|doctor|physician|patient|surg|stent|bypass|ecg|clinic|hospital|health|therap|treatment|symptom|session|class|referr|record number|birth/i;

function show(html: string): Document {
  document.documentElement.innerHTML = html;
  document.documentElement.lang = 'en';
  return document;
}

describe.each(templates)('the %s', (_, render) => {
  it('says nothing of health in subject, text or what its HTML shows', async () => {
    const { subject, text, html } = await render(letter);
    const links = /https:\/\/harborlane\.example\/\S*/g;
    expect(subject).not.toMatch(telling);
    expect(text.replace(links, '')).not.toMatch(telling);
    expect(show(html).body.textContent).not.toMatch(telling);
    expect(document.title).toBe(subject);
  });

  it('says the same in text and in HTML', async () => {
    const { text, html } = await render(letter);
    const shown = show(html);
    const words = (shown.body.textContent ?? '').replace(/\s+/g, ' ');
    const links = Array.from(shown.querySelectorAll('a'), (link) => link.getAttribute('href'));
    for (const line of text.split('\n').map((entry) => entry.trim().replace(/:$/, ''))) {
      if (line.startsWith('https:')) expect(links).toContain(line);
      else if (line !== '--') expect(words).toContain(line);
    }
    expect(links.length).toBeGreaterThan(0);
  });

  it('has no fault that axe can see in the markup, and fetches nothing', async () => {
    const { html } = await render(letter);
    expect(html).toMatch(/<html lang="en"/);
    expect(html).not.toMatch(/<(img|link|script|iframe)\b|@import|url\(/i);
    const { violations } = await axe.run(show(html), {
      // Contrast needs a layout, which jsdom has not; landmarks are for pages, not for messages.
      rules: { 'color-contrast': { enabled: false }, region: { enabled: false } },
    });
    expect(violations.map(({ id }) => id)).toEqual([]);
  });

  it('shows whatever a name holds as text, on one line, and nothing of it in the subject', async () => {
    const { subject } = await render(letter);
    await fc.assert(
      fc.asyncProperty(fc.string({ unit: 'binary', maxLength: 60 }), async (firstName) => {
        const email = await render({ ...letter, firstName });
        expect(email.subject).toBe(subject);
        expect(email.text.split('\n')).toHaveLength((await render(letter)).text.split('\n').length);
      }),
      { numRuns: 100 },
    );
    for (const firstName of ['<img src=x onerror=alert(1)>', '{{7*7}} ${7*7} <%=7*7%> %s%d%n']) {
      const email = await render({ ...letter, firstName });
      expect(email.text).toContain(`Hello ${firstName},`);
      expect(show(email.html).body.textContent).toContain(`Hello ${firstName},`);
      expect(document.querySelector('img')).toBeNull();
    }
  });

  it('keeps emoji, right-to-left and long names, and greets without one', async () => {
    for (const firstName of ['👩🏽‍⚕️ Rosa', 'שרה', 'Łucja-Ægir']) {
      expect((await render({ ...letter, firstName })).text).toContain(`Hello ${firstName},`);
    }
    const long = await render({ ...letter, firstName: '👩🏽‍⚕️'.repeat(1000) });
    expect(long.text).toContain(`Hello ${'👩🏽‍⚕️'.repeat(119)}…,`);
    const turned = await render({ ...letter, firstName: 'Rosa\u202e\r\nBcc: x@y.example' });
    expect(turned.text).toContain('Hello Rosa Bcc: x@y.example,');
    expect((await render({ ...letter, firstName: null })).text).toContain('Hello,');
    expect((await render({ ...letter, firstName: ' \r\n' })).text).toContain('Hello,');
  });
});

describe('what single templates say', () => {
  it('tells times in the zone given, with its name, also over a change of the clocks', async () => {
    const at = (startsAt: string, endsAt: string) =>
      reminder.render({
        ...letter,
        ...appointment,
        appointments: [{ startsAt, endsAt }],
        unsubscribeLink: null,
      });
    const winter = await at('2026-12-02T14:00:00Z', '2026-12-02T15:00:00Z');
    expect(winter.subject).toBe('Your appointment on December 2');
    expect(winter.text).toContain(
      'Wednesday, December 2, 2026, 9:00 AM to 10:00 AM Eastern Standard Time',
    );
    expect(winter.text).not.toContain('Stop these reminders');
    // Clocks go back on 2026-11-01 at 02:00 in New York (IANA tz database).
    const change = await at('2026-11-01T05:30:00Z', '2026-11-01T06:30:00Z');
    expect(change.text).toContain('1:30 AM Eastern Daylight Time to 1:30 AM Eastern Standard Time');
    const late = await at('2026-12-03T03:30:00Z', '2026-12-03T05:30:00Z');
    expect(late.text).toContain('10:30 PM to Thursday, December 3, 12:30 AM');
  });

  it('tells a series in one message', async () => {
    const appointments = [
      span,
      { startsAt: '2026-12-04T14:00:00Z', endsAt: '2026-12-04T15:00:00Z' },
    ] as const;
    const props = { ...letter, ...appointment, appointments: [...appointments] as const };
    const email = await bookingConfirmation.render({ ...props, cancelUntil: null });
    expect(email.subject).toBe('Your 2 appointments are booked');
    expect(email.text).toMatch(/Wednesday, December 2.*\n.*Friday, December 4/);
    expect(email.text).not.toContain('If you cannot come');
  });

  it('writes amounts with their currency', async () => {
    const [, render] = templates.at(-1) ?? [];
    const email = await render?.(letter);
    expect(email?.text).toMatch(/Amount paid:\n {2}\$25\.00\n/);
    expect(email?.text).toContain('Tuesday, December 1, 2026');
  });

  it.each(['javascript:alert(1)', '/sessions', 'data:text/html,x', ''])(
    'refuses to link to %j',
    async (link) => {
      await expect(invitation.render({ ...letter, ...token, link })).rejects.toThrow('absolute');
    },
  );

  it('refuses a time or zone that it cannot read', async () => {
    await expect(
      invitation.render({ ...letter, ...token, timeZone: 'Atlantis/Center' }),
    ).rejects.toThrow(RangeError);
    await expect(invitation.render({ ...letter, ...token, expiresAt: 'tomorrow' })).rejects.toThrow(
      RangeError,
    );
  });
});
