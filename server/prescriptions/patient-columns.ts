import { sql } from 'drizzle-orm';
import type { RangeCourse, RangePatient } from '@shared/contracts/prescriptions-worksheet-contract';
import { localDateAt } from '@shared/scheduling/wall-time';
import { ageOn } from '@shared/scheduling/age';

/** Whom a range is for and the course it belongs to, as columns of a query over `patients pt`, `sites s`, `enrollments e`. */
export const patientColumns = sql`
  json_build_object('id', pt.id, 'displayName', pt.given_name || ' ' || pt.family_name, 'recordNumber', pt.record_number,
    'birthDate', pt.birth_date, 'site', json_build_object('id', s.id, 'name', s.name, 'timeZone', s.time_zone)) AS patient,
  json_build_object('status', e.status, 'attended', e.attended, 'planned', e.planned_sessions,
    'diagnosis', e.qualifying_diagnosis, 'eventOn', e.qualifying_event_on) AS course`;

export interface PatientColumns extends Record<string, unknown> {
  readonly patient: Omit<RangePatient, 'ageYears'>;
  readonly course: RangeCourse;
}

/** The patient with the age at the site's date. */
export const withAge = (patient: PatientColumns['patient'], now: Date): RangePatient => ({
  ...patient,
  ageYears: ageOn(patient.birthDate, localDateAt(now, patient.site.timeZone)),
});
