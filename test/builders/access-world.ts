import { roles, type Role } from '@shared/contracts/accounts-contract';
import { appointments } from '../../server/database/schema';
import { agentFor, visitor, type Agent } from './agent';
import { buildProposal, buildSessionRecord } from './floor';
import { buildPatientWithAccount, buildSite, buildUser } from './people';
import { workedExample } from './prescription-request';
import { buildCharge } from './money';
import { buildClassDate, buildEnrollment } from './schedule';
import type { TestApp } from './test-app';

/** One patient's record, with one of everything that a route can name. */
export interface PatientRecord {
  readonly agent: Agent;
  readonly siteId: string;
  readonly patientId: string;
  readonly prescriptionId: string;
  readonly classDateId: string;
  readonly classTemplateId: string;
  readonly appointmentId: string;
  readonly chargeId: string;
  readonly sessionRecordId: string;
  readonly readingId: string;
  readonly proposalId: string;
}

type Site = Awaited<ReturnType<typeof buildSite>>;

export interface AccessWorld {
  readonly here: Site;
  readonly elsewhere: Site;
  readonly nobody: Agent;
  /** Someone whose account was disabled after they had signed in. */
  readonly disabled: Agent;
  /** A person of each role at the site of the records. */
  readonly at: Readonly<Record<Role, Agent>>;
  /** A person of each role who has nothing to do with the records. */
  readonly away: Readonly<Record<Role, Agent>>;
  readonly newRecord: () => Promise<PatientRecord>;
}

async function oneOfEach(house: TestApp, siteId: string): Promise<Record<Role, Agent>> {
  const { database } = house.context;
  const each = await Promise.all(
    roles.map(async (role) => {
      const user =
        role === 'patient'
          ? (await buildPatientWithAccount(database, { siteId })).user
          : await buildUser(database, { roles: [role], siteIds: [siteId] });
      return [role, await agentFor(house, user)] as const;
    }),
  );
  return Object.fromEntries(each) as Record<Role, Agent>;
}

async function buildRecord(house: TestApp, site: Site, clinician: Agent): Promise<PatientRecord> {
  const { database } = house.context;
  const { user, patient } = await buildPatientWithAccount(database, { siteId: site.id });
  const course = await buildEnrollment(database, { patientId: patient.id, siteId: site.id });
  const classDate = await buildClassDate(database, site);
  const [appointment] = await database
    .insert(appointments)
    .values({
      patientId: patient.id,
      enrollmentId: course.id,
      classDateId: classDate.id,
      localDate: classDate.localDate,
      startsAt: classDate.startsAt,
      endsAt: classDate.endsAt,
      createdBy: user.id,
      monitored: true,
    })
    .returning();
  const charge = await buildCharge(database, { patientId: patient.id });
  const drafted = await clinician
    .post(`/api/patients/${patient.id}/prescriptions`)
    .send({ inputs: workedExample })
    .expect(201);
  const visit = {
    appointmentId: appointment?.id ?? '',
    patientId: patient.id,
    recordedBy: user.id,
  };
  const { record, reading } = await buildSessionRecord(database, visit);
  const prescriptionId = (drafted.body as { id: string }).id;
  const proposalId = await buildProposal(database, { ...visit, record: record.id, prescriptionId });
  return {
    agent: await agentFor(house, user),
    siteId: site.id,
    patientId: patient.id,
    prescriptionId,
    classDateId: classDate.id,
    classTemplateId: classDate.templateId,
    appointmentId: appointment?.id ?? '',
    chargeId: charge.id,
    sessionRecordId: record.id,
    readingId: reading.id,
    proposalId,
  };
}

/** Two sites and people of every kind at each. */
export async function buildAccessWorld(house: TestApp): Promise<AccessWorld> {
  const { database } = house.context;
  const [here, elsewhere] = [await buildSite(database), await buildSite(database)];
  const leaver = await buildUser(database, { roles: [...roles], siteIds: [here.id] });
  const disabled = await agentFor(house, leaver);
  await database.$client.query('UPDATE users SET disabled_at = now() WHERE id = $1', [leaver.id]);
  const at = await oneOfEach(house, here.id);
  return {
    here,
    elsewhere,
    nobody: await visitor(house),
    disabled,
    at,
    away: await oneOfEach(house, elsewhere.id),
    newRecord: () => buildRecord(house, here, at['exercise-physiologist']),
  };
}
