import type { PrescriptionPolicy } from '@shared/clinical/prescribing';
import { prescriptionPolicySchema } from '@shared/contracts/policy-contract';
import type { Transaction } from '../database/client';

/** A version once used never changes, so what was parsed stays parsed. */
const parsed = new Map<number, PrescriptionPolicy>();

interface PolicyRow {
  readonly version: number;
  readonly content: unknown;
}

function policyOf(row: PolicyRow): PrescriptionPolicy {
  const known = parsed.get(row.version);
  if (known) return known;
  const policy = prescriptionPolicySchema.parse(row.content);
  parsed.set(row.version, policy);
  return policy;
}

/** The version of the program's policy that is in force at an instant; a migration inserts the first. */
export async function policyInForce(tx: Transaction, now: Date): Promise<PrescriptionPolicy> {
  const { rows } = await tx.connection.query<PolicyRow>({
    name: 'policy-in-force',
    text: `SELECT version, content FROM policies WHERE version = (
      SELECT coalesce(max(version) FILTER (WHERE effective_from <= $1), 1) FROM policies)`,
    values: [now],
  });
  const [row] = rows;
  if (!row) throw new Error('The table of policies is empty');
  return policyOf(row);
}
