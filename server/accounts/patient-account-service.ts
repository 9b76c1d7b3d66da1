import { eq } from 'drizzle-orm';
import type { AppContext } from '../app-context';
import type { Transaction } from '../database/client';
import { patients } from '../database/schema';
import { fail } from '../http/failure';
import type { Actor } from './actor';
import { inviteAgain, inviteUser } from './users-service';

/**
 * Invites a patient to an account of their own, or again while the first invitation waits.
 * @throws Failure `invalid-request` when the record holds no e-mail address, `illegal-transition` when the account is
 * in use already; on constraint `users_email_unique` when another account has the address
 */
export async function invitePatient(
  tx: Transaction,
  context: AppContext,
  actor: Actor,
  patientId: string,
): Promise<string> {
  const [patient] = await tx
    .select()
    .from(patients)
    .where(eq(patients.id, patientId))
    .for('no key update');
  if (!patient) throw fail('not-found');
  if (patient.userId) {
    await inviteAgain(tx, context, patient.userId);
    return patient.userId;
  }
  if (!patient.email) {
    const message = 'Enter the patient’s e-mail address first';
    throw fail('invalid-request', { errors: [{ path: 'email', code: 'custom', message }] });
  }
  const { id } = await inviteUser(tx, context, actor, {
    email: patient.email,
    displayName: `${patient.givenName} ${patient.familyName}`,
    roles: ['patient'],
    siteIds: [],
    medicalDirector: false,
    student: false,
  });
  await tx.update(patients).set({ userId: id }).where(eq(patients.id, patientId));
  return id;
}
