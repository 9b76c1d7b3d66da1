import {
  changedKeys,
  orderFaults,
  policyOf,
  valuesOf,
  withValues,
  type PolicyFault,
  type ProgramPolicy,
} from '@shared/clinical/program-policy';
import type { PolicyPublishRequest } from '@shared/contracts/policy-change-contract';
import type { Transaction } from '../database/client';
import { policies } from '../database/schema';
import { fail, Failure } from '../http/failure';
import { programPolicyInForce } from './policy-queries';
import type { Author } from './prescriptions-service';

type Proposal = Pick<PolicyPublishRequest, 'basedOn' | 'values'>;

const invalid = (faults: readonly PolicyFault[]): Failure =>
  fail('invalid-request', {
    errors: faults.map(({ key, message }) => ({ path: `values.${key}`, code: 'custom', message })),
  });

const published = (): Failure =>
  fail('stale-version', {
    title:
      'Someone published another version of the policy in the meantime. Load the page again, then repeat your change.',
  });

/**
 * The policy in force, and what would take its place.
 * @returns `stale-version` when another is in force than the proposal was made on, `invalid-request` when its numbers do
 * not fit together or none of them differs
 */
export async function proposedPolicy(
  tx: Transaction,
  { basedOn, values }: Proposal,
  now: Date,
): Promise<{ readonly present: ProgramPolicy; readonly proposed: ProgramPolicy } | Failure> {
  const present = await programPolicyInForce(tx.connection, now);
  if (present.prescribing.version !== basedOn) return published();
  const old = valuesOf(present);
  const merged = withValues(old, values);
  const faults = orderFaults(merged);
  if (faults.length > 0) return invalid(faults);
  if (changedKeys(old, merged).length === 0) {
    return invalid([
      { key: '', message: 'Every number is what it is already. Change at least one.' },
    ]);
  }
  return { present, proposed: policyOf(merged, basedOn + 1) };
}

/**
 * Publishes the next version, in force at once; of several at the same time the table's key lets one in.
 * @returns what `proposedPolicy` refuses, or undefined when it is done
 */
export async function publishPolicy(
  tx: Transaction,
  { actor, now }: Author,
  { reason, ...proposal }: PolicyPublishRequest,
): Promise<Failure | undefined> {
  const found = await proposedPolicy(tx, proposal, now);
  if (found instanceof Failure) return found;
  const { prescribing, training } = found.proposed;
  await tx.insert(policies).values({
    version: prescribing.version,
    content: prescribing,
    training,
    effectiveFrom: now,
    createdBy: actor.id,
    note: reason,
  });
  return undefined;
}
