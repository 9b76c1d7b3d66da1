import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { prescribingInputsSchema } from '@shared/contracts/prescribing-inputs-contract';
import { buildSite, buildUser, type BuiltUser } from '../../test/builders/people';
import { buildBookable, buildClassDate } from '../../test/builders/schedule';
import { createTestApp, type TestApp } from '../../test/builders/test-app';
import { appointments, restingRates, sessionRecords, vitalSigns } from '../database/schema';
import { vitalsHistory } from '../floor/vital-signs-queries';
import { prescribingInputs } from './prescribing-inputs-queries';

let house: TestApp;
let nurse: BuiltUser;
let site: Awaited<ReturnType<typeof buildSite>>;
let patient: Awaited<ReturnType<typeof buildBookable>>;

beforeAll(async () => {
  house = await createTestApp();
  const { database } = house.context;
  site = await buildSite(database);
  nurse = await buildUser(database, { siteIds: [site.id] });
  patient = await buildBookable(database, site);
});
afterAll(() => house.close());

interface Reading {
  readonly heartRate: number;
  readonly effort: number;
  readonly amends?: string;
  readonly id?: string;
}

async function visit(localDate: string, signed: boolean, readings: readonly Reading[]) {
  const { database } = house.context;
  const date = await buildClassDate(database, site, { localDate });
  const startedAt = date.startsAt;
  const [appointment] = await database
    .insert(appointments)
    .values({
      classDateId: date.id,
      patientId: patient.id,
      enrollmentId: patient.enrollmentId,
      monitored: true,
      createdBy: nurse.id,
      status: 'checked-in',
      localDate,
      startsAt: startedAt,
      endsAt: date.endsAt,
    })
    .returning();
  const sessionRecordId = randomUUID();
  await database.insert(sessionRecords).values({
    id: sessionRecordId,
    appointmentId: appointment?.id ?? '',
    patientId: patient.id,
    startedAt,
    recordedBy: nurse.id,
  });
  for (const [minute, { heartRate, effort, amends, id = randomUUID() }] of readings.entries()) {
    await database.insert(vitalSigns).values({
      id,
      sessionRecordId,
      patientId: patient.id,
      phase: 'exercise',
      measuredAt: new Date(startedAt.getTime() + minute * 60_000),
      heartRate,
      perceivedExertion: effort,
      recordedBy: nurse.id,
      ...(amends && { amends, amendmentReason: 'Typed wrong' }),
    });
    if (amends) {
      await database.$client.query(`UPDATE vital_signs SET status = 'amended' WHERE id = $1`, [
        amends,
      ]);
    }
  }
  if (signed) {
    await database.$client.query(
      'UPDATE session_records SET signed_at = now(), signed_by = $2, exercised = true WHERE id = $1',
      [sessionRecordId, nurse.id],
    );
  }
}

it('takes observed work from signed sessions, of an amended reading the amendment', async () => {
  const wrong = randomUUID();
  await visit('2026-11-24', true, [{ heartRate: 96, effort: 12 }]);
  await visit('2026-11-26', true, [
    { heartRate: 198, effort: 12, id: wrong },
    { heartRate: 98, effort: 13, amends: wrong },
  ]);
  await visit('2026-11-27', false, [{ heartRate: 120, effort: 12 }]);
  await house.context.database.insert(restingRates).values({
    patientId: patient.id,
    seated: 62.5,
    measuredOn: '2026-12-01',
    recordedBy: nurse.id,
  });
  const derived = await prescribingInputs(house.context.database, patient.id, '2026-12-01', 180);
  expect(prescribingInputsSchema.parse(derived)).toEqual(derived);
  expect(derived?.inputs.observedWork).toEqual({
    medianHeartRate: 97,
    sessions: 2,
    perceivedExertion: { lower: 12, upper: 13 },
  });
  expect(derived?.inputs.resting.seated).toBe(62.5);
  expect(derived?.inputs.conditions.coronaryDisease).toBe(true);
  expect(derived?.missing).not.toContain('conditions.coronaryDisease');
});

it('lists sessions with their readings, the newest first, page by page', async () => {
  const page = (after: { startedAt: Date; id: string } | null) =>
    vitalsHistory(house.context.database, patient.id, { after, limit: 2 });
  const first = await page(null);
  expect(first.map(({ localDate }) => localDate)).toEqual([
    '2026-11-27',
    '2026-11-26',
    '2026-11-24',
  ]);
  expect(first[1]?.readings.map(({ heartRate, status }) => [heartRate, status])).toEqual([
    [198, 'amended'],
    [98, 'final'],
  ]);
  const last = first[1];
  const rest = await page({
    startedAt: new Date(last?.startedAt ?? 0),
    id: last?.sessionRecordId ?? '',
  });
  expect(rest.map(({ localDate }) => localDate)).toEqual(['2026-11-24']);
});

it('knows no patient of another id', async () => {
  expect(
    await prescribingInputs(house.context.database, randomUUID(), '2026-12-01', 180),
  ).toBeUndefined();
});
