import pg from 'pg';
import { beforeEach, describe, expect, it } from 'vitest';
import { defaultPolicy, evaluatePrescription } from '@shared/clinical/prescribing';
import {
  policyOrders,
  policyStep,
  programPolicyKeys,
  valuesOf,
  defaultProgramPolicy,
} from '@shared/clinical/program-policy';
import type { PolicyPreview, PolicyVersions } from '@shared/contracts/policy-change-contract';
import { agentFor, type Agent } from '../builders/agent';
import { buildSite, buildUser } from '../builders/people';
import { buildCourse, buildStaff, draftOf, signOf, type Site } from '../builders/prescribing';
import { prescriptionInput, workedExample } from '../builders/prescription-request';
import { buildPrescription } from '../builders/prescriptions';
import { createTestApp, type TestApp } from '../builders/test-app';

const reason = 'The electrophysiologists ask for more room below ischemia.';
const wider = { 'margin.ischemia': 15 };

let house: TestApp;
let site: Site;
let administrator: Agent;
let director: Agent;

beforeEach(async () => {
  house = await createTestApp();
  site = await buildSite(house.context.database);
  administrator = (await buildStaff(house, site.id, 'administrator')).agent;
  director = await signedIn({ medicalDirector: true });
  return () => house.close();
});

async function signedIn(marks: { medicalDirector?: boolean; student?: boolean }) {
  const given = { roles: ['physician'], siteIds: [site.id], ...marks } as const;
  return agentFor(house, await buildUser(house.context.database, given));
}

const preview = (agent: Agent, values: object, more: object = {}) =>
  agent.post('/api/policy/preview').send({ basedOn: 1, values, ...more });
const publish = (agent: Agent, values: object, more: object = {}) =>
  agent.post('/api/policy/versions').send({ basedOn: 1, values, reason, ...more });
const query = async <T>(text: string, values: unknown[] = []) =>
  (await house.context.database.$client.query(text, values)).rows as T[];
const insert = (version: number, content: object, training: object = {}) =>
  query(
    `INSERT INTO policies (version, content, training, note, effective_from) VALUES ($1, $2, $3, 'by hand', $4)`,
    [version, JSON.stringify({ ...content, version }), JSON.stringify(training), house.clock.now()],
  );

/** A range in force of the worked example, with changes. */
async function inForce(at: Site = site, inputs = workedExample) {
  const course = await buildCourse(house, at);
  const result = evaluatePrescription(inputs as never, defaultPolicy);
  if (!result.ok) throw new Error(result.error.message);
  const made = await buildPrescription(house.context.database, {
    ...course,
    inputs,
    result: result.answer,
  });
  return { ...course, prescriptionId: made.id };
}

describe('publishing', () => {
  it('makes the next version, in force at once, and leaves the former as it was', async () => {
    const [before] = await query<{ content: object }>('SELECT content FROM policies');
    house.clock.advance(1000);
    const { body } = await publish(administrator, {
      ...wider,
      'progression.minutesStep': 3,
    }).expect(201);
    expect(body).toMatchObject({ version: 2, note: reason, mayChange: true });
    const stored = await query<{ content: object; training: object }>(
      'SELECT content, training FROM policies ORDER BY version',
    );
    expect(stored[0]?.content).toEqual(before?.content);
    expect(stored[1]).toMatchObject({
      content: { version: 2, margin: { ischemia: 15, angina: 10 } },
      training: { progression: { minutesStep: 3, metsStep: 0.5 } },
    });
    const { body: list } = await director.get('/api/policy/versions').expect(200);
    const [second, first] = (list as PolicyVersions).items;
    expect(second).toMatchObject({ version: 2, reason, by: expect.any(String) });
    expect(second?.effectiveFrom).toBe(house.clock.now().toISOString());
    expect(first?.values).toEqual(valuesOf(defaultProgramPolicy));
    expect(second?.values).toEqual({
      ...valuesOf(defaultProgramPolicy),
      ...wider,
      'progression.minutesStep': 3,
    });
  });

  it('is audited with what was changed', async () => {
    await publish(director, wider).expect(201);
    expect(
      await query(
        `SELECT object_id, details FROM audit_events WHERE action = 'policy.published' AND outcome = 'success'`,
      ),
    ).toEqual([{ object_id: '2', details: { values: wider } }]);
  });

  it('is for administrators and the medical director alone', async () => {
    const others = [
      await signedIn({}),
      await signedIn({ medicalDirector: true, student: true }),
      (await buildStaff(house, site.id, 'exercise-physiologist')).agent,
    ];
    for (const agent of others) {
      await publish(agent, wider).expect(403);
      await preview(agent, wider).expect(403);
      const { body } = await agent.get('/api/policy').expect(200);
      expect(body).toMatchObject({ version: 1, mayChange: false });
    }
  });

  it('lets one of several at once win', async () => {
    const twin = house.twin();
    const agents = [administrator, director];
    const answers = await Promise.all(
      [15, 16, 17, 18, 19, 20].map((ischemia, each) =>
        publish(agents[each % 2] ?? director, { 'margin.ischemia': ischemia }),
      ),
    );
    await twin.close();
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409, 409, 409, 409]);
    const refused = answers.filter(({ status }) => status === 409);
    expect(new Set(refused.map(({ body }) => body.code as string))).toEqual(
      new Set(['stale-version']),
    );
    expect(await query('SELECT version FROM policies ORDER BY version')).toHaveLength(2);
  });

  it('is refused on a version that is no longer in force, in the preview too', async () => {
    await publish(director, wider).expect(201);
    const stale = { 'margin.angina': 12 };
    expect((await publish(administrator, stale).expect(409)).body.code).toBe('stale-version');
    expect((await preview(administrator, stale).expect(409)).body.code).toBe('stale-version');
    await publish(administrator, stale, { basedOn: 2 }).expect(201);
  });

  it.each([
    ['below the bounds', { 'margin.icd': 9 }, 'values.margin.icd'],
    ['above the bounds', { 'intensity.wide.upper': 0.91 }, 'values.intensity.wide.upper'],
    ['between two steps', { reviewDueDays: 30.5 }, 'values.reviewDueDays'],
    ['no number', { 'margin.icd': '12' }, 'values.margin.icd'],
    ['not a key', { 'margin.other': 12 }, 'values.margin.other'],
    [
      'an upper end below the lower',
      { 'intensity.wide.lower': 0.8 },
      'values.intensity.wide.upper',
    ],
    ['nothing at all', {}, 'values'],
  ])('refuses what is %s', async (_, values, path) => {
    const { body } = await publish(administrator, values).expect(422);
    expect(body.code).toBe('invalid-request');
    expect((body.errors as { path: string }[]).map((error) => error.path)).toContain(path);
    expect(await query('SELECT version FROM policies')).toHaveLength(1);
  });

  it('refuses numbers that are what they were, and a version without a reason', async () => {
    await publish(administrator, { 'margin.icd': 10 }).expect(422);
    const { body } = await publish(administrator, wider, { reason: ' ' }).expect(422);
    expect(body.errors[0].path).toBe('reason');
  });

  it('leaves what is in force with its version, and works out what is new by the next', async () => {
    const old = await inForce();
    await publish(director, wider).expect(201);
    const { body } = await director.get(`/api/prescriptions/${old.prescriptionId}`).expect(200);
    expect(body).toMatchObject({ policyVersion: 1, result: { ceiling: { value: 108 } } });
    const again = evaluatePrescription(body.inputs, defaultPolicy);
    expect(again.ok && JSON.parse(JSON.stringify(again.answer))).toEqual(body.result);
    const physiologist = (await buildStaff(house, site.id, 'exercise-physiologist')).agent;
    const draft = await draftOf(physiologist, old.patientId);
    const signed = await signOf(director, draft).expect(200);
    expect(signed.body).toMatchObject({ policyVersion: 2, result: { ceiling: { value: 103 } } });
  });
});

describe('the preview', () => {
  it('tells how many ranges would change, whose, and from what to what; it stores nothing', async () => {
    const { patientId, prescriptionId } = await inForce();
    await inForce(
      site,
      prescriptionInput((it) => (it.thresholds = [])),
    );
    const { body } = await preview(director, wider).expect(200);
    expect(body).toMatchObject({
      active: 2,
      changed: 1,
      byPart: { range: 1, ceiling: 1 },
      items: [
        {
          prescriptionId,
          patient: { id: patientId },
          site: site.name,
          before: { target: { lower: 91, upper: 108 }, ceiling: 108 },
          after: { target: { lower: 91, upper: 103 }, ceiling: 103 },
          policyVersion: 1,
          withdrawn: [],
        },
      ],
    });
    expect(await query('SELECT version FROM policies')).toHaveLength(1);
    expect(
      await query(`SELECT patient_id FROM audit_events WHERE action = 'policy.previewed'`),
    ).toEqual([{ patient_id: patientId }]);
  });

  it('names no patient to who does not treat them, here or at all', async () => {
    const elsewhere = await buildSite(house.context.database);
    await inForce(elsewhere);
    await inForce();
    const names = async (agent: Agent) => {
      const { items } = (await preview(agent, wider).expect(200)).body as PolicyPreview;
      return items.map((item) => [item.site, item.patient !== null] as const).sort();
    };
    const both = [elsewhere.name, site.name];
    expect(await names(administrator)).toEqual(both.map((name) => [name, false]).sort());
    expect(await names(director)).toEqual(
      both.map((name) => [name, name === site.name] as const).sort(),
    );
  });

  it('puts a range that would give way to effort first, and says why a choice would not apply', async () => {
    await inForce();
    const { prescriptionId } = await inForce(
      site,
      prescriptionInput((it) => (it.test = { ...it.test!, daysAgo: 100 })),
    );
    const { body } = await preview(director, { 'test.validDays': 90, ...wider }).expect(200);
    expect(body.items[0]).toMatchObject({
      prescriptionId,
      after: { leadBy: 'perceived-exertion', target: null },
    });
  });

  it('counts reviews that would be due', async () => {
    await inForce();
    const { body } = await preview(administrator, { reviewDueDays: 7 }).expect(200);
    expect(body).toMatchObject({ changed: 0, reviewsDue: { before: 0, after: 0 }, items: [] });
    house.clock.advance(24 * 3_600_000);
    const next = await agentFor(
      house,
      await buildUser(house.context.database, { roles: ['administrator'] }),
    );
    const { body: later } = await preview(next, { reviewDueDays: 7 }).expect(200);
    expect(later).toMatchObject({ reviewsDue: { before: 0, after: 1 } });
  });

  it('looks through a thousand ranges in one go, a hundred to a page', async () => {
    const { prescriptionId } = await inForce();
    await query(
      `WITH made AS (
         INSERT INTO patients (id, record_number, family_name, given_name, birth_date, sex_at_birth, site_id)
         SELECT gen_random_uuid(), 'M-' || n, 'Many', 'One of', '1960-01-01', 'male', $1 FROM generate_series(1, 999) n
         RETURNING id
       ), course AS (
         INSERT INTO enrollments (id, patient_id, site_id, phase, enrolled_on, planned_sessions, payer, qualifying_diagnosis, qualifying_event_on, status)
         SELECT gen_random_uuid(), made.id, $1, e.phase, e.enrolled_on, e.planned_sessions, e.payer, e.qualifying_diagnosis, e.qualifying_event_on, e.status
           FROM made, enrollments e JOIN prescriptions p ON p.enrollment_id = e.id AND p.id = $2
         RETURNING id, patient_id
       )
       INSERT INTO prescriptions (id, patient_id, enrollment_id, status, inputs, result, policy_version, engine_version,
              created_at, created_by, signed_at, signed_by, activated_at)
       SELECT gen_random_uuid(), c.patient_id, c.id, p.status, p.inputs, p.result, p.policy_version, p.engine_version,
              p.created_at, p.created_by, p.signed_at, p.signed_by, p.activated_at
         FROM course c, prescriptions p WHERE p.id = $2`,
      [site.id, prescriptionId],
    );
    const { body } = await preview(director, wider, { offset: 950 }).expect(200);
    expect(body).toMatchObject({ active: 1000, changed: 1000 });
    expect(body.items).toHaveLength(50);
  });
});

describe('the database', () => {
  it('holds the bounds, steps and orders of the code', async () => {
    const bounds = await query<Record<string, unknown>>(
      'SELECT key, lowest::float, highest::float, step::float FROM policy_bounds()',
    );
    expect(bounds).toEqual(
      programPolicyKeys.map(({ key, lowest, highest, ...number }) => ({
        key,
        lowest,
        highest,
        step: policyStep({ lowest, highest, ...number }),
      })),
    );
    expect(
      await query(
        'SELECT lower_key AS lower, upper_key AS upper, may_be_equal AS "mayBeEqual" FROM policy_orders()',
      ),
    ).toEqual(policyOrders);
  });

  it.each([
    ['out of bounds', { ...defaultPolicy, oxygenFloor: 80 }, {}],
    ['between steps', { ...defaultPolicy, reviewDueDays: 30.5 }, {}],
    ['missing', { ...defaultPolicy, oxygenFloor: undefined }, {}],
    ['unknown', { ...defaultPolicy, more: 1 }, {}],
    ['no number', { ...defaultPolicy, oxygenFloor: '88' }, {}],
    ['upside down', { ...defaultPolicy, percentOfPeak: { lower: 0.8, upper: 0.7 } }, {}],
    ['out of bounds in training', defaultPolicy, { intervals: { highestEffort: 20 } }],
  ])('refuses a version with a number that is %s', async (_, content, training) => {
    await expect(insert(2, content, training)).rejects.toMatchObject({
      constraint: 'policies_within_bounds',
    });
  });

  it('takes a version with some of the training numbers, which then count with their defaults', async () => {
    await insert(2, defaultPolicy, { intervals: { highestEffort: 16 } });
    const { body } = await director.get('/api/policy/versions').expect(200);
    expect((body as PolicyVersions).items[0]?.values).toEqual({
      ...valuesOf(defaultProgramPolicy),
      'intervals.highestEffort': 16,
    });
  });

  it('lets no version be changed or removed, not even by its owner', async () => {
    const owner = new pg.Client(house.testDatabase.ownerUrl);
    await owner.connect();
    for (const text of [`UPDATE policies SET note = 'x'`, 'DELETE FROM policies']) {
      await expect(query(text)).rejects.toThrow(/permission denied/);
      await expect(owner.query(text)).rejects.toThrow(/append-only/);
    }
    await owner.end();
  });
});
