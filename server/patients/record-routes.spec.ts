import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Role } from '@shared/contracts/accounts-contract';
import type { PatientRecord, RecordKind } from '@shared/contracts/record-contract';
import { agentFor, type Agent } from '../../test/builders/agent';
import { buildPatient, buildSite, buildUser, type BuiltUser } from '../../test/builders/people';
import { createTestApp, type TestApp } from '../../test/builders/test-app';
import { hours, minutes } from '../../test/builders/test-clock';

const today = '2026-12-01';
let house: TestApp;
let siteId: string;
let patientId: string;
let user: BuiltUser;
let nurse: Agent;

const signIn = async (roles: readonly Role[]) => {
  const someone = await buildUser(house.context.database, { roles, siteIds: [siteId] });
  return agentFor(house, someone);
};

beforeAll(async () => {
  house = await createTestApp();
});
afterAll(() => house.close());

beforeEach(async () => {
  house.clock.set(`${today}T15:00:00Z`);
  siteId = (await buildSite(house.context.database)).id;
  patientId = (await buildPatient(house.context.database, { siteId, birthDate: '1961-05-14' })).id;
  user = await buildUser(house.context.database, { roles: ['nurse'], siteIds: [siteId] });
  nurse = await agentFor(house, user);
});

const pathOf = (kind: RecordKind, rest = '') => `/api/patients/${patientId}/record/${kind}${rest}`;

const enter = async (kind: RecordKind, values: object, agent = nurse) => {
  const reply = await agent.post(pathOf(kind)).send(values).expect(201);
  return reply.body as PatientRecord['thresholds'][number];
};

const record = async () => {
  const reply = await nurse.get(`/api/patients/${patientId}/record`).expect(200);
  return reply.body as PatientRecord;
};

/** One valid entry of every kind. */
const valid: Record<RecordKind, object> = {
  diagnoses: { kind: 'stent', description: 'Left anterior descending', onsetOn: '2026-09-03' },
  conditions: { kind: 'heartFailure', value: 'preserved' },
  'clinical-events': { kind: 'syncope', description: '', occurredOn: '2026-11-20' },
  'body-measurements': { heightCm: 178, weightKg: 83.9, measuredOn: today },
  rhythms: { rhythm: 'sinus', observedOn: today },
  'resting-rates': { seated: 62, standing: 70, measuredOn: today },
  medications: {
    name: 'metoprolol tartrate',
    rateActing: 'beta-blocker',
    dose: '50 mg',
    schedule: 'twice a day',
    startedOn: '2026-09-04',
  },
  'medication-reviews': {},
  devices: {
    icdStatus: 'present',
    icdZones: [{ rate: 187.5, kind: 'shock' }],
    pacemaker: true,
    upperTrackingRate: 130,
    checkedOn: today,
  },
  'exercise-tests': {
    mode: 'treadmill',
    protocol: 'Bruce',
    performedOn: '2026-11-18',
    endedBy: 'fatigue',
    restingHeartRate: 66,
    peakHeartRate: 134,
    protocolKind: 'bruce',
    peakSystolic: 172,
    peakDiastolic: 84,
    peakExertion: 17,
    exerciseMinutes: 7.5,
    stages: [
      {
        label: '1',
        minutes: 3,
        speedMph: 1.7,
        gradePercent: 10,
        powerWatts: null,
        heartRate: 98,
        systolic: 138,
        diastolic: 80,
        exertion: 11,
      },
    ],
    gait: 'walk',
    handrail: false,
    effort: 'maximal',
    recoveryOne: 118,
    recoveryPosture: 'upright',
    signs: [{ kind: 'st-change', heartRate: 118, clearMets: 4.5, detail: '1.5 mm in V5' }],
    drugsTaken: [{ name: 'Metoprolol tartrate', hoursSinceDose: 3 }],
    peakVo2: 22.4,
    vo2Source: 'measured',
    note: 'First line\nsecond line',
  },
  thresholds: { kind: 'ischemia', heartRate: 118, clearMets: 4.5, foundOn: '2026-11-18' },
  'walk-tests': { distanceMeters: 412, performedOn: today },
  'risk-stratifications': {
    level: 'moderate',
    overrideReason: 'Seen by the cardiologist today, no other finding',
    assessedOn: today,
  },
  'resting-ecgs': { hindrances: ['left-bundle-branch-block'], observedOn: today },
  'chair-stands': { seconds: 12.4, ending: 'standing-fifth-time', performedOn: today },
  restrictions: {
    kind: 'pressure',
    limit: 150,
    diastolic: 90,
    detail: 'Dissection of May',
    orderedBy: 'Dr. Amara Okafor',
    orderedOn: '2026-11-20',
    until: '2027-05-01',
  },
  questionnaires: {
    instrument: 'phq-9',
    answers: [1, 0, 2, 1, 0, 0, 1, 0, 0],
    answeredOn: today,
  },
};

describe('an entry', () => {
  it.each(Object.entries(valid))('of %s is kept with its author and date', async (kind, values) => {
    const entered = await enter(kind as RecordKind, values);
    const [found] = (await record())[kind as RecordKind];
    expect(found).toEqual({ ...entered, recordedAt: expect.any(String) });
    expect(found?.values).toMatchObject(values);
    expect(found).toMatchObject({
      recordedBy: { id: user.id, displayName: user.displayName },
      enteredInErrorAt: null,
    });
    expect(new Date(found?.recordedAt ?? 0)).toEqual(house.clock.now());
  });

  it.each<[RecordKind, object, string, string]>([
    ['conditions', { value: 'yes' }, 'value', 'Choose one of the answers to this condition'],
    ['conditions', { kind: 'asthma' }, 'kind', 'Choose a condition'],
    ['diagnoses', { description: ' ' }, 'description', 'Describe the diagnosis'],
    ['body-measurements', { weightKg: 24.9 }, 'weightKg', 'Enter 25 to 350 kg'],
    ['body-measurements', { heightCm: 251 }, 'heightCm', 'Enter 100 to 250 cm'],
    [
      'body-measurements',
      { heightCm: null, weightKg: null },
      'weightKg',
      'Enter a weight or a height',
    ],
    ['resting-rates', { seated: 29 }, 'seated', 'Enter 30 to 130 bpm'],
    ['resting-rates', { seated: '62' }, 'seated', 'Enter 30 to 130 bpm'],
    ['resting-rates', { standing: 161 }, 'standing', 'Enter 30 to 160 bpm'],
    ['resting-rates', { measuredOn: '2026-12-02' }, 'measuredOn', 'Enter a date up to today'],
    ['resting-rates', { measuredOn: '1961-05-13' }, 'measuredOn', 'Enter a date after birth'],
    ['resting-rates', { measuredOn: '12/01/2026' }, 'measuredOn', 'Enter a date'],
    ['medications', { stoppedOn: '2026-09-03' }, 'stoppedOn', 'It cannot stop before it started'],
    ['medications', { stoppedOn: '2026-12-02' }, 'stoppedOn', 'Enter a date up to today'],
    ['medications', { rateActing: 'statin' }, 'rateActing', expect.any(String)],
    [
      'devices',
      { icdStatus: 'none' },
      'icdZones',
      'Only a defibrillator that is present has zones',
    ],
    [
      'devices',
      { icdZones: [{ rate: 79, kind: 'shock' }] },
      'icdZones.0.rate',
      'Enter 80 to 300 bpm',
    ],
    [
      'devices',
      { pacemaker: false },
      'upperTrackingRate',
      'Only a device that paces has a tracking rate',
    ],
    ['exercise-tests', { peakHeartRate: 59, signs: [] }, 'peakHeartRate', 'Enter 60 to 230 bpm'],
    [
      'exercise-tests',
      { peakHeartRate: 66, signs: [] },
      'peakHeartRate',
      'The peak is above the resting rate',
    ],
    ['exercise-tests', { peakVo2: 81 }, 'peakVo2', 'Enter 4 to 80 mL/kg/min'],
    [
      'exercise-tests',
      { vo2Source: null },
      'vo2Source',
      'Say whether it was measured or estimated',
    ],
    ['thresholds', { heartRate: 39 }, 'heartRate', 'Enter 40 to 230 bpm'],
    ['thresholds', { clearMets: 0.9 }, 'clearMets', 'Enter 1 to 25 METs'],
    [
      'thresholds',
      { exerciseTestId: randomUUID() },
      'exerciseTestId',
      'Choose a test of this patient',
    ],
    ['walk-tests', { distanceMeters: 9 }, 'distanceMeters', 'Enter 10 to 1200 m'],
    ['risk-stratifications', { level: 'severe' }, 'level', 'Choose the risk'],
    ['rhythms', { steady: true }, 'steady', expect.any(String)],
  ])('%s with %j: %s, %s', async (kind, wrong, path, message) => {
    const reply = await nurse
      .post(pathOf(kind))
      .send({ ...valid[kind], ...wrong })
      .expect(422);
    expect(reply.body.errors).toMatchObject([{ path, message }]);
    expect((await record())[kind]).toEqual([]);
  });

  it('sent again under its id is entered once; another under it is refused', async () => {
    const id = randomUUID();
    const body = { ...valid['body-measurements'], id };
    await nurse.post(pathOf('body-measurements')).send(body).expect(201);
    await nurse.post(pathOf('body-measurements')).send(body).expect(201);
    const other = await nurse
      .post(pathOf('body-measurements'))
      .send({ ...body, weightKg: 84 })
      .expect(409);
    expect(other.body.code).toBe('already-recorded');
    expect((await record())['body-measurements']).toHaveLength(1);
  });

  it.each<[Role, number]>([
    ['front-desk', 403],
    ['director', 403],
    ['administrator', 403],
    ['patient', 403],
    ['exercise-physiologist', 201],
    ['physician', 201],
  ])('by a %s: %i', async (role, status) => {
    const agent = await signIn([role]);
    await agent.post(pathOf('rhythms')).send(valid.rhythms).expect(status);
  });

  it('is recorded in the audit without its values', async () => {
    const { id } = await enter('resting-rates', valid['resting-rates']);
    const { rows } = await house.context.database.$client.query(
      `SELECT action, object_type, patient_id, details FROM audit_events WHERE object_id = $1`,
      [id],
    );
    expect(rows).toEqual([
      {
        action: 'record.entered',
        object_type: 'resting-rates',
        patient_id: patientId,
        details: null,
      },
    ]);
  });
});

describe('several entries at once', () => {
  const batch = (entries: object[]) =>
    nurse.post(`/api/patients/${patientId}/record`).send({ entries });

  it('may name each other', async () => {
    const id = randomUUID();
    await batch([
      { kind: 'exercise-tests', id, values: valid['exercise-tests'] },
      { kind: 'thresholds', values: { ...valid.thresholds, exerciseTestId: id } },
    ]).expect(201);
    expect((await record()).thresholds[0]?.values.exerciseTestId).toBe(id);
  });

  it('are all entered or none, with the fault at its place', async () => {
    const reply = await batch([
      { kind: 'rhythms', values: valid.rhythms },
      { kind: 'resting-rates', values: { seated: 62, measuredOn: '2026-12-02' } },
    ]).expect(422);
    expect(reply.body.errors).toMatchObject([{ path: 'entries.1.values.measuredOn' }]);
    expect((await record()).rhythms).toEqual([]);
  });
});

describe('entered in error', () => {
  const mark = (kind: RecordKind, id: string, agent = nurse) =>
    agent.post(pathOf(kind, `/${id}/entered-in-error`));

  it('keeps the entry and says who took it back, once', async () => {
    const { id } = await enter('resting-rates', valid['resting-rates']);
    const other = await signIn(['physician']);
    const marked = await mark('resting-rates', id, other).expect(200);
    house.clock.advance(minutes(10));
    const again = await mark('resting-rates', id).expect(200);
    expect(again.body).toEqual(marked.body);
    expect((await record())['resting-rates']).toMatchObject([
      { id, values: valid['resting-rates'], enteredInErrorBy: { id: expect.any(String) } },
    ]);
  });

  it('finds no entry of another kind or patient', async () => {
    const { id } = await enter('rhythms', valid.rhythms);
    await mark('resting-rates', id).expect(404);
    const elsewhere = await buildPatient(house.context.database, { siteId });
    await nurse
      .post(`/api/patients/${elsewhere.id}/record/rhythms/${id}/entered-in-error`)
      .expect(404);
  });

  it('of a threshold is for a physician, or for who entered it within a day', async () => {
    const { id } = await enter('thresholds', valid.thresholds);
    await mark('thresholds', id, await signIn(['exercise-physiologist'])).expect(403);
    house.clock.advance(hours(25));
    nurse = await agentFor(house, user);
    await mark('thresholds', id).expect(403);
    await mark('thresholds', id, await signIn(['physician'])).expect(200);
  });
});

describe('thresholds', () => {
  const active = async () => {
    const { thresholds } = await record();
    return thresholds
      .filter(({ ended, enteredInErrorAt }) => ended === null && enteredInErrorAt === null)
      .map(({ values }) => values.heartRate);
  };

  it('end by a newer finding of the same kind, which taken back restores the former', async () => {
    const first = await enter('thresholds', valid.thresholds);
    const next = { ...valid.thresholds, heartRate: 112, foundOn: today, supersedes: first.id };
    const second = await enter('thresholds', next);
    expect(await active()).toEqual([112]);
    await nurse.post(pathOf('thresholds')).send(next).expect(409);
    await nurse.post(pathOf('thresholds', `/${second.id}/entered-in-error`)).expect(200);
    expect(await active()).toEqual([118]);
  });

  it.each([
    [{ kind: 'angina' }, 'kind'],
    [{ foundOn: '2026-11-17' }, 'foundOn'],
  ])('are not superseded by %j', async (other, path) => {
    const first = await enter('thresholds', valid.thresholds);
    const reply = await nurse
      .post(pathOf('thresholds'))
      .send({ ...valid.thresholds, ...other, supersedes: first.id })
      .expect(422);
    expect(reply.body.errors).toMatchObject([{ path }]);
    expect(await active()).toEqual([118]);
  });

  it('are retired by a physician alone, with a reason, once', async () => {
    const { id } = await enter('thresholds', valid.thresholds);
    const path = pathOf('thresholds', `/${id}/retire`);
    await nurse.post(path).send({ reason: 'Revascularized' }).expect(403);
    const physician = await signIn(['physician']);
    await physician.post(path).send({ reason: '' }).expect(422);
    const retired = await physician.post(path).send({ reason: 'Revascularized' }).expect(200);
    expect(retired.body.ended).toMatchObject({ status: 'retired', reason: 'Revascularized' });
    expect(await active()).toEqual([]);
    await physician.post(path).send({ reason: 'Again' }).expect(409);
  });
});

describe('medications', () => {
  const listed = async () =>
    (await record()).medications
      .filter(({ enteredInErrorAt }) => enteredInErrorAt === null)
      .map(({ values }) => [values.dose, values.stoppedOn]);

  it('change by a stop and a start, which taken back lets the former go on', async () => {
    const first = await enter('medications', valid.medications);
    const next = { ...valid.medications, dose: '100 mg', startedOn: today, replaces: first.id };
    const second = await enter('medications', next);
    expect(await listed()).toEqual([
      ['100 mg', null],
      ['50 mg', today],
    ]);
    await nurse.post(pathOf('medications')).send(next).expect(409);
    await nurse.post(pathOf('medications', `/${second.id}/entered-in-error`)).expect(200);
    expect(await listed()).toEqual([['50 mg', null]]);
  });

  it('stop on a date, and a stop is taken back', async () => {
    const { id } = await enter('medications', valid.medications);
    const stop = (stoppedOn: string | null) =>
      nurse.post(pathOf('medications', `/${id}/stop`)).send({ stoppedOn });
    await stop('2026-09-03').expect(422);
    await stop('2026-12-02').expect(422);
    await stop(today).expect(200);
    await stop(today).expect(409);
    expect(await listed()).toEqual([['50 mg', today]]);
    await stop(null).expect(200);
    expect(await listed()).toEqual([['50 mg', null]]);
  });
});
