import type { PoolClient } from 'pg';
import {
  policyChapters,
  policyStep,
  valuesOf,
  type PolicyValuesByKey,
} from '@shared/clinical/program-policy';
import type { PolicyVersions } from '@shared/contracts/policy-change-contract';
import type { PolicyInForce } from '@shared/contracts/policy-in-force-contract';
import { readPolicy, type StoredPolicy } from './policy-queries';

type Client = Pick<PoolClient, 'query'>;

interface Version {
  readonly version: number;
  readonly effectiveFrom: Date;
  readonly by: string | null;
  readonly note: string;
  readonly values: PolicyValuesByKey;
}

/** Every version that has come into force, newest first. */
async function versionsUntil(client: Client, now: Date): Promise<[Version, ...Version[]]> {
  const { rows } = await client.query<Omit<Version, 'values'> & StoredPolicy>(
    `SELECT p.version, p.content, p.training, p.effective_from AS "effectiveFrom", p.note, u.display_name AS by
       FROM policies p LEFT JOIN users u ON u.id = p.created_by
      WHERE p.effective_from <= $1 OR p.version = 1 ORDER BY p.version DESC`,
    [now],
  );
  const [newest, ...older] = rows.map(({ content, training, ...row }) => ({
    ...row,
    values: valuesOf(readPolicy({ content, training })),
  }));
  if (!newest) throw new Error('The table of policies is empty');
  return [newest, ...older];
}

/** The oldest of the versions, newest first, from which on the key has had its present value. */
function sinceOf([newest, ...older]: [Version, ...Version[]], key: string): Version {
  let since = newest;
  for (const version of older) {
    if (version.values[key] !== newest.values[key]) break;
    since = version;
  }
  return since;
}

/** The policy in force with the default, the bounds, the source and the age of each of its numbers. */
export async function policyWithHistory(
  client: Client,
  now: Date,
): Promise<Omit<PolicyInForce, 'mayChange'>> {
  const versions = await versionsUntil(client, now);
  const [{ version, effectiveFrom, by, note, values }] = versions;
  const items = policyChapters.flatMap(({ title, keys }) =>
    keys.map((number) => {
      const since = sinceOf(versions, number.key);
      return {
        ...number,
        subject: title,
        step: policyStep(number),
        value: values[number.key] ?? number.default,
        sinceVersion: since.version,
        since: since.effectiveFrom.toISOString(),
      };
    }),
  );
  return { version, effectiveFrom: effectiveFrom.toISOString(), by, note, items };
}

/** Every version with its numbers, newest first. */
export async function policyVersions(client: Client, now: Date): Promise<PolicyVersions> {
  const versions = await versionsUntil(client, now);
  return {
    items: versions.map(({ effectiveFrom, note, values, ...version }) => ({
      ...version,
      effectiveFrom: effectiveFrom.toISOString(),
      reason: note,
      values: { ...values },
    })),
  };
}
