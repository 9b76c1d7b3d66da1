import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Test } from 'supertest';
import {
  buildCourse,
  buildPrescribers,
  buildStaff,
  draftOf,
  signOf,
} from '../../test/builders/prescribing';
import { createTestApp, type TestApp } from '../../test/builders/test-app';

let house: TestApp;
let people: Awaited<ReturnType<typeof buildPrescribers>>;

beforeAll(async () => {
  house = await createTestApp();
  people = await buildPrescribers(house);
});
afterAll(() => house.close());

const ROUNDS = 12;

/** Status and code of each answer. */
async function answersTo(calls: readonly Test[]) {
  const replies = await Promise.all(calls);
  return replies.map(({ status, body }) => [status, (body as { code?: string }).code] as const);
}

const signaturesOf = async (patientId: string) =>
  (
    await house.context.database.$client.query(
      `SELECT status, signed_by, physician_signed_by FROM prescriptions WHERE patient_id = $1 ORDER BY id`,
      [patientId],
    )
  ).rows as { status: string; signed_by: string | null; physician_signed_by: string | null }[];

it('lets two physiologists who sign at once sign once', async () => {
  const other = await buildStaff(house, people.site.id, 'exercise-physiologist');
  for (let round = 0; round < ROUNDS; round += 1) {
    const { patientId } = await buildCourse(house, people.site);
    const draft = await draftOf(people.physiologist.agent, patientId);
    const signers = [people.physiologist.agent, other.agent, people.physiologist.agent];
    const answers = await answersTo(signers.map((agent) => signOf(agent, draft)));
    expect(answers.filter(([status]) => status === 200)).toHaveLength(1);
    expect(answers.filter(([, code]) => code === 'already-signed')).toHaveLength(2);
    expect(await signaturesOf(patientId)).toMatchObject([
      { status: 'draft', signed_by: expect.any(String), physician_signed_by: null },
    ]);
  }
});

it('lets a physiologist and a physician who sign at once each sign once at most', async () => {
  for (let round = 0; round < ROUNDS; round += 1) {
    const { patientId } = await buildCourse(house, people.site);
    const draft = await draftOf(people.physiologist.agent, patientId);
    const both = [people.physician.agent, people.physiologist.agent];
    const [physician, physiologist] = await answersTo(both.map((agent) => signOf(agent, draft)));
    const [row] = await signaturesOf(patientId);
    if (physician?.[0] === 200) {
      expect(physiologist).toEqual([409, 'already-signed']);
      expect(row).toMatchObject({ status: 'active', signed_by: people.physician.id });
    } else {
      expect([physician, physiologist?.[0]]).toEqual([[409, 'stale-version'], 200]);
      expect(row).toMatchObject({ status: 'draft', signed_by: people.physiologist.id });
    }
  }
});

it('puts one of several drafts signed at once in force, the last one, and ends the others', async () => {
  for (let round = 0; round < ROUNDS; round += 1) {
    const { patientId } = await buildCourse(house, people.site);
    await signOf(people.physician.agent, await draftOf(people.physiologist.agent, patientId));
    const drafts = [];
    for (let each = 0; each < 4; each += 1) {
      drafts.push(await draftOf(people.physiologist.agent, patientId));
    }
    const agents = [people.physiologist.agent, people.physician.agent];
    const answers = await answersTo(
      drafts.map((draft, each) => signOf(agents[each % 2] ?? people.nurse.agent, draft)),
    );
    expect(answers.map(([status]) => status)).toEqual([200, 200, 200, 200]);
    const statuses = (await signaturesOf(patientId)).map(({ status }) => status);
    expect(statuses.filter((status) => status === 'active')).toHaveLength(1);
    expect(statuses.filter((status) => status === 'completed')).toHaveLength(4);
  }
});

it('lets a physician’s signatures on two waiting ranges put one in force', async () => {
  for (let round = 0; round < ROUNDS; round += 1) {
    const { patientId } = await buildCourse(house, people.site);
    const waiting = [];
    for (let each = 0; each < 2; each += 1) {
      const draft = await draftOf(people.physiologist.agent, patientId);
      waiting.push((await signOf(people.physiologist.agent, draft).expect(200)).body);
    }
    const answers = await answersTo(waiting.map((draft) => signOf(people.physician.agent, draft)));
    expect(answers.map(([status]) => status).sort()).toEqual([200, 409]);
    const statuses = (await signaturesOf(patientId)).map(({ status }) => status).sort();
    expect(statuses).toEqual(['active', 'revoked']);
  }
});

it('lets a change and a signature at once not mix: what is signed is what was seen', async () => {
  for (let round = 0; round < ROUNDS; round += 1) {
    const { patientId } = await buildCourse(house, people.site);
    const draft = await draftOf(people.physiologist.agent, patientId);
    const read = await people.nurse.agent.get(`/api/prescriptions/${draft.id}`);
    const { inputs } = read.body as { inputs: { programWeek: number } };
    const change = people.nurse.agent
      .put(`/api/prescriptions/${draft.id}`)
      .send({ inputs: { ...inputs, programWeek: 9 }, version: draft.version });
    const [changed, signed] = await Promise.all([change, signOf(people.physician.agent, draft)]);
    expect([changed.status, signed.status].sort()).toEqual([200, 409]);
    const { body } = await people.nurse.agent.get(`/api/prescriptions/${draft.id}`);
    const seen = signed.status === 200 ? 4 : 9;
    expect((body as { inputs: { programWeek: number } }).inputs.programWeek).toBe(seen);
  }
});
