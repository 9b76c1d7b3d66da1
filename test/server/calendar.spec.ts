import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openPaymentHouse, type Owed, type PaymentHouse } from '../builders/payment-house';

let house: PaymentHouse;

beforeAll(async () => {
  house = await openPaymentHouse();
});
afterAll(() => house.close());

async function addressFor({ payer }: Owed): Promise<string> {
  const { body } = await payer.post('/api/my/calendar-link').expect(200);
  return new URL((body as { url: string }).url).pathname;
}

const read = (path: string) => request(house.testApp.app).get(path);

/** Content lines, unfolded (RFC 5545 section 3.1). */
const linesOf = (text: string): string[] => text.replaceAll(/\r\n[ \t]/g, '').split('\r\n');

describe('a patient’s calendar', () => {
  it('is read without signing in, by an address of which only the hash is kept', async () => {
    const owed = await house.owe();
    const path = await addressFor(owed);
    const reply = await read(path)
      .expect(200)
      .expect('Content-Type', /^text\/calendar/);
    const lines = linesOf(reply.text);
    expect(lines).toContain('SUMMARY:Appointment');
    expect(lines).toContain(`UID:${owed.appointmentId}@127.0.0.1`);
    expect(lines).toContain('STATUS:CONFIRMED');
    expect(lines).toContain('SEQUENCE:0');
    const [token = ''] = path.match(/[\w-]{43}/) ?? [];
    const kept = await house.query('SELECT t::text FROM calendar_links t');
    expect(JSON.stringify(kept)).not.toContain(token);
    expect(JSON.stringify(house.testApp.logged())).not.toContain(token);
  });

  it('tells no kind of care and nobody else’s appointments', async () => {
    const [owed, other] = [await house.owe(), await house.owe()];
    const { text } = await read(await addressFor(owed));
    expect(text).not.toMatch(/cardi|heart|rehab|exercis|maintenance|class|patient|clinic/i);
    expect(text).not.toContain(other.appointmentId);
  });

  it('tells a cancelled one as a change of the same event', async () => {
    const owed = await house.owe();
    const path = await addressFor(owed);
    await house.cancel(owed).expect(200);
    const lines = linesOf((await read(path)).text);
    expect(lines).toContain(`UID:${owed.appointmentId}@127.0.0.1`);
    expect(lines).toContain('STATUS:CANCELLED');
    expect(lines).toContain('SEQUENCE:1');
  });

  it('has one address: a new one ends the former', async () => {
    const owed = await house.owe();
    const since = async () => (await owed.payer.get('/api/my/calendar-link').expect(200)).body;
    expect(await since()).toEqual({ madeAt: null });
    const former = await addressFor(owed);
    expect(await since()).toEqual({ madeAt: house.testApp.clock.now().toISOString() });
    await read(await addressFor(owed)).expect(200);
    await read(former).expect(404);
    await read(`/api/calendar/${'x'.repeat(43)}.ics`).expect(404);
  });
});
