import { afterAll, beforeAll, expect, it } from 'vitest';
import {
  buildCourse,
  buildOwnCourse,
  buildPrescribers,
  buildStaff,
} from '../../test/builders/prescribing';
import { buildPrescription } from '../../test/builders/prescriptions';
import { buildSite } from '../../test/builders/people';
import { readPdf } from '../../test/builders/read-pdf';
import { createTestApp, type TestApp } from '../../test/builders/test-app';

let house: TestApp;
let people: Awaited<ReturnType<typeof buildPrescribers>>;

beforeAll(async () => {
  house = await createTestApp();
  people = await buildPrescribers(house);
});
afterAll(() => house.close());

async function own() {
  const { agent, ...course } = await buildOwnCourse(house, people.site);
  await buildPrescription(house.context.database, course);
  return { agent, ...course };
}

const printed = async (patientId: string) =>
  (
    await house.context.database.$client.query(
      `SELECT action FROM audit_events WHERE patient_id = $1 AND action LIKE '%printed' ORDER BY sequence`,
      [patientId],
    )
  ).rows.map(({ action }: { action: string }) => action);

it('tells a patient range, cautions, signers, whom to call and what to do at home', async () => {
  const { agent } = await own();
  const { body } = await agent.get('/api/my/range').expect(200);
  expect(body).toMatchObject({
    program: 'Harbor Lane',
    site: { name: people.site.name, phone: people.site.phone },
    range: {
      state: 'in-force',
      changes: [],
      target: { lower: 91, upper: 105 },
      stayUnder: 108,
      signedBy: null,
    },
    home: { perWeek: 2, warmUpMinutes: 10, coolDownMinutes: 10 },
  });
  expect(body.range.cautions).toContain('defer-to-local-policy');
});

it('hands the patient the same as a PDF, and records it', async () => {
  const { agent, patientId } = await own();
  const reply = await agent.get('/api/my/range.pdf').buffer().responseType('blob').expect(200);
  expect(reply.headers['content-type']).toBe('application/pdf');
  expect(reply.headers['content-disposition']).toBe('attachment; filename="my-range.pdf"');
  for (const { pages, text } of await readPdf(reply.body as Buffer)) {
    expect(pages).toBe(1);
    expect(text).toContain('91–105');
    expect(text).toContain(people.site.phone);
  }
  expect(await printed(patientId)).toEqual(['my-range.printed']);
});

it('gives staff the sheet of their own sites’ patients alone', async () => {
  const { patientId } = await own();
  const path = `/api/patients/${patientId}/range.pdf`;
  await people.nurse.agent.get(path).expect(200);
  const elsewhere = await buildSite(house.context.database);
  const stranger = await buildStaff(house, elsewhere.id, 'nurse');
  await stranger.agent.get(path).expect(404);
  const desk = await buildStaff(house, people.site.id, 'front-desk');
  await desk.agent.get(path).expect(403);
  expect(await printed(patientId)).toEqual(['range.printed']);
});

it('prints none while there is none', async () => {
  const { patientId } = await buildCourse(house, people.site);
  const { body } = await people.nurse.agent.get(`/api/patients/${patientId}/range.pdf`).expect(404);
  expect(body.title).toContain('No range is in force');
});

it('says in the sheet that a medicine has changed, once one has', async () => {
  const { agent, patientId } = await own();
  await house.context.database.$client.query(
    `INSERT INTO medications (id, patient_id, name, rate_acting, dose, schedule, started_on, recorded_by, recorded_at)
     SELECT gen_random_uuid(), $1, 'metoprolol', 'beta-blocker', '50 mg', 'daily', '2026-12-01', $2, $3`,
    [patientId, people.nurse.id, house.clock.now()],
  );
  const { body } = await agent.get('/api/my/range').expect(200);
  expect(body.range).toMatchObject({
    state: 'review',
    changes: [{ fact: 'rate-acting-drug-started', effect: 'withdrawn' }],
    target: null,
  });
});
