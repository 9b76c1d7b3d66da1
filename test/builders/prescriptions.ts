import type { Database } from '../../server/database/client';
import { prescriptions } from '../../server/database/schema';
import { buildUser } from './people';
import { answerTo, workedExample } from './prescription-request';

type NewPrescription = typeof prescriptions.$inferInsert;

/** The worked example, in force for a week by the specs' clock. */
export async function buildPrescription(
  database: Database,
  given: Partial<NewPrescription> & Pick<NewPrescription, 'patientId' | 'enrollmentId'>,
) {
  const signer = await buildUser(database, { roles: ['exercise-physiologist'] });
  const madeAt = new Date('2026-11-24T15:00:00Z');
  const result = answerTo();
  const [made] = await database
    .insert(prescriptions)
    .values({
      status: 'active',
      inputs: workedExample,
      result,
      policyVersion: result.policyVersion,
      engineVersion: result.engineVersion,
      createdAt: madeAt,
      createdBy: signer.id,
      signedAt: madeAt,
      signedBy: signer.id,
      activatedAt: madeAt,
      ...given,
    })
    .returning();
  if (!made) throw new Error('A builder made no row');
  return made;
}
