import type { PoolClient } from 'pg';
import type { PrescriptionPolicy } from '@shared/clinical/prescribing';
import { prescriptionPolicySchema } from '@shared/contracts/policy-contract';

/** A version once used never changes, so what was parsed stays parsed. */
const parsed = new Map<number, PrescriptionPolicy>();

interface PolicyRow {
  readonly version: number;
  /** Null for a version that is parsed already. */
  readonly content: unknown;
}

/**
 * The version of the program's policy that is in force at an instant; a migration inserts the first.
 * @param client a transaction's connection, or the pool where there is no transaction
 */
export async function policyInForce(
  client: Pick<PoolClient, 'query'>,
  now: Date,
): Promise<PrescriptionPolicy> {
  const { rows } = await client.query<PolicyRow>({
    name: 'policy-in-force',
    text: `SELECT version, CASE WHEN version = ANY($2::int[]) THEN null ELSE content END AS content
      FROM policies WHERE version = (
        SELECT coalesce(max(version) FILTER (WHERE effective_from <= $1), 1) FROM policies)`,
    values: [now, [...parsed.keys()]],
  });
  const [row] = rows;
  if (!row) throw new Error('The table of policies is empty');
  const known = parsed.get(row.version);
  if (known) return known;
  const policy = prescriptionPolicySchema.parse(row.content);
  parsed.set(row.version, policy);
  return policy;
}
