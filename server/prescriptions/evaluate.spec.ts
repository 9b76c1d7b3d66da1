import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { defaultPolicy } from '@shared/clinical/prescribing';
import { buildPrescribers } from '../../test/builders/prescribing';
import {
  answerTo,
  prescriptionInput,
  withoutTest,
  workedExample,
} from '../../test/builders/prescription-request';
import { createTestApp, type TestApp } from '../../test/builders/test-app';
import type { Agent } from '../../test/builders/agent';

let house: TestApp;
let nurse: Agent;

beforeAll(async () => {
  house = await createTestApp();
  nurse = (await buildPrescribers(house)).nurse.agent;
});
afterAll(() => house.close());

const evaluate = (body: object, agent = nurse) =>
  agent.post('/api/prescriptions/evaluate').send(body);

describe('POST /api/prescriptions/evaluate', () => {
  it('answers the worked example to the digit, as the engine does', async () => {
    const { body } = await evaluate(workedExample).expect(200);
    expect(body).toEqual(JSON.parse(JSON.stringify(answerTo())));
    expect(body).toMatchObject({
      leadBy: 'heart-rate',
      target: { lower: 91, upper: 108 },
      ceiling: { value: 108, bindingLimits: ['ischemia'] },
      intensityAtCeiling: 0.6388888888888888,
      perceivedExertion: { scale: 'borg-6-20', lower: 11, upper: 14 },
      patientTarget: { lower: 91, upper: 105 },
      tenSecondCount: { lower: 16, upper: 17 },
      policyVersion: 1,
    });
  });

  it('stores nothing', async () => {
    const count = async () =>
      (
        await house.context.database.$client.query(
          'SELECT (SELECT count(*) FROM prescriptions)::int + (SELECT count(*) FROM audit_events)::int AS count',
        )
      ).rows[0].count as number;
    const before = await count();
    await evaluate(workedExample).expect(200);
    expect(await count()).toBe(before);
  });

  it('says of each field at fault what to enter, with its path', async () => {
    const { body } = await evaluate({
      ...workedExample,
      patient: { ...workedExample.patient, ageYears: 7 },
      rhythm: 'samba',
      thresholds: [{ kind: 'ischemia', heartRate: 12, clearMets: null }],
      guess: 1,
    }).expect(422);
    expect(body).toMatchObject({ code: 'invalid-request', type: '/problems/invalid-request' });
    const paths = (body.errors as { path: string }[]).map(({ path }) => path).sort();
    expect(paths).toEqual(['guess', 'patient.ageYears', 'rhythm', 'thresholds.0.heartRate']);
    for (const error of body.errors as object[]) {
      expect(error).toEqual({
        path: expect.any(String),
        code: expect.any(String),
        message: expect.stringMatching(/\w/),
      });
    }
  });

  it.each([
    ['a key is missing', ({ risk: _, ...rest }: typeof workedExample) => rest, 'risk'],
    [
      'the peak is not above the resting rate',
      (input: typeof workedExample) => ({
        ...input,
        resting: { ...input.resting, seated: 130 },
        test: { ...input.test, peakHeartRate: 120 },
      }),
      'test.peakHeartRate',
    ],
    [
      'an interval is upside down',
      (input: typeof workedExample) => ({ ...input, intensity: { lower: 0.8, upper: 0.4 } }),
      'intensity.upper',
    ],
    [
      'zones come without a device',
      (input: typeof workedExample) => ({
        ...input,
        devices: {
          ...input.devices,
          icd: { status: 'none', zones: [{ rate: 150, kind: 'shock' }] },
        },
      }),
      'devices.icd.zones',
    ],
  ])('refuses when %s', async (_, change, path) => {
    const { body } = await evaluate(change(workedExample)).expect(422);
    expect(body.code).toBe('invalid-request');
    expect((body.errors as { path: string }[]).map((error) => error.path)).toEqual([path]);
  });

  it('refuses a choice that does not apply, with the reason', async () => {
    const input = prescriptionInput((it) => (it.choice = { method: null, maximum: 'tanaka' }));
    const { body } = await evaluate(input).expect(422);
    expect(body.code).toBe('not-applicable');
    expect(body.errors).toEqual([
      { path: 'choice.maximum', code: 'not-applicable', message: body.title },
    ]);
    const without = prescriptionInput(
      withoutTest,
      (it) => (it.choice.method = 'heart-rate-reserve'),
    );
    expect((await evaluate(without).expect(422)).body.errors[0].path).toBe('choice.method');
  });

  it('takes JSON alone, and one that can be read', async () => {
    await nurse.post('/api/prescriptions/evaluate').type('text').send('x').expect(415);
    await nurse.post('/api/prescriptions/evaluate').type('json').send('{ "patient": ').expect(400);
    await nurse.post('/api/prescriptions/evaluate').type('json').send('null').expect(422);
  });

  it('works by the policy in force from its hour on', async () => {
    const later = {
      ...defaultPolicy,
      version: 2,
      margin: { ...defaultPolicy.margin, ischemia: 15 },
    };
    await house.context.database.$client.query(
      'INSERT INTO policies (version, content, note, effective_from) VALUES (2, $1, $2, $3)',
      [later, 'wider', '2026-12-01T15:10:00Z'],
    );
    const before = await evaluate(workedExample).expect(200);
    expect(before.body).toMatchObject({ policyVersion: 1, ceiling: { value: 108 } });
    house.clock.set('2026-12-01T15:10:00Z');
    const after = await evaluate(workedExample).expect(200);
    expect(after.body).toMatchObject({ policyVersion: 2, ceiling: { value: 103 } });
    house.clock.set('2026-12-01T15:00:00Z');
  });
});
