import fc from 'fast-check';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { evaluatePrescription, type PrescriptionPolicy } from '@shared/clinical/prescribing';
import { prescriptionPolicySchema } from '@shared/contracts/policy-contract';
import { prescriptionRequestSchema } from '@shared/contracts/prescriptions-contract';
import { buildCourse, buildPrescribers, draftOf, signOf } from '../../test/builders/prescribing';
import { anyPrescriptionInput } from '../../test/builders/prescription-request-arbitrary';
import { createTestApp, type TestApp } from '../../test/builders/test-app';

let house: TestApp;
let people: Awaited<ReturnType<typeof buildPrescribers>>;
let owner: pg.Client;

beforeAll(async () => {
  house = await createTestApp();
  people = await buildPrescribers(house);
  owner = new pg.Client({ connectionString: house.testDatabase.ownerUrl });
  await owner.connect();
});
afterAll(async () => {
  await owner.end();
  await house.close();
});

/** A draft signed by a physiologist, then in force by a physician. */
async function signedRange() {
  const { patientId } = await buildCourse(house, people.site);
  const draft = await draftOf(people.physiologist.agent, patientId);
  const { body } = await signOf(people.physiologist.agent, draft).expect(200);
  return body as { id: string; version: number };
}

describe('a signed prescription', () => {
  const changes = [
    `inputs = jsonb_set(inputs, '{resting,seated}', '70')`,
    `result = jsonb_set(result, '{target,upper}', '130')`,
    `policy_version = policy_version, engine_version = '9.9.9'`,
    `signed_at = now()`,
    `signed_by = (SELECT id FROM users WHERE id <> signed_by LIMIT 1)`,
    `signed_at = NULL, signed_by = NULL`,
    `created_by = (SELECT id FROM users WHERE id <> created_by LIMIT 1)`,
    `patient_id = (SELECT id FROM patients WHERE id <> patient_id LIMIT 1)`,
    `changed_at = now()`,
  ];

  it.each(changes)('never changes, not even for the owner of the database: %s', async (change) => {
    const { id } = await signedRange();
    const refusal = { constraint: 'prescriptions_signed_is_kept' };
    const set = `UPDATE prescriptions SET ${change} WHERE id = $1`;
    await expect(owner.query(set, [id])).rejects.toMatchObject(refusal);
    await expect(house.context.database.$client.query(set, [id])).rejects.toMatchObject(refusal);
  });

  it('keeps the physician’s signature and its place in time as well', async () => {
    const waiting = await signedRange();
    const { body } = await signOf(people.physician.agent, waiting).expect(200);
    const { id } = body as { id: string };
    for (const change of [
      'physician_signed_at = now()',
      'physician_signed_at = NULL, physician_signed_by = NULL',
      `activated_at = now() - interval '1 year'`,
      `status = 'draft'`,
    ]) {
      await expect(
        owner.query(`UPDATE prescriptions SET ${change} WHERE id = $1`, [id]),
      ).rejects.toThrow(/never changes|check constraint/);
    }
    await owner.query(`UPDATE prescriptions SET status = 'completed' WHERE id = $1`, [id]);
    await expect(
      owner.query(`UPDATE prescriptions SET status = 'active' WHERE id = $1`, [id]),
    ).rejects.toThrow('never changes');
  });

  it('is never removed', async () => {
    const { id } = await signedRange();
    await expect(owner.query('DELETE FROM prescriptions WHERE id = $1', [id])).rejects.toThrow(
      'never changes',
    );
    await expect(owner.query('TRUNCATE prescriptions CASCADE')).rejects.toThrow();
  });
});

it('gives the same numbers when it is worked out again from what is stored', async () => {
  const { patientId } = await buildCourse(house, people.site);
  await fc.assert(
    fc.asyncProperty(anyPrescriptionInput, async (inputs) => {
      const reply = await people.physiologist.agent
        .post(`/api/patients/${patientId}/prescriptions`)
        .send({ inputs });
      expect([201, 422]).toContain(reply.status);
      if (reply.status === 201) await signOf(people.physician.agent, reply.body).expect(200);
    }),
    { numRuns: 80 },
  );
  const { rows } = await owner.query<{
    inputs: unknown;
    result: unknown;
    policy: unknown;
    status: string;
  }>(
    `SELECT p.inputs, p.result, p.status, o.content AS policy
       FROM prescriptions p JOIN policies o ON o.version = p.policy_version`,
  );
  expect(rows.filter(({ status }) => status === 'completed').length).toBeGreaterThan(20);
  for (const { inputs, result, policy } of rows) {
    const stored: PrescriptionPolicy = prescriptionPolicySchema.parse(policy);
    const again = evaluatePrescription(prescriptionRequestSchema.parse(inputs), stored);
    expect(again.ok && JSON.parse(JSON.stringify(again.answer))).toEqual(result);
  }
});
