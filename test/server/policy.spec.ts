import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { defaultPolicy } from '@shared/clinical/prescribing';
import { programPolicyKeys } from '@shared/clinical/program-policy';
import type { PolicyInForce } from '@shared/contracts/policy-in-force-contract';
import { agentFor, type Agent } from '../builders/agent';
import { buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';

describe('the policy in force', () => {
  let house: TestApp;
  let agent: Agent;

  beforeAll(async () => {
    house = await createTestApp();
    agent = await agentFor(
      house,
      await buildUser(house.context.database, { roles: ['physician'] }),
    );
  });
  afterAll(() => house.close());

  const read = async (): Promise<PolicyInForce> =>
    (await agent.get('/api/policy').expect(200)).body;
  const rowOf = (policy: PolicyInForce, key: string) =>
    policy.items.find((item) => item.key === key);

  const addVersion = (version: number, content: object, effectiveFrom: Date) =>
    house.context.database.$client.query(
      'INSERT INTO policies (version, content, effective_from, note) VALUES ($1, $2, $3, $4)',
      [version, JSON.stringify({ ...content, version }), effectiveFrom, `Version ${version}`],
    );

  it('is the defaults at first, each with bounds and source', async () => {
    const policy = await read();
    expect(policy.version).toBe(1);
    expect(policy.items).toHaveLength(programPolicyKeys.length);
    for (const item of policy.items) expect(item.value).toBe(item.default);
    expect(rowOf(policy, 'margin.icd')).toMatchObject({
      value: 10,
      lowest: 10,
      highest: 30,
      unit: 'bpm',
      sinceVersion: 1,
    });
  });

  it('tells since when each number is what it is, and nothing of a version that is to come', async () => {
    const now = house.clock.now();
    const hour = (hours: number) => new Date(now.getTime() + hours * 3_600_000);
    const second = { ...defaultPolicy, reviewDueDays: 21 };
    await addVersion(2, second, hour(-2));
    await addVersion(3, { ...second, oxygenFloor: 90 }, hour(-1));
    await addVersion(4, { ...second, oxygenFloor: 93 }, hour(1));
    const policy = await read();
    expect([policy.version, policy.note]).toEqual([3, 'Version 3']);
    expect(policy.effectiveFrom).toBe(hour(-1).toISOString());
    expect(rowOf(policy, 'oxygenFloor')).toMatchObject({ value: 90, default: 88, sinceVersion: 3 });
    expect(rowOf(policy, 'reviewDueDays')).toMatchObject({
      value: 21,
      sinceVersion: 2,
      since: hour(-2).toISOString(),
    });
    expect(rowOf(policy, 'margin.icd')?.sinceVersion).toBe(1);
  });
});
