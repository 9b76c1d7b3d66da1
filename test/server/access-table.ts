import { v7 as uuidv7 } from 'uuid';
import { staffRoles, type Role } from '@shared/contracts/accounts-contract';
import { recordKinds } from '@shared/contracts/record-contract';
import type { PatientRecord } from '../builders/access-world';
import { boutBody, readingBody, recordBody } from '../builders/floor';
import { workedExample } from '../builders/prescription-request';

/**
 * Who may call what, written down apart from the routes themselves: the specification that
 * access-matrix.spec.ts holds every mounted route against. A new route needs its row here.
 */
export interface AccessRow {
  readonly who: 'anyone' | 'signed-in' | readonly Role[];
  /**
   * A whole and valid call on something that belongs to one patient or one site: whoever has no business there is
   * answered 404. `id` takes the place of `:id`.
   */
  readonly record?: (record: PatientRecord) => { id?: string; query?: string; body?: object };
  /** A list is not refused to people without a relation: it leaves out what is not theirs. */
  readonly strangers?: 200;
  /** Roles that act for every site. */
  readonly everySite?: readonly Role[];
  /** Roles whose own business it is, but not in this state. */
  readonly notNow?: readonly Role[];
  /** The record is the patient's whom the path names, and the route leaves it to the house to check that. */
  readonly guarded?: true;
  /** Why the route concerns no record. */
  readonly none?: string;
}

const administrator: readonly Role[] = ['administrator'];
const booking: readonly Role[] = ['front-desk', 'nurse', 'exercise-physiologist'];
const prescribing: readonly Role[] = ['exercise-physiologist', 'physician', 'nurse'];
const signing: readonly Role[] = ['exercise-physiologist', 'physician'];
const chart: readonly Role[] = ['nurse', 'exercise-physiologist', 'physician'];
const takingPayments: readonly Role[] = ['front-desk', 'director'];
const floor: readonly Role[] = ['nurse', 'exercise-physiologist'];
const planning: readonly Role[] = ['front-desk', 'administrator'];

const measures: readonly Role[] = ['director', 'physician', 'exercise-physiologist'];
const years = '?from=2026-01-01&to=2027-01-01';

const ownAccount = { none: 'one’s own account, or none yet' } as const;
const accounts = { who: administrator, none: 'accounts are the whole program’s' } as const;
const sitePlan = { who: planning, everySite: administrator } as const;
const timetable = { none: 'the timetable names no patient' } as const;

const template = {
  name: 'Morning class',
  kind: 'exercise',
  recurrence: 'FREQ=WEEKLY;BYDAY=MO',
  startsOn: '2026-12-07',
  endsOn: null,
  localStart: '09:00',
  durationMinutes: 60,
  capacity: 12,
  monitoredPlaces: 6,
  priceItemId: null,
};

export const accessTable: Readonly<Record<string, AccessRow>> = {
  'GET /api/health': { who: 'anyone', none: 'tells nothing of anybody' },
  'GET /api/openapi.json': { who: staffRoles, none: 'tells nothing of anybody' },

  'GET /api/events': { who: 'signed-in', none: 'ids alone, of records that one may open' },

  'GET /api/auth/session': { who: 'anyone', ...ownAccount },
  'POST /api/auth/sign-in': { who: 'anyone', ...ownAccount },
  'POST /api/auth/sign-out': { who: 'anyone', ...ownAccount },
  'POST /api/auth/forgotten-password': { who: 'anyone', ...ownAccount },
  'POST /api/auth/password': { who: 'anyone', ...ownAccount },
  'POST /api/auth/first-administrator': { who: 'anyone', ...ownAccount },
  'POST /api/auth/change-password': { who: 'signed-in', ...ownAccount },

  'GET /api/users': accounts,
  'GET /api/users/:id': accounts,
  'POST /api/users': accounts,
  'PATCH /api/users/:id': accounts,
  'POST /api/users/:id/invitation': accounts,
  'DELETE /api/users/:id/sessions': accounts,
  'POST /api/patients/search': {
    who: staffRoles,
    strangers: 200,
    record: () => ({ body: { q: '' } }),
  },
  'POST /api/patients': { who: [...chart, 'front-desk', 'administrator'], none: 'makes a record' },
  'GET /api/patients/:id': {
    who: 'signed-in',
    record: ({ patientId }) => ({ id: patientId }),
  },
  'PATCH /api/patients/:id': {
    who: [...chart, 'front-desk', 'administrator', 'patient'],
    record: ({ patientId }) => ({
      id: patientId,
      body: { version: 1, timeZone: 'America/Chicago' },
    }),
  },
  'POST /api/patients/:id/enrollments': { who: chart, guarded: true },
  'PATCH /api/patients/:id/enrollments/:enrollmentId': { who: chart, guarded: true },
  'GET /api/patients/:id/vital-signs': {
    who: chart,
    record: ({ patientId }) => ({ id: patientId }),
  },
  'GET /api/patients/:id/record': {
    who: chart,
    record: ({ patientId }) => ({ id: patientId }),
  },
  'POST /api/patients/:id/record': { who: chart, guarded: true },
  ...Object.fromEntries(
    recordKinds.flatMap((kind) => [
      [`POST /api/patients/:id/record/${kind}`, { who: chart, guarded: true }],
      [
        `POST /api/patients/:id/record/${kind}/:entryId/entered-in-error`,
        { who: chart, guarded: true },
      ],
    ]),
  ),
  'POST /api/patients/:id/record/medications/:entryId/stop': { who: chart, guarded: true },
  'POST /api/patients/:id/record/thresholds/:entryId/retire': {
    who: ['physician'],
    guarded: true,
  },
  'POST /api/patients/:id/record/thresholds/:entryId/supersede': { who: chart, guarded: true },
  'POST /api/patients/:id/record/restrictions/:entryId/lift': { who: chart, guarded: true },
  'POST /api/patients/:id/record/questionnaires/:entryId/close-follow-up': {
    who: chart,
    guarded: true,
  },
  'GET /api/follow-ups': { who: chart, strangers: 200, record: () => ({}) },

  'POST /api/patients/:id/invitation': {
    who: ['front-desk', 'nurse', 'administrator'],
    record: ({ patientId }) => ({ id: patientId }),
  },

  'GET /api/sites': { who: 'signed-in', none: 'names of sites alone' },
  'GET /api/settings/sites': { who: administrator, none: 'addresses of sites alone' },
  'GET /api/audit': { who: administrator, none: 'the audit is the whole program’s' },
  'GET /api/policy': {
    who: [...signing, 'administrator'],
    none: 'the policy is the whole program’s',
  },
  'GET /api/policy/versions': {
    who: [...signing, 'administrator'],
    none: 'the policy is the whole program’s',
  },
  'POST /api/policy/preview': {
    who: ['physician', 'administrator'],
    none: 'counts of the whole program; names of one’s own records alone, which policy-publishing.spec holds',
  },
  'POST /api/policy/versions': {
    who: ['physician', 'administrator'],
    none: 'the policy is the whole program’s',
  },
  'POST /api/sites': { who: administrator, none: 'names of sites alone' },
  'PUT /api/sites/:id': { who: administrator, none: 'names of sites alone' },

  'POST /api/prescriptions/evaluate': { who: prescribing, none: 'stores and reads nothing' },
  'GET /api/patients/:id/prescriptions': {
    who: prescribing,
    record: ({ patientId }) => ({ id: patientId }),
  },
  'POST /api/patients/:id/prescriptions': {
    who: prescribing,
    record: ({ patientId }) => ({ id: patientId, body: { inputs: workedExample } }),
  },
  'GET /api/prescriptions/:id': {
    who: prescribing,
    record: ({ prescriptionId }) => ({ id: prescriptionId }),
  },
  'PUT /api/prescriptions/:id': {
    who: prescribing,
    record: ({ prescriptionId }) => ({
      id: prescriptionId,
      body: { inputs: workedExample, version: 1 },
    }),
  },
  'POST /api/prescriptions/:id/sign': {
    who: signing,
    record: ({ prescriptionId }) => ({ id: prescriptionId, body: { version: 1 } }),
  },
  'POST /api/prescriptions/:id/revoke': {
    who: signing,
    record: ({ prescriptionId }) => ({ id: prescriptionId, body: { version: 1 } }),
  },

  'GET /api/patients/:id/worksheet': {
    who: prescribing,
    record: ({ patientId }) => ({ id: patientId }),
  },
  'GET /api/prescriptions/awaiting-signature': {
    who: ['physician'],
    strangers: 200,
    record: () => ({}),
  },
  'GET /api/prescriptions/tasks': { who: prescribing, strangers: 200, record: () => ({}) },
  'GET /api/my/range': { who: ['patient'], none: 'one’s own range alone' },
  'GET /api/my/range.pdf': { who: ['patient'], none: 'one’s own range alone' },
  'GET /api/patients/:id/range.pdf': { who: chart, guarded: true },
  'GET /api/my/progress': { who: ['patient'], none: 'one’s own course alone' },

  'GET /api/reports/completion': {
    who: measures,
    strangers: 200,
    record: () => ({ query: years }),
  },
  'GET /api/reports/completion.csv': {
    who: measures,
    strangers: 200,
    record: () => ({ query: years }),
  },
  'GET /api/reports/completion/patients': {
    who: measures,
    strangers: 200,
    record: () => ({ query: `${years}&part=enrolled` }),
  },
  'GET /api/reports/settings': {
    who: [...measures, 'administrator'],
    none: 'a definition is the whole program’s',
  },
  'PUT /api/reports/settings': {
    who: ['director', 'administrator'],
    none: 'a definition is the whole program’s',
  },

  'GET /api/class-dates': { who: 'signed-in', ...timetable },
  'GET /api/class-dates/:id': { who: 'signed-in', ...timetable },
  'GET /api/class-dates/:id/appointments': {
    who: [...booking, 'physician'],
    strangers: 200,
    record: ({ classDateId }) => ({ id: classDateId }),
  },
  'GET /api/appointments': {
    who: [...booking, 'physician', 'patient'],
    record: ({ patientId }) => ({ query: `?patientId=${patientId}` }),
  },
  'POST /api/appointments': {
    who: [...booking, 'patient'],
    record: ({ classDateId, patientId }) => ({ body: { classDateId, patientId } }),
  },
  'PATCH /api/appointments/:id': {
    who: [...booking, 'patient', 'administrator'],
    notNow: ['administrator'],
    record: ({ appointmentId }) => ({
      id: appointmentId,
      body: { status: 'cancelled', version: 1 },
    }),
  },
  'POST /api/appointments/series/preview': {
    who: booking,
    record: ({ patientId, siteId }) => ({
      body: {
        patientId,
        siteId,
        weekdays: [1],
        startTime: '09:00',
        from: '2026-12-07',
        count: 1,
      },
    }),
  },
  'POST /api/appointments/series': {
    who: booking,
    record: ({ patientId, classDateId }) => ({
      body: { patientId, classDateIds: [classDateId] },
    }),
  },
  'GET /api/class-templates': {
    ...sitePlan,
    record: ({ siteId }) => ({ query: `?siteId=${siteId}` }),
  },
  'POST /api/class-templates': {
    ...sitePlan,
    record: ({ siteId }) => ({ body: { siteId, ...template } }),
  },
  'PUT /api/class-templates/:id': {
    ...sitePlan,
    record: ({ classTemplateId }) => ({ id: classTemplateId, body: { ...template, version: 1 } }),
  },
  'GET /api/closures': {
    ...sitePlan,
    record: ({ siteId }) => ({ query: `?siteId=${siteId}&from=2026-12-01` }),
  },
  'POST /api/closures': {
    ...sitePlan,
    record: ({ siteId }) => ({
      body: { siteId, localDate: '2026-12-24', reason: 'Holiday' },
    }),
  },
  'GET /api/charges': {
    who: [...takingPayments, 'patient'],
    record: ({ patientId }) => ({ query: `?patientId=${patientId}` }),
  },
  'GET /api/charges/:id': {
    who: [...takingPayments, 'patient'],
    record: ({ chargeId }) => ({ id: chargeId }),
  },
  'POST /api/charges/:id/checkout': {
    who: ['front-desk', 'patient'],
    record: ({ chargeId }) => ({ id: chargeId, body: { amountMinor: 2500, currency: 'USD' } }),
  },
  'GET /api/desk/today': { who: ['front-desk'], strangers: 200, record: () => ({}) },
  'GET /api/billing/charges/:id': {
    who: takingPayments,
    record: ({ chargeId }) => ({ id: chargeId }),
  },
  'POST /api/billing/charges': {
    who: takingPayments,
    strangers: 200,
    record: () => ({ body: {} }),
  },
  'GET /api/my/calendar-link': { who: ['patient'], none: 'one’s own calendar alone' },
  'POST /api/my/calendar-link': { who: ['patient'], none: 'one’s own calendar alone' },
  'GET /api/calendar/:token.ics': { who: 'anyone', none: 'the token decides' },
  'GET /api/my/message-preferences': { who: ['patient'], none: 'one’s own wishes alone' },
  'PUT /api/my/message-preferences': { who: ['patient'], none: 'one’s own wishes alone' },
  'GET /api/unsubscribe/:token': { who: 'anyone', none: 'leads to a page' },
  'POST /api/unsubscribe/:token': { who: 'anyone', none: 'the token decides' },
  'POST /api/messages/undelivered': {
    who: takingPayments,
    strangers: 200,
    record: () => ({ body: {} }),
  },
  'POST /api/payments/webhook': { who: 'anyone', none: 'the signature decides' },
  'DELETE /api/closures/:id': { who: planning, ...timetable },

  'GET /api/class-dates/:id/roster': {
    who: chart,
    record: ({ classDateId }) => ({ id: classDateId }),
  },
  'GET /api/class-dates/:id/roster/stamp': { who: chart, none: 'counts, and nobody’s' },
  'GET /api/session-records/:id': {
    who: chart,
    record: ({ sessionRecordId }) => ({ id: sessionRecordId }),
  },
  'PUT /api/session-records/:id': {
    who: floor,
    record: ({ appointmentId }) => ({ id: uuidv7(), body: recordBody(appointmentId) }),
  },
  'POST /api/session-records/:id/sign': {
    who: floor,
    record: ({ sessionRecordId }) => ({ id: sessionRecordId }),
  },
  'PUT /api/appointments/:id/missed-dose': {
    who: floor,
    record: ({ appointmentId }) => ({ id: appointmentId, body: { missed: true } }),
  },
  'PUT /api/exercise-bouts/:id': {
    who: floor,
    record: ({ sessionRecordId }) => ({ id: uuidv7(), body: boutBody(sessionRecordId) }),
  },
  'GET /api/patients/:id/course-so-far': { who: chart, guarded: true },
  'POST /api/progression-proposals/:id/decision': {
    who: signing,
    record: ({ proposalId }) => ({
      id: proposalId,
      body: { decision: 'dismissed', reason: 'Tired' },
    }),
  },
  'PUT /api/vital-signs/:id': {
    who: floor,
    record: ({ sessionRecordId }) => ({ id: uuidv7(), body: readingBody(sessionRecordId) }),
  },
  'POST /api/vital-signs/:id/amendments': {
    who: floor,
    record: ({ readingId }) => ({
      id: readingId,
      body: { id: uuidv7(), reason: 'Digits swapped', heartRate: 96 },
    }),
  },
};
