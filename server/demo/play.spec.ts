import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { PrescriptionRequest } from '@shared/clinical/prescribing';
import { createTestDatabase } from '../../test/database/test-database';
import type { TestDatabase } from '../../test/database/test-database';
import { openDatabase } from '../database/client';
import type { Database } from '../database/client';
import { prescribingInputs } from '../patients/prescribing-inputs-queries';
import { counterDifferences } from '../schedule/counters-service';
import { patientAccount, staff } from './accounts';
import { playDemo } from './play';
import type { PlayOutcome } from './play';
import { storyPayments } from './story-payments';

const firstStart = new Date('2026-12-01T15:10:00Z');
const nextMorning = new Date('2026-12-02T15:05:00Z');
const aMonthLater = new Date('2027-01-04T20:00:00Z');
const hash = (password: string) => Promise.resolve(`hash of ${password}`);

let server: TestDatabase;
let database: Database;
const outcomes: PlayOutcome[] = [];

const query = async <R extends object>(text: string, values: unknown[] = []): Promise<R[]> =>
  (await database.$client.query<R>(text, values)).rows;
const count = async (from: string, values: unknown[] = []): Promise<number> =>
  (await query<{ n: number }>(`SELECT count(*)::int AS n FROM ${from}`, values))[0]?.n ?? 0;
const playTo = (now: Date) => playDemo(database, now, hash);

beforeAll(async () => {
  server = await createTestDatabase();
  database = openDatabase(server.url, { statementTimeoutMs: 60_000 });
  outcomes.push(await playTo(firstStart));
});
afterAll(async () => {
  await database.$client.end();
  await server.drop();
});

/** Every table's rows in one digest. */
async function everything(): Promise<Record<string, string>> {
  const tables = await query<{ name: string }>(
    `SELECT tablename AS name FROM pg_tables WHERE schemaname = 'public'
      AND tablename NOT IN ('audit_events', 'demo_plays') ORDER BY 1`,
  );
  const digests: Record<string, string> = {};
  for (const { name } of tables) {
    const [row] = await query<{ digest: string }>(
      `SELECT count(*) || ' ' || coalesce(md5(string_agg(t::text, '|' ORDER BY t::text)), '') AS digest FROM ${name} t`,
    );
    digests[name] = row?.digest ?? '';
  }
  return digests;
}

describe('the first load', () => {
  it('fills an empty database', async () => {
    expect(outcomes).toEqual(['loaded']);
    expect(await count('patients')).toBeGreaterThan(140);
    expect(await count('vital_signs')).toBeGreaterThan(9_000);
    expect(await count(`users WHERE password_hash = 'hash of Harbor-Lane-36-steps'`)).toBe(
      staff.length + 1,
    );
  });

  it('lets the database count, and the counters equal the facts', async () => {
    expect(await counterDifferences(database)).toEqual([]);
    expect(await count('class_dates WHERE booked > 0')).toBeGreaterThan(1_000);
  });

  it('signs every record of a visit that took place', async () => {
    expect(await count(`session_records WHERE signed_at IS NULL`)).toBe(0);
    const fulfilled = await count(`appointments WHERE status = 'fulfilled'`);
    expect(await count(`session_records`)).toBe(fulfilled);
    expect(
      await count(`vital_signs v WHERE status = 'amended'
        AND NOT EXISTS (SELECT FROM vital_signs a WHERE a.amends = v.id AND a.status = 'final')`),
    ).toBe(0);
    expect(await count(`vital_signs WHERE amends IS NOT NULL`)).toBeGreaterThan(5);
  });

  it('holds classes every day from seven to seven at both sites, three weeks ahead', async () => {
    const days = await query<{ first: string; last: string; n: number }>(
      `SELECT min(d.starts_at AT TIME ZONE s.time_zone)::time::text AS first,
              max(d.ends_at AT TIME ZONE s.time_zone)::time::text AS last, count(*)::int AS n
         FROM class_dates d JOIN sites s ON s.id = d.site_id
        WHERE d.local_date BETWEEN '2025-10-01' AND '2026-12-22' GROUP BY s.id, d.local_date`,
    );
    expect(days).toHaveLength(2 * 448);
    expect(new Set(days.map(({ first, last, n }) => `${first} ${last} ${n}`))).toEqual(
      new Set(['07:00:00 19:00:00 12']),
    );
  });

  it('keeps a record from which the worksheet derives the very inputs that were signed', async () => {
    const ranges = await query<{ patientId: string; inputs: PrescriptionRequest; day: string }>(
      `SELECT p.patient_id AS "patientId", p.inputs,
              (p.created_at AT TIME ZONE s.time_zone)::date::text AS day
         FROM prescriptions p JOIN enrollments e ON e.id = p.enrollment_id JOIN sites s ON s.id = e.site_id
        WHERE p.status IN ('active', 'draft') AND e.status = 'active' AND NOT EXISTS (
          SELECT FROM medications m WHERE m.patient_id = p.patient_id AND m.recorded_at > p.created_at)
          AND NOT EXISTS (SELECT FROM prescriptions n WHERE n.patient_id = p.patient_id AND n.created_at > p.created_at)`,
    );
    expect(ranges.length).toBeGreaterThan(40);
    for (const { patientId, inputs, day } of ranges) {
      const derived = await prescribingInputs(database, patientId, day, 180);
      expect(derived?.missing).toEqual([]);
      const found = derived?.inputs;
      expect({
        ...found,
        rateActingDrugs: found?.rateActingDrugs && [...found.rateActingDrugs].sort(),
        thresholds: found?.thresholds.map(({ kind }) => kind).sort(),
        observedWork: found && { seen: found.observedWork !== null },
        intensity: inputs.intensity,
        percentOfPeak: inputs.percentOfPeak,
        choice: inputs.choice,
      }).toEqual({
        ...inputs,
        rateActingDrugs: inputs.rateActingDrugs && [...inputs.rateActingDrugs].sort(),
        thresholds: inputs.thresholds.map(({ kind }) => kind).sort(),
        // Classes later that day have added readings, but take none away.
        observedWork: { seen: inputs.observedWork !== null || found?.observedWork !== null },
      });
    }
  });

  it('balances the ledger, and what is open is what is owed', async () => {
    const [sums] = await query<{ receivable: string; open: string }>(
      `SELECT (SELECT sum(debit_minor - credit_minor) FROM ledger_entries WHERE account = 'receivable') AS receivable,
              (SELECT sum(amount_minor) FROM charges WHERE status = 'open') AS open`,
    );
    expect(sums?.receivable).toBe(sums?.open);
    expect(Number(sums?.open)).toBeGreaterThan(0);
  });
});

describe('the payments of the story', () => {
  it('are told to the stand-in of the service as they were made, so that they can be given back', async () => {
    const told = await storyPayments(database);
    expect(told.length).toBe(await count(`payments WHERE status = 'settled'`));
    expect(told.length).toBeGreaterThan(100);
    expect(
      await count(
        `payments p JOIN charges c ON c.id = p.charge_id JOIN appointments a ON a.id = c.appointment_id
          WHERE a.status = 'booked' AND a.starts_at > $1`,
        [new Date(firstStart.getTime() + 86_400_000)],
      ),
    ).toBeGreaterThan(3);
    for (const { id, amount, currency } of told) {
      expect([amount, currency]).toEqual([1800, 'usd']);
      expect(id).toMatch(/^pi_demo_[0-9a-f]{32}$/);
    }
  });
});

describe('playing on', () => {
  it('does nothing when no time has passed', async () => {
    const before = await everything();
    expect(await playTo(firstStart)).toBe('up to date');
    expect(await everything()).toEqual(before);
  });

  it('adds what a minute brings and nothing twice', async () => {
    const before = await everything();
    expect(await playTo(new Date(firstStart.getTime() + 60_000))).toBe('played on');
    expect(await everything()).toEqual(before);
  });

  it('leaves alone what people did, and plays the rest on to the next morning', async () => {
    const due = await query<{ id: string; patient: string }>(
      `SELECT id, patient_id AS patient FROM appointments
        WHERE status = 'booked' AND ends_at < $1 ORDER BY starts_at DESC, id LIMIT 3`,
      [new Date('2026-12-02T12:00:00Z')],
    );
    const [arrived, cancelled, plain] = due;
    await query(`UPDATE appointments SET status = 'arrived', version = 2 WHERE id = $1`, [
      arrived?.id,
    ]);
    await query(
      `UPDATE appointments SET status = 'cancelled', version = 2, cancelled_reason = 'Called' WHERE id = $1`,
      [cancelled?.id],
    );
    const [charge] = await query<{ id: string }>(
      `UPDATE charges SET status = 'paid', version = 2 WHERE status = 'open' AND patient_id =
        (SELECT id FROM patients WHERE email = $1) RETURNING id`,
      [patientAccount.email],
    );
    const [held] = await query<{ id: string; patient: string }>(
      `UPDATE enrollments SET status = 'on-hold', version = version + 1
        WHERE id = (SELECT enrollment_id FROM appointments WHERE status = 'booked' AND patient_id <> ALL($1)
                     ORDER BY starts_at DESC, id LIMIT 1) RETURNING id, patient_id AS patient`,
      [due.map(({ patient }) => patient)],
    );
    const heldPlaces = await count('appointments WHERE enrollment_id = $1', [held?.id]);
    const ranges = await count('prescriptions');

    expect(await playTo(nextMorning)).toBe('played on');

    const statusOf = async (id: string | undefined) =>
      (await query<{ status: string }>('SELECT status FROM appointments WHERE id = $1', [id]))[0]
        ?.status;
    expect(await statusOf(arrived?.id)).toBe('arrived');
    expect(await statusOf(cancelled?.id)).toBe('cancelled');
    expect(
      await count('session_records WHERE appointment_id = ANY($1)', [[arrived?.id, cancelled?.id]]),
    ).toBe(0);
    expect(await statusOf(plain?.id)).not.toBe('booked');
    expect(await count('payments WHERE charge_id = $1', [charge?.id])).toBe(0);
    expect(await count('appointments WHERE enrollment_id = $1', [held?.id])).toBe(heldPlaces);
    expect(await count(`enrollments WHERE id = $1 AND status = 'on-hold'`, [held?.id])).toBe(1);
    expect(await count('prescriptions')).toBeGreaterThanOrEqual(ranges);
    expect(await counterDifferences(database)).toEqual([]);
  });

  it('reads on against ranges that a person signed, and writes no others', async () => {
    const theirs = await query<{ id: string; patientId: string }>(
      `SELECT p.id, p.patient_id AS "patientId" FROM prescriptions p
         JOIN appointments a ON a.patient_id = p.patient_id AND a.status = 'booked'
        WHERE p.status = 'active' GROUP BY p.id ORDER BY count(*) DESC, p.id LIMIT 4`,
    );
    const ids = theirs.map(({ id }) => id);
    const patients = theirs.map(({ patientId }) => patientId);
    await query(
      `UPDATE prescriptions SET status = 'completed', version = version + 1, ended_at = $2 WHERE id = ANY($1)`,
      [ids, nextMorning],
    );
    const mine = await query<{ id: string }>(
      `INSERT INTO prescriptions (id, patient_id, enrollment_id, status, version, inputs, result, policy_version,
         engine_version, created_at, created_by, signed_at, signed_by, activated_at, supersedes)
       SELECT gen_random_uuid(), patient_id, enrollment_id, 'active', 2, inputs, result, policy_version,
         engine_version, $2, created_by, $2, created_by, $2, id FROM prescriptions WHERE id = ANY($1) RETURNING id`,
      [ids, nextMorning],
    );
    expect(await playTo(aMonthLater)).toBe('played on');
    const since = [patients, nextMorning];
    const ranges = await query<{ id: string }>(
      'SELECT id FROM prescriptions WHERE patient_id = ANY($1) AND created_at >= $2',
      since,
    );
    const mineOnly = mine.map(({ id }) => id).sort();
    expect(ranges.map(({ id }) => id).sort()).toEqual(mineOnly);
    const used = await query<{ id: string }>(
      `SELECT DISTINCT prescription_id AS id FROM session_records WHERE patient_id = ANY($1) AND started_at > $2`,
      since,
    );
    expect(used.length).toBeGreaterThan(0);
    expect(mineOnly).toEqual(expect.arrayContaining(used.map(({ id }) => id)));
  });

  it('keeps classes, people and counters going', async () => {
    expect(await count('appointments WHERE starts_at > $1', [aMonthLater])).toBeGreaterThan(150);
    expect(
      await count(`appointments WHERE status = 'booked' AND ends_at < $1`, [
        new Date('2027-01-04T12:00:00Z'),
      ]),
    ).toBeLessThan(25);
    expect(await count(`patients WHERE created_at > $1`, [nextMorning])).toBeGreaterThan(20);
    expect(await counterDifferences(database)).toEqual([]);
  });

  it('goes round a person who took the place or the number', async () => {
    await query(
      `UPDATE class_dates SET capacity = booked, monitored_capacity = least(monitored_capacity, booked), version = 2
        WHERE starts_at > $1`,
      [aMonthLater],
    );
    const [last] = await query<{ number: string }>(
      `SELECT max(record_number) AS number FROM patients`,
    );
    const next = (further: number) => `HL-${Number(last?.number.slice(3)) + further}`;
    await query(
      `UPDATE patients SET record_number = $1 WHERE id = (SELECT min(id::text)::uuid FROM patients)`,
      [next(1)],
    );
    expect(await playTo(new Date('2027-01-09T20:00:00Z'))).toBe('played on');
    expect(await count('patients WHERE record_number = $1', [next(1)])).toBe(1);
    expect(await count('patients WHERE record_number = $1', [next(2)])).toBe(1);
    expect(await playTo(new Date('2027-01-20T20:00:00Z'))).toBe('played on');
    expect(await counterDifferences(database)).toEqual([]);
  }, 60_000);

  it('leaves rows of another version of the story as they are', async () => {
    await query(`UPDATE demo_plays SET story = '0'`);
    expect(await playTo(new Date('2027-01-22T20:00:00Z'))).toBe('another version');
  });
});
