import type { Test } from 'supertest';
import type { Role } from '@shared/contracts/accounts-contract';
import type { PrescriptionRequestInput } from '@shared/contracts/prescriptions-contract';
import { agentFor, type Agent } from './agent';
import { buildPatient, buildPatientWithAccount, buildSite, buildUser } from './people';
import { workedExample } from './prescription-request';
import { buildEnrollment } from './schedule';
import type { TestApp } from './test-app';

export type Site = Awaited<ReturnType<typeof buildSite>>;

/** Someone of a role at a site, signed in. */
export async function buildStaff(house: TestApp, siteId: string, role: Role, student = false) {
  const user = await buildUser(house.context.database, {
    roles: [role],
    siteIds: [siteId],
    student,
  });
  return { ...user, agent: await agentFor(house, user) };
}

/** A site with one of each who has to do with ranges. */
export async function buildPrescribers(house: TestApp) {
  const site = await buildSite(house.context.database);
  return {
    site,
    physiologist: await buildStaff(house, site.id, 'exercise-physiologist'),
    physician: await buildStaff(house, site.id, 'physician'),
    nurse: await buildStaff(house, site.id, 'nurse'),
  };
}

/** A patient in an active course, without a range. */
export async function buildCourse(house: TestApp, site: Site) {
  const { database } = house.context;
  const patient = await buildPatient(database, { siteId: site.id });
  const course = await buildEnrollment(database, { patientId: patient.id, siteId: site.id });
  return { patientId: patient.id, enrollmentId: course.id };
}

/** A patient in an active course, signed in. */
export async function buildOwnCourse(house: TestApp, site: Site) {
  const { database } = house.context;
  const { user, patient } = await buildPatientWithAccount(database, { siteId: site.id });
  const course = await buildEnrollment(database, { patientId: patient.id, siteId: site.id });
  const agent = await agentFor(house, user);
  return { patientId: patient.id, enrollmentId: course.id, agent };
}

export interface Draft {
  readonly id: string;
  readonly version: number;
}

export async function draftOf(
  agent: Agent,
  patientId: string,
  inputs: PrescriptionRequestInput = workedExample,
): Promise<Draft> {
  const reply = await agent
    .post(`/api/patients/${patientId}/prescriptions`)
    .send({ inputs })
    .expect(201);
  return reply.body as Draft;
}

export const signOf = (agent: Agent, { id, version }: Draft): Test =>
  agent.post(`/api/prescriptions/${id}/sign`).send({ version });
