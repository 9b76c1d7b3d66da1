import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Role } from '@shared/contracts/accounts-contract';
import { agentFor, type Agent } from '../../test/builders/agent';
import {
  buildPatient,
  buildPatientWithAccount,
  buildSite,
  buildUser,
} from '../../test/builders/people';
import { buildBookable, buildClassDate, buildEnrollment } from '../../test/builders/schedule';
import { createTestApp, type TestApp } from '../../test/builders/test-app';

let house: TestApp;
let site: Awaited<ReturnType<typeof buildSite>>;
let desk: Agent;
let nurse: Agent;

const at = (roles: readonly Role[], siteIds: readonly string[]) =>
  buildUser(house.context.database, { roles, siteIds }).then((user) => agentFor(house, user));

beforeAll(async () => {
  house = await createTestApp();
});
afterAll(() => house.close());

beforeEach(async () => {
  site = await buildSite(house.context.database);
  desk = await at(['front-desk'], [site.id]);
  nurse = await at(['nurse'], [site.id]);
});

const newPatient = (given: object = {}) => ({
  recordNumber: `QY-${randomUUID().slice(0, 8)}`,
  familyName: 'Verne',
  givenName: 'Odalys',
  birthDate: '1961-05-14',
  sexAtBirth: 'female',
  siteId: site.id,
  ...given,
});

describe('registering', () => {
  it('keeps the patient as entered, ends trimmed', async () => {
    const reply = await desk
      .post('/api/patients')
      .send(newPatient({ givenName: '  Odalys ', email: 'odalys@mail.example' }))
      .expect(201);
    expect(reply.body).toMatchObject({
      displayName: 'Odalys Verne',
      email: 'odalys@mail.example',
      phone: null,
      ageYears: 65,
      account: 'none',
      today: '2026-12-01',
      enrollments: [],
      version: 1,
    });
    await desk.get(`/api/patients/${reply.body.id}`).expect(200);
  });

  it.each([
    ['familyName', ' ', 'Enter the family name'],
    ['givenName', 'a\nb', 'Use plain text on one line'],
    ['familyName', 'a\u0000b', 'Use plain text on one line'],
    ['birthDate', '1961-02-30', 'Enter a date'],
    ['birthDate', '1899-12-31', 'Enter a year from 1900 to 2199'],
    ['birthDate', '1900-01-01', 'Enter a date of birth from 1900 to today'],
    ['birthDate', '2026-12-02', 'Enter a date of birth from 1900 to today'],
    ['sexAtBirth', 'other', 'Choose the sex recorded at birth'],
    ['email', 'odalys', 'Enter an e-mail address like name@clinic.example'],
    ['timeZone', 'Harbor/Lane', 'Choose a time zone from the list'],
    ['siteId', randomUUID(), 'Choose one of your sites'],
  ])('%s %j: %s', async (field, value, message) => {
    const body = newPatient({ [field]: value });
    const reply = await desk.post('/api/patients').send(body).expect(422);
    expect(reply.body.errors).toMatchObject([{ path: field, message }]);
  });

  it('takes a record number once, also of two at the same time', async () => {
    const body = newPatient();
    const replies = await Promise.all([1, 2, 3].map(() => desk.post('/api/patients').send(body)));
    expect(replies.map(({ status }) => status).sort()).toEqual([201, 422, 422]);
    const refused = replies.find(({ status }) => status === 422);
    expect(refused?.body.errors).toMatchObject([{ path: 'recordNumber', code: 'taken' }]);
  });

  it.each<[Role, number]>([
    ['patient', 403],
    ['director', 403],
    ['nurse', 201],
    ['administrator', 201],
  ])('by a %s: %i', async (role, status) => {
    const agent = await at([role], [site.id]);
    await agent.post('/api/patients').send(newPatient()).expect(status);
  });
});

describe('changing', () => {
  it('changes what is given, and refuses a change made on an older version', async () => {
    const { id } = await buildPatient(house.context.database, { siteId: site.id });
    const path = `/api/patients/${id}`;
    const changed = await desk.patch(path).send({ version: 1, phone: '555-0188' }).expect(200);
    expect(changed.body).toMatchObject({ phone: '555-0188', version: 2 });
    const stale = await desk.patch(path).send({ version: 1, phone: '555-0199' }).expect(409);
    expect(stale.body.code).toBe('stale-version');
    expect((await desk.get(path)).body.phone).toBe('555-0188');
  });

  it('of two at the same time lets one through', async () => {
    const { id } = await buildPatient(house.context.database, { siteId: site.id });
    const replies = await Promise.all(
      ['1', '2'].map((phone) => desk.patch(`/api/patients/${id}`).send({ version: 1, phone })),
    );
    expect(replies.map(({ status }) => status).sort()).toEqual([200, 409]);
  });

  it('tells of a taken record number beside the field', async () => {
    const [one, two] = [
      await buildPatient(house.context.database, { siteId: site.id }),
      await buildPatient(house.context.database, { siteId: site.id }),
    ];
    const reply = await desk
      .patch(`/api/patients/${one.id}`)
      .send({ version: 1, recordNumber: two.recordNumber })
      .expect(422);
    expect(reply.body.errors).toMatchObject([{ path: 'recordNumber' }]);
  });

  it('lets patients change their own time zone and nothing else', async () => {
    const { user, patient } = await buildPatientWithAccount(house.context.database, {
      siteId: site.id,
    });
    const own = await agentFor(house, user);
    const path = `/api/patients/${patient.id}`;
    const reply = await own
      .patch(path)
      .send({ version: 1, timeZone: 'America/Denver' })
      .expect(200);
    expect(reply.body.timeZone).toBe('America/Denver');
    for (const change of [{ phone: '1' }, { familyName: 'X' }, { siteId: site.id }]) {
      await own
        .patch(path)
        .send({ version: 2, ...change })
        .expect(403);
    }
  });

  it('records which fields were changed, not their values', async () => {
    const { id } = await buildPatient(house.context.database, { siteId: site.id });
    await desk.patch(`/api/patients/${id}`).send({ version: 1, phone: '555-0188' }).expect(200);
    const { rows } = await house.context.database.$client.query<{ details: unknown }>(
      `SELECT details FROM audit_events WHERE action = 'patient.changed' AND patient_id = $1`,
      [id],
    );
    expect(rows).toEqual([{ details: { fields: ['version', 'phone'] } }]);
  });
});

describe('a course', () => {
  const newCourse = (given: object = {}) => ({
    siteId: site.id,
    qualifyingDiagnosis: 'stent',
    qualifyingEventOn: '2026-11-10',
    payer: 'Harbor Mutual',
    enrolledOn: '2026-12-01',
    ...given,
  });

  it('is opened once at a time', async () => {
    const { id } = await buildPatient(house.context.database, { siteId: site.id });
    const path = `/api/patients/${id}/enrollments`;
    const opened = await nurse.post(path).send(newCourse()).expect(201);
    expect(opened.body).toMatchObject({
      number: 1,
      status: 'active',
      plannedSessions: 36,
      qualifying: { diagnosis: 'stent', eventOn: '2026-11-10' },
    });
    const twice = await nurse.post(path).send(newCourse()).expect(409);
    expect(twice.body.code).toBe('already-enrolled');
  });

  it('is numbered by its date', async () => {
    const { id } = await buildPatient(house.context.database, { siteId: site.id });
    await buildEnrollment(house.context.database, {
      patientId: id,
      siteId: site.id,
      status: 'completed',
      enrolledOn: '2025-02-01',
    });
    const opened = await nurse
      .post(`/api/patients/${id}/enrollments`)
      .send(newCourse())
      .expect(201);
    expect(opened.body.number).toBe(2);
  });

  it.each([
    [{ qualifyingEventOn: '2026-12-02' }, 'qualifyingEventOn'],
    [{ enrolledOn: '2026-12-02' }, 'enrolledOn'],
    [{ plannedSessions: 40 }, 'plannedSessions'],
    [{ sessionLimit: 73 }, 'sessionLimit'],
    [{ dailyLimit: 3 }, 'dailyLimit'],
    [{ siteId: randomUUID() }, 'siteId'],
    [{ payer: '' }, 'payer'],
  ])('is refused with %j', async (given, field) => {
    const { id } = await buildPatient(house.context.database, { siteId: site.id });
    const reply = await nurse
      .post(`/api/patients/${id}/enrollments`)
      .send(newCourse(given))
      .expect(422);
    expect(reply.body.errors).toMatchObject([{ path: field }]);
  });

  const change = async (given: object, from: 'active' | 'on-hold' | 'completed' = 'active') => {
    const { id } = await buildPatient(house.context.database, { siteId: site.id });
    const course = await buildEnrollment(house.context.database, {
      patientId: id,
      siteId: site.id,
      status: from,
    });
    return nurse
      .patch(`/api/patients/${id}/enrollments/${course.id}`)
      .send({ version: 1, ...given });
  };

  it.each([
    ['active', { status: 'on-hold' }, 200],
    ['on-hold', { status: 'active' }, 200],
    ['active', { status: 'completed', closedOn: '2026-12-01', closedReason: 'All done' }, 200],
    ['completed', { status: 'active' }, 409],
    ['active', { status: 'discontinued' }, 422],
    ['active', { status: 'completed', closedOn: '2026-12-02', closedReason: 'x' }, 422],
    ['active', { status: 'completed', closedOn: '2026-11-09', closedReason: 'x' }, 422],
    ['active', { version: 2, status: 'on-hold' }, 409],
  ] as const)('from %s by %j: %i', async (from, given, status) => {
    expect((await change(given, from)).status).toBe(status);
  });

  it('does not end while classes ahead are booked', async () => {
    const { id: patientId, enrollmentId } = await buildBookable(house.context.database, site);
    const date = await buildClassDate(house.context.database, site);
    await desk
      .post('/api/appointments')
      .set('Idempotency-Key', randomUUID())
      .send({ classDateId: date.id, patientId })
      .expect(201);
    const { rows } = await house.context.database.$client.query<{ version: number }>(
      'SELECT version FROM enrollments WHERE id = $1',
      [enrollmentId],
    );
    const reply = await nurse
      .patch(`/api/patients/${patientId}/enrollments/${enrollmentId}`)
      .send({
        version: rows[0]?.version,
        status: 'discontinued',
        closedOn: '2026-12-01',
        closedReason: 'Moved away',
      })
      .expect(409);
    expect(reply.body).toMatchObject({
      code: 'illegal-transition',
      title: '1 class is still booked. Cancel them first, then end the course.',
    });
  });

  it.each<Role>(['front-desk', 'director', 'administrator'])('a %s opens none', async (role) => {
    const { id } = await buildPatient(house.context.database, { siteId: site.id });
    const agent = await at([role], [site.id]);
    await agent.post(`/api/patients/${id}/enrollments`).send(newCourse()).expect(403);
  });
});
