import type { PoolClient } from 'pg';
import { type PrescriptionPolicy, policyKeys, policyValue } from '@shared/clinical/prescribing';
import { prescriptionPolicySchema } from '@shared/contracts/policy-contract';
import type { PolicyInForce } from '@shared/contracts/policy-in-force-contract';

interface Version {
  readonly effectiveFrom: Date;
  readonly note: string;
  readonly policy: PrescriptionPolicy;
}

async function versionsUntil(
  client: Pick<PoolClient, 'query'>,
  version: number,
): Promise<[Version, ...Version[]]> {
  const { rows } = await client.query<{ content: unknown; effectiveFrom: Date; note: string }>(
    `SELECT content, effective_from AS "effectiveFrom", note FROM policies
      WHERE version <= $1 ORDER BY version DESC`,
    [version],
  );
  const [newest, ...older] = rows.map(({ content, ...row }) => ({
    ...row,
    policy: prescriptionPolicySchema.parse(content),
  }));
  if (!newest) throw new Error(`There is no policy of version ${version}`);
  return [newest, ...older];
}

/** The oldest of the versions, newest first, from which on the key has had its present value. */
function sinceOf([newest, ...older]: [Version, ...Version[]], key: string): Version {
  const value = policyValue(newest.policy, key);
  let since = newest;
  for (const version of older) {
    if (policyValue(version.policy, key) !== value) break;
    since = version;
  }
  return since;
}

/** A version of the policy with the default, the bounds and the age of each of its numbers. */
export async function policyWithHistory(
  client: Pick<PoolClient, 'query'>,
  version: number,
): Promise<PolicyInForce> {
  const versions = await versionsUntil(client, version);
  const [{ policy, effectiveFrom, note }] = versions;
  return {
    version,
    effectiveFrom: effectiveFrom.toISOString(),
    note,
    items: policyKeys.map((row) => {
      const since = sinceOf(versions, row.key);
      return {
        ...row,
        value: policyValue(policy, row.key),
        sinceVersion: since.policy.version,
        since: since.effectiveFrom.toISOString(),
      };
    }),
  };
}
