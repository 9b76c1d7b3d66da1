import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { PrescriptionFact } from '@shared/clinical/prescribing/effect-of-fact';
import type { Patient } from '@shared/contracts/patients-contract';
import type { Roster } from '@shared/contracts/floor-contract';
import type { Worksheet } from '@shared/contracts/prescriptions-worksheet-contract';
import { agentFor } from '../../test/builders/agent';
import { buildVisit } from '../../test/builders/floor';
import { buildPrescribers, buildOwnCourse } from '../../test/builders/prescribing';
import { buildPrescription } from '../../test/builders/prescriptions';
import { buildClassDate } from '../../test/builders/schedule';
import { createTestApp, type TestApp } from '../../test/builders/test-app';
import { hours } from '../../test/builders/test-clock';

const today = '2026-12-01';
let house: TestApp;
let people: Awaited<ReturnType<typeof buildPrescribers>>;
let patient: Awaited<ReturnType<typeof buildOwnCourse>>;

beforeAll(async () => {
  house = await createTestApp();
});
afterAll(() => house.close());
beforeEach(async () => {
  house.clock.set(`${today}T15:00:00Z`);
  people = await buildPrescribers(house);
  patient = await buildOwnCourse(house, people.site);
});

const enter = async (kind: string, values: object): Promise<string> => {
  const path = `/api/patients/${patient.patientId}/record/${kind}`;
  house.clock.advance(60_000);
  const { body } = await people.nurse.agent.post(path).send(values).expect(201);
  return (body as { id: string }).id;
};

const prescribe = async (daysAgo = 0) => {
  const at = new Date(house.clock.now().getTime() - hours(24 * daysAgo));
  const signed = { createdAt: at, signedAt: at, activatedAt: at };
  const { patientId, enrollmentId } = patient;
  await buildPrescription(house.context.database, { patientId, enrollmentId, ...signed });
};

const chart = async () => {
  const { body } = await people.nurse.agent.get(`/api/patients/${patient.patientId}`).expect(200);
  return (body as Patient).clinical;
};
const worksheet = async () => {
  const path = `/api/patients/${patient.patientId}/worksheet`;
  return ((await people.physiologist.agent.get(path).expect(200)).body as Worksheet).inForce;
};
const mine = async () =>
  (await patient.agent.get('/api/my/range').expect(200)).body as {
    range: { state: string; target: unknown; stayUnder: number; changes: { fact: string }[] };
  };

const drug = {
  name: 'metoprolol tartrate',
  rateActing: 'beta-blocker',
  dose: '50 mg',
  schedule: 'twice a day',
  startedOn: '2026-09-04',
};
const event = (kind: string) => ({ kind, description: 'Told by phone', occurredOn: today });

interface Case {
  readonly what: string;
  /** Known before the range was written. */
  readonly before?: () => Promise<string>;
  /** When the range was written. */
  readonly daysAgo?: number;
  readonly save: (before: string) => Promise<unknown>;
  readonly flags: readonly PrescriptionFact[];
  readonly effect: 'withdrawn' | 'review-due' | 'nothing';
}

const changed = (dose: string) => (replaces: string) =>
  enter('medications', { ...drug, dose, startedOn: today, replaces });
const withDrug = () => enter('medications', drug);

const cases: Case[] = [
  {
    what: 'a rate-acting drug started',
    save: withDrug,
    flags: ['rate-acting-drug-started'],
    effect: 'withdrawn',
  },
  {
    what: 'a rate-acting drug raised',
    before: withDrug,
    save: changed('100 mg'),
    flags: ['rate-acting-drug-raised'],
    effect: 'withdrawn',
  },
  {
    what: 'a rate-acting drug lowered',
    before: withDrug,
    save: changed('25 mg'),
    flags: ['rate-acting-drug-lowered'],
    effect: 'withdrawn',
  },
  {
    what: 'a dose in words',
    before: withDrug,
    save: changed('half a tablet'),
    flags: ['rate-acting-drug-changed'],
    effect: 'withdrawn',
  },
  {
    what: 'a rate-acting drug stopped',
    before: withDrug,
    save: (id) =>
      people.nurse.agent
        .post(`/api/patients/${patient.patientId}/record/medications/${id}/stop`)
        .send({ stoppedOn: today })
        .expect(200),
    flags: ['rate-acting-drug-stopped'],
    effect: 'withdrawn',
  },
  {
    what: 'a rate-acting drug entered in error',
    before: withDrug,
    save: (id) =>
      people.nurse.agent
        .post(`/api/patients/${patient.patientId}/record/medications/${id}/entered-in-error`)
        .expect(200),
    flags: ['rate-acting-drug-changed'],
    effect: 'withdrawn',
  },
  {
    what: 'another rhythm',
    save: () => enter('rhythms', { rhythm: 'atrial-fibrillation', observedOn: today }),
    flags: ['rhythm-changed'],
    effect: 'withdrawn',
  },
  {
    what: 'a device reprogrammed',
    save: () =>
      enter('devices', {
        icdStatus: 'present',
        icdZones: [{ rate: 170, kind: 'shock' }],
        pacemaker: false,
        upperTrackingRate: null,
        checkedOn: today,
      }),
    flags: ['device-changed'],
    effect: 'withdrawn',
  },
  {
    what: 'a new threshold',
    save: () =>
      enter('thresholds', {
        kind: 'angina',
        heartRate: 112,
        clearMets: null,
        exerciseTestId: null,
        supersedes: null,
        foundOn: today,
        note: null,
      }),
    flags: ['threshold-added'],
    effect: 'withdrawn',
  },
  {
    what: 'a fainting',
    save: () => enter('clinical-events', event('syncope')),
    flags: ['syncope'],
    effect: 'withdrawn',
  },
  {
    what: 'a procedure',
    save: () => enter('clinical-events', event('stent')),
    flags: ['procedure'],
    effect: 'withdrawn',
  },
  {
    what: 'a heart attack',
    save: () => enter('clinical-events', event('heart-attack')),
    flags: ['cardiac-event'],
    effect: 'withdrawn',
  },
  {
    what: 'a new exercise test',
    save: () =>
      enter('exercise-tests', {
        mode: 'treadmill',
        protocol: 'Bruce',
        performedOn: today,
        endedBy: 'fatigue',
        restingHeartRate: null,
        peakHeartRate: 138,
        peakVo2: null,
        peakMets: 7,
        vo2Source: 'estimated',
        note: null,
      }),
    flags: ['exercise-test-repeated'],
    effect: 'review-due',
  },
  {
    what: 'a new walk',
    save: () => enter('walk-tests', { distanceMeters: 410, performedOn: today }),
    flags: ['walk-test-repeated'],
    effect: 'review-due',
  },
  {
    what: 'a resting rate far off',
    save: () => enter('resting-rates', { seated: 74, standing: null, measuredOn: today }),
    flags: ['resting-rate-drifted'],
    effect: 'review-due',
  },
  {
    what: 'days of review that passed',
    daysAgo: 31,
    save: () => Promise.resolve(),
    flags: ['review-days-passed'],
    effect: 'review-due',
  },
  {
    what: 'a resting rate near by',
    save: () => enter('resting-rates', { seated: 70, standing: null, measuredOn: today }),
    flags: [],
    effect: 'nothing',
  },
  {
    what: 'the same rhythm',
    save: () => enter('rhythms', { rhythm: 'sinus', observedOn: today }),
    flags: [],
    effect: 'nothing',
  },
  {
    what: 'a drug that does not act on the rate',
    save: () => enter('medications', { ...drug, name: 'atorvastatin', rateActing: null }),
    flags: [],
    effect: 'nothing',
  },
  {
    what: 'a weight',
    save: () => enter('body-measurements', { heightCm: null, weightKg: 82, measuredOn: today }),
    flags: [],
    effect: 'nothing',
  },
];

describe('a fact that is saved', () => {
  it.each(cases)('$what: $effect', async ({ before, daysAgo, save, flags, effect }) => {
    const id = (await before?.()) ?? '';
    house.clock.advance(60_000);
    await prescribe(daysAgo);
    house.clock.advance(60_000);
    await save(id);
    const head = await chart();
    expect(head?.rangeFlags.map(({ fact }) => fact)).toEqual(flags);
    expect(head?.flags.includes('range-withdrawn')).toBe(effect === 'withdrawn');
    expect(head?.flags.includes('review-due')).toBe(effect === 'review-due');
    expect(head?.range?.leadBy).toBe(effect === 'withdrawn' ? 'perceived-exertion' : 'heart-rate');
    expect(head?.range?.ceiling).toBe(108);
    const sheet = await worksheet();
    expect(sheet?.flags).toEqual(head?.rangeFlags);
    const told = await mine();
    expect(told.range.state).toBe(effect === 'withdrawn' ? 'review' : 'in-force');
    expect(told.range.stayUnder).toBe(108);
    expect(told.range.changes.map(({ fact }) => fact)).toEqual(effect === 'withdrawn' ? flags : []);
    const nurseSaid = flags[0] === 'review-days-passed' ? null : people.nurse.displayName;
    if (flags.length > 0) expect(head?.rangeFlags[0]?.by).toBe(nurseSaid);
  });

  it('is one cause, one flag, and a new range clears it', async () => {
    const id = await withDrug();
    house.clock.advance(60_000);
    await prescribe();
    await changed('100 mg')(id);
    await enter('rhythms', { rhythm: 'atrial-fibrillation', observedOn: today });
    expect((await chart())?.rangeFlags).toMatchObject([
      { fact: 'rate-acting-drug-raised', detail: 'metoprolol tartrate 100 mg, was 50 mg' },
      { fact: 'rhythm-changed', detail: 'atrial-fibrillation' },
    ]);
    await house.context.database.$client.query(
      `UPDATE prescriptions SET status = 'completed', ended_at = $2 WHERE patient_id = $1`,
      [patient.patientId, house.clock.now()],
    );
    house.clock.advance(60_000);
    await prescribe();
    expect((await chart())?.rangeFlags).toEqual([]);
  });
});

describe('a dose missed today', () => {
  it('changes today alone: effort leads, the ceiling stays, nothing is to review', async () => {
    const { database } = house.context;
    const classDate = await buildClassDate(database, people.site, { localDate: today });
    const visit = await buildVisit(database, people.site, classDate);
    const { appointment } = visit;
    patient = { ...patient, patientId: visit.patient.id };
    const tell = (missed: boolean) =>
      people.nurse.agent.put(`/api/appointments/${appointment.id}/missed-dose`).send({ missed });
    const onFloor = async () => {
      const path = `/api/class-dates/${classDate.id}/roster`;
      return ((await people.nurse.agent.get(path).expect(200)).body as Roster).items[0];
    };
    await tell(true).expect(204);
    expect(await onFloor()).toMatchObject({
      leadBy: 'perceived-exertion',
      target: null,
      ceiling: { value: 108 },
      withdrawn: ['dose-missed'],
      rangeFlags: [
        { fact: 'dose-missed-today', effect: 'effort-today', by: people.nurse.displayName },
      ],
    });
    const head = await chart();
    expect(head?.flags).toEqual([]);
    expect(head?.range).toMatchObject({ leadBy: 'perceived-exertion', ceiling: 108 });
    await tell(false).expect(204);
    expect(await onFloor()).toMatchObject({ leadBy: 'heart-rate', rangeFlags: [] });
    await tell(true).expect(204);
    house.clock.set('2026-12-02T15:00:00Z');
    people = { ...people, nurse: { ...people.nurse, agent: await agentFor(house, people.nurse) } };
    expect(await chart()).toMatchObject({ range: { leadBy: 'heart-rate' }, rangeFlags: [] });
  });
});
