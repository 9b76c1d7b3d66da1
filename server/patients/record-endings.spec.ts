import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { PatientRecord, RecordKind } from '@shared/contracts/record-contract';
import { agentFor, type Agent } from '../../test/builders/agent';
import { buildPatient, buildSite, buildUser, type BuiltUser } from '../../test/builders/people';
import { createTestApp, type TestApp } from '../../test/builders/test-app';

const today = '2026-12-01';
let house: TestApp;
let patientId: string;
let user: BuiltUser;
let nurse: Agent;

beforeAll(async () => {
  house = await createTestApp();
});
afterAll(() => house.close());

beforeEach(async () => {
  house.clock.set(`${today}T15:00:00Z`);
  const siteId = (await buildSite(house.context.database)).id;
  patientId = (await buildPatient(house.context.database, { siteId, birthDate: '1961-05-14' })).id;
  user = await buildUser(house.context.database, { roles: ['nurse'], siteIds: [siteId] });
  nurse = await agentFor(house, user);
});

const pathOf = (kind: RecordKind, rest = '') => `/api/patients/${patientId}/record/${kind}${rest}`;

const enter = async (kind: RecordKind, values: object): Promise<string> => {
  const reply = await nurse.post(pathOf(kind)).send(values).expect(201);
  return reply.body.id as string;
};

const record = async () =>
  (await nurse.get(`/api/patients/${patientId}/record`).expect(200)).body as PatientRecord;

const query = (text: string, values: unknown[]) =>
  house.context.database.$client.query(text, values);

describe('a threshold and a later test', () => {
  const test = (values: object = {}) =>
    enter('exercise-tests', {
      mode: 'treadmill',
      protocol: 'Bruce',
      protocolKind: 'bruce',
      performedOn: '2026-11-25',
      endedBy: 'fatigue',
      peakHeartRate: 134,
      ...values,
    });
  const threshold = () =>
    enter('thresholds', { kind: 'ischemia', heartRate: 118, foundOn: '2026-09-01' });
  const known = async () => {
    await enter('medication-reviews', {});
    await enter('resting-ecgs', { hindrances: [], observedOn: '2026-08-01' });
  };
  const supersede = (id: string, exerciseTestId: string) =>
    nurse.post(pathOf('thresholds', `/${id}/supersede`)).send({ exerciseTestId });

  it('ends by a clean one that a person confirms, and binds again when that test was in error', async () => {
    await known();
    const [id, testId] = [await threshold(), await test()];
    expect((await record()).thresholds[0]?.ended).toBeNull();
    const reply = await supersede(id, testId).expect(200);
    expect(reply.body.ended).toMatchObject({
      status: 'superseded',
      by: { id: user.id },
      reason: 'Clean test of 2026-11-25, to 134 bpm',
    });
    await supersede(id, testId).expect(409);
    await nurse.post(pathOf('exercise-tests', `/${testId}/entered-in-error`)).expect(200);
    expect((await record()).thresholds[0]?.ended).toBeNull();
  });

  it.each<[string, object, string]>([
    ['below its rate', { peakHeartRate: 117 }, 'did not reach'],
    ['with the sign', { signs: [{ kind: 'st-change', heartRate: 125 }] }, 'not clean'],
    ['before it', { performedOn: '2026-08-20' }, 'not later'],
    ['ended by ST change', { endedBy: 'st-change' }, 'not clean'],
  ])('stays after a test %s', async (_, values, why) => {
    await known();
    const [id, testId] = [await threshold(), await test(values)];
    const reply = await supersede(id, testId).expect(422);
    expect(reply.body.errors[0].message).toContain(why);
    expect((await record()).thresholds[0]?.ended).toBeNull();
  });

  it('stays on other drugs, and where the ECG cannot show ischemia', async () => {
    const [id, testId] = [await threshold(), await test()];
    await supersede(id, testId).expect(422);
    await known();
    await enter('resting-ecgs', {
      hindrances: ['left-bundle-branch-block'],
      observedOn: '2026-08-02',
    });
    const reply = await supersede(id, testId).expect(422);
    expect(reply.body.errors[0].message).toContain('ECG');
  });
});

describe('a restriction', () => {
  it('is lifted once, with the reason and by whom', async () => {
    const id = await enter('restrictions', {
      kind: 'lifting',
      limit: 4.5,
      orderedBy: 'The surgeon',
      orderedOn: '2026-11-02',
    });
    const lift = (reason: string) =>
      nurse.post(pathOf('restrictions', `/${id}/lift`)).send({ reason });
    await lift(' ').expect(422);
    const reply = await lift('The surgeon by phone').expect(200);
    expect(reply.body.ended).toMatchObject({ status: 'lifted', reason: 'The surgeon by phone' });
    await lift('Again').expect(409);
  });

  it.each<[object, string]>([
    [{ kind: 'oxygen' }, 'limit'],
    [{ kind: 'fall', limit: 3 }, 'limit'],
    [{ kind: 'pressure', limit: 150, diastolic: 160 }, 'diastolic'],
    [{ kind: 'fall', until: '2026-11-01' }, 'until'],
  ])('%o is refused', async (values, path) => {
    const body = { orderedBy: 'The surgeon', orderedOn: '2026-11-02', ...values };
    const reply = await nurse.post(pathOf('restrictions')).send(body).expect(422);
    expect(reply.body.errors.map((error: { path: string }) => error.path)).toContain(path);
  });

  it('without its number is refused by the database too', async () => {
    const id = await enter('restrictions', {
      kind: 'oxygen',
      limit: 2,
      orderedBy: 'The physician',
      orderedOn: today,
    });
    const change = query(`UPDATE restrictions SET "limit" = NULL WHERE id = $1`, [id]);
    await expect(change).rejects.toMatchObject({ constraint: 'restrictions_limit' });
  });
});

describe('a PHQ-9', () => {
  const answered = (ninth: number | null) =>
    enter('questionnaires', {
      instrument: 'phq-9',
      answers: [0, 0, 0, 0, 0, 0, 0, 0, ninth],
      answeredOn: today,
    });
  const followUps = async () =>
    ((await nurse.get('/api/follow-ups').expect(200)).body.items as { id: string }[]).map(
      ({ id }) => id,
    );

  it.each([1, 2, 3])(
    'with %i at its ninth item waits until somebody has closed it',
    async (given) => {
      const id = await answered(given);
      expect(await followUps()).toEqual([id]);
      const close = (done: string) =>
        nurse.post(pathOf('questionnaires', `/${id}/close-follow-up`)).send({ done });
      await close('').expect(422);
      const reply = await close('Spoke in private; the physician called').expect(200);
      expect(reply.body.ended).toMatchObject({ status: 'closed', by: { id: user.id } });
      expect(await followUps()).toEqual([]);
      await close('Again').expect(409);
    },
  );

  it.each([0, null])('with %s at its ninth item asks nobody', async (given) => {
    const id = await answered(given);
    expect(await followUps()).toEqual([]);
    await nurse
      .post(pathOf('questionnaires', `/${id}/close-follow-up`))
      .send({ done: 'Nothing' })
      .expect(404);
  });

  it('entered in error waits no more, and is not shown to those of another site', async () => {
    const id = await answered(1);
    const elsewhere = (await buildSite(house.context.database)).id;
    const stranger = await buildUser(house.context.database, {
      roles: ['nurse'],
      siteIds: [elsewhere],
    });
    const reply = await (await agentFor(house, stranger)).get('/api/follow-ups').expect(200);
    expect(reply.body.items).toEqual([]);
    await nurse.post(pathOf('questionnaires', `/${id}/entered-in-error`)).expect(200);
    expect(await followUps()).toEqual([]);
  });

  it.each<[object, string]>([
    [{ answers: [0, 1] }, 'answers'],
    [{ answers: [0, 0, 0, 0, 0, 0, 0, 0, 4] }, 'answers.8'],
    [{ instrument: 'gad-7', answers: Array(7).fill(null) }, 'answers'],
    [{ instrument: 'dasi', answers: Array(12).fill(1) }, 'answers.0'],
  ])('%o is refused', async (values, path) => {
    const body = { instrument: 'phq-9', answeredOn: today, ...values };
    const reply = await nurse.post(pathOf('questionnaires')).send(body).expect(422);
    expect(reply.body.errors[0].path).toBe(path);
  });
});

describe('risk', () => {
  const names = [
    'complexArrhythmia',
    'symptomsAtLowWork',
    'symptomsAtHigherWork',
    'chronotropicIncompetence',
    'pressureFailsToRise',
    'pressureFallsAfter',
    'markedIschemia',
    'mildIschemia',
    'cardiacArrest',
    'complicatedEvent',
    'heartFailure',
    'ischemiaSinceEvent',
    'depression',
    'implantedDefibrillator',
  ];
  const none = Object.fromEntries(names.map((name) => [name, false]));
  const whole = { findings: none, ejectionFraction: 58, capacity: 8, assessedOn: today };
  const judged = (values: object) => nurse.post(pathOf('risk-stratifications')).send(values);

  it('is low only with every criterion known', async () => {
    await judged({ ...whole, level: 'low' }).expect(201);
    const missing = { ...whole, capacity: null, level: 'low' };
    await judged(missing).expect(422);
    await judged({ ...missing, overrideReason: 'Looks well' }).expect(422);
    await judged({ ...missing, level: 'unknown' }).expect(201);
  });

  it('is another than the criteria give only with a reason', async () => {
    await judged({ ...whole, level: 'high' }).expect(422);
    await judged({ ...whole, level: 'high', overrideReason: 'Lives alone, fainted twice' }).expect(
      201,
    );
    await judged({ ...whole, level: 'low', overrideReason: 'For no reason' }).expect(422);
  });

  it('that is low with something missing is refused by the database too', async () => {
    const reply = await judged({ ...whole, level: 'low' }).expect(201);
    const change = query(
      `UPDATE risk_stratifications SET findings = findings - 'depression' WHERE id = $1`,
      [reply.body.id],
    );
    await expect(change).rejects.toMatchObject({
      constraint: 'risk_stratifications_low_is_whole',
    });
  });
});
