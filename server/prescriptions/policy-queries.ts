import type { PoolClient } from 'pg';
import type { PrescriptionPolicy } from '@shared/clinical/prescribing';
import { type ProgramPolicy, trainingPolicyOf } from '@shared/clinical/program-policy';
import { prescriptionPolicySchema } from '@shared/contracts/policy-contract';

/** A version once used never changes, so what was parsed stays parsed. */
const parsed = new Map<number, ProgramPolicy>();

/** What a version is stored as. */
export interface StoredPolicy {
  readonly content: unknown;
  readonly training: Parameters<typeof trainingPolicyOf>[0];
}

interface PolicyRow {
  readonly version: number;
  /** Null for a version that is parsed already. */
  readonly stored: StoredPolicy | null;
}

export const readPolicy = ({ content, training }: StoredPolicy): ProgramPolicy => ({
  prescribing: prescriptionPolicySchema.parse(content),
  training: trainingPolicyOf(training),
});

/**
 * The version of the program's policy that is in force at an instant; a migration inserts the first.
 * @param client a transaction's connection, or the pool where there is no transaction
 */
export async function programPolicyInForce(
  client: Pick<PoolClient, 'query'>,
  now: Date,
): Promise<ProgramPolicy> {
  const { rows } = await client.query<PolicyRow>({
    name: 'policy-in-force',
    text: `SELECT version, CASE WHEN version <> ALL($2::int[])
             THEN jsonb_build_object('content', content, 'training', training) END AS stored
      FROM policies WHERE version = (
        SELECT coalesce(max(version) FILTER (WHERE effective_from <= $1), 1) FROM policies)`,
    values: [now, [...parsed.keys()]],
  });
  const [row] = rows;
  if (!row) throw new Error('The table of policies is empty');
  const known = parsed.get(row.version);
  if (known) return known;
  if (!row.stored) throw new Error(`Policy ${row.version} is gone`);
  const policy = readPolicy(row.stored);
  parsed.set(row.version, policy);
  return policy;
}

/** Of it, what ranges are worked out by. */
export async function policyInForce(
  client: Pick<PoolClient, 'query'>,
  now: Date,
): Promise<PrescriptionPolicy> {
  return (await programPolicyInForce(client, now)).prescribing;
}
