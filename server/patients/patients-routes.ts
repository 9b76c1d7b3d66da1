import * as z from 'zod';
import {
  changeEnrollmentRequestSchema,
  changePatientRequestSchema,
  enrollmentSchema,
  openEnrollmentRequestSchema,
  patientSchema,
  patientSearchRequestSchema,
  patientSearchResponseSchema,
  registerPatientRequestSchema,
} from '@shared/contracts/patients-contract';
import {
  vitalsHistoryQuerySchema,
  vitalsHistoryResponseSchema,
} from '@shared/contracts/vitals-history-contract';
import { created, ok } from '../http/answers';
import { route } from '../http/route';
import { changeEnrollment, openEnrollment } from './enrollments-service';
import { chartRoles, registrarRoles, searchRoles } from './patients-policy';
import { changePatient, readPatient, registerPatient, search } from './patients-service';
import { recordEndingsRoutes } from './record-endings-routes';
import { recordRoutes } from './record-routes';
import { readVitals } from './vitals-service';

const patientParams = z.object({ id: z.uuid() });
const enrollmentParams = z.object({ id: z.uuid(), enrollmentId: z.uuid() });
const ofPatient = { patient: ({ params }: { params: { id: string } }) => params.id };

export const patientsRoutes = [
  route({
    method: 'post',
    path: '/api/patients/search',
    summary:
      'Patients by words of a name or number, each any beginning, by family name, given name and id',
    access: { roles: searchRoles },
    audit: {
      action: 'patients.searched',
      objectType: 'patient',
      details: ({ result }) => ({ shown: result.body.items.map(({ id }) => id) }),
    },
    request: { body: patientSearchRequestSchema },
    response: { 200: patientSearchResponseSchema },
    handler: async ({ tx, actor, input, context }) =>
      ok(await search(tx, actor, input.body, context.clock.now())),
  }),
  route({
    method: 'post',
    path: '/api/patients',
    summary: 'Registers a patient',
    access: { roles: registrarRoles },
    audit: {
      action: 'patient.registered',
      objectType: 'patient',
      objectId: ({ result }) => result.body.id,
      patientId: ({ result }) => result.body.id,
    },
    request: { body: registerPatientRequestSchema },
    response: { 201: patientSchema },
    handler: async ({ tx, actor, input, context }) =>
      created(await registerPatient(tx, actor, input.body, context.clock.now())),
  }),
  route({
    method: 'get',
    path: '/api/patients/:id',
    summary: 'A patient with the courses; the chart’s part is null for those who don’t read it',
    access: 'signed-in',
    ...ofPatient,
    audit: {
      action: 'patient.read',
      objectType: 'patient',
      objectId: ({ input }) => input.params.id,
      patientId: ({ input }) => input.params.id,
    },
    request: { params: patientParams },
    response: { 200: patientSchema },
    handler: async ({ tx, actor, input, context }) =>
      ok(await readPatient(tx, actor, input.params.id, context.clock.now())),
  }),
  route({
    method: 'patch',
    path: '/api/patients/:id',
    summary: 'Changes names and contacts; a patient changes the own time zone alone',
    access: { roles: [...registrarRoles, 'patient'] },
    ...ofPatient,
    audit: {
      action: 'patient.changed',
      objectType: 'patient',
      objectId: ({ input }) => input.params.id,
      patientId: ({ input }) => input.params.id,
      details: ({ input }) => ({ fields: Object.keys(input.body) }),
    },
    request: { params: patientParams, body: changePatientRequestSchema },
    response: { 200: patientSchema },
    handler: async ({ tx, actor, input, context }) =>
      ok(await changePatient(tx, actor, input.params.id, input.body, context.clock.now())),
  }),
  route({
    method: 'post',
    path: '/api/patients/:id/enrollments',
    summary: 'Opens a course',
    access: { roles: chartRoles },
    ...ofPatient,
    audit: {
      action: 'enrollment.opened',
      objectType: 'enrollment',
      objectId: ({ result }) => result.body.id,
      patientId: ({ input }) => input.params.id,
    },
    request: { params: patientParams, body: openEnrollmentRequestSchema },
    response: { 201: enrollmentSchema },
    constraints: { enrollments_one_active: 'already-enrolled' },
    handler: async ({ tx, actor, input, context }) =>
      created(await openEnrollment(tx, actor, input.params.id, input.body, context.clock.now())),
  }),
  route({
    method: 'patch',
    path: '/api/patients/:id/enrollments/:enrollmentId',
    summary: 'Holds, resumes or ends a course, or corrects who pays',
    access: { roles: chartRoles },
    ...ofPatient,
    audit: {
      action: 'enrollment.changed',
      objectType: 'enrollment',
      objectId: ({ input }) => input.params.enrollmentId,
      patientId: ({ input }) => input.params.id,
      details: ({ result }) => ({ status: result.body.status }),
    },
    request: { params: enrollmentParams, body: changeEnrollmentRequestSchema },
    response: { 200: enrollmentSchema },
    constraints: { enrollments_one_active: 'already-enrolled' },
    handler: async ({ tx, actor, input: { params, body }, context }) =>
      ok(
        await changeEnrollment(
          tx,
          actor,
          params.id,
          params.enrollmentId,
          body,
          context.clock.now(),
        ),
      ),
  }),
  route({
    method: 'get',
    path: '/api/patients/:id/vital-signs',
    summary: 'A patient’s sessions with their readings, the newest session first',
    access: { roles: chartRoles },
    ...ofPatient,
    audit: {
      action: 'vital-signs.read',
      objectType: 'patient',
      objectId: ({ input }) => input.params.id,
      patientId: ({ input }) => input.params.id,
    },
    request: { params: patientParams, query: vitalsHistoryQuerySchema },
    response: { 200: vitalsHistoryResponseSchema },
    handler: async ({ tx, input }) => ok(await readVitals(tx, input.params.id, input.query)),
  }),
  ...recordRoutes,
  ...recordEndingsRoutes,
];
