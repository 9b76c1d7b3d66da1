import type {
  ChangeEnrollmentRequest,
  Enrollment,
  EnrollmentStatus,
  openEnrollmentRequestSchema,
} from '@shared/contracts/patients-contract';
import type * as z from 'zod';
import type { Actor } from '../accounts/actor';
import type { Queryable, Transaction } from '../database/client';
import { fail } from '../http/failure';
import { endRangesOfCourse } from '../prescriptions/prescriptions-service';
import { listPatientAppointments } from '../schedule/appointments-queries';
import { fieldFailure } from './field-failure';
import { mayRead } from './patients-policy';
import { coursesOf, patientDates } from './patients-queries';
import { insertEnrollment, lockEnrollment, updateEnrollment } from './patients-repository';
import { presentEnrollment } from './present-patient';

/** Which status follows which; a course that ended stays ended, a new event opens the next. */
const next: Readonly<Record<EnrollmentStatus, readonly EnrollmentStatus[]>> = {
  active: ['on-hold', 'completed', 'discontinued'],
  'on-hold': ['active', 'completed', 'discontinued'],
  completed: [],
  discontinued: [],
};

async function present(db: Queryable, actor: Actor, patientId: string, enrollmentId: string) {
  const courses = await coursesOf(db, patientId);
  const course = courses.find(({ enrollment }) => enrollment.id === enrollmentId);
  if (!course) throw fail('not-found');
  return presentEnrollment(course, mayRead(actor, 'chart'));
}

/** Opens a course. @throws Failure `invalid-request`; on constraint `enrollments_one_active` while one runs */
export async function openEnrollment(
  tx: Transaction,
  actor: Actor,
  patientId: string,
  given: z.output<typeof openEnrollmentRequestSchema>,
  now: Date,
): Promise<Enrollment> {
  if (!actor.siteIds.includes(given.siteId)) {
    throw fieldFailure('siteId', 'not-yours', 'Choose one of your sites');
  }
  if (given.enrolledOn > (await patientDates(tx, patientId, now)).today) {
    throw fieldFailure('enrolledOn', 'future', 'Enter a date up to today');
  }
  const id = await insertEnrollment(tx, { ...given, patientId });
  return present(tx, actor, patientId, id);
}

/** Holds, resumes or ends a course, or corrects who pays. @throws Failure `stale-version`, `illegal-transition`, `not-found` */
export async function changeEnrollment(
  tx: Transaction,
  actor: Actor,
  patientId: string,
  enrollmentId: string,
  { version, ...change }: ChangeEnrollmentRequest,
  now: Date,
): Promise<Enrollment> {
  const course = await lockEnrollment(tx, patientId, enrollmentId);
  if (!course) throw fail('not-found');
  if (course.version !== version) throw fail('stale-version');
  if (
    change.status &&
    change.status !== course.status &&
    !next[course.status].includes(change.status)
  ) {
    throw fail('illegal-transition');
  }
  if (change.closedOn) await checkClosing(tx, patientId, course.enrolledOn, change.closedOn, now);
  await updateEnrollment(tx, enrollmentId, change);
  if (change.status && next[change.status].length === 0) {
    await endRangesOfCourse(tx, enrollmentId, now);
  }
  return present(tx, actor, patientId, enrollmentId);
}

const CLASSES_LOOKED_AT = 100;

async function checkClosing(
  tx: Transaction,
  patientId: string,
  enrolledOn: string,
  closedOn: string,
  now: Date,
): Promise<void> {
  const { today } = await patientDates(tx, patientId, now);
  if (closedOn > today) throw fieldFailure('closedOn', 'future', 'Enter a date up to today');
  if (closedOn < enrolledOn) {
    throw fieldFailure('closedOn', 'before-start', 'A course cannot end before it began');
  }
  const ask = {
    from: today,
    order: 'earliest-first',
    limit: CLASSES_LOOKED_AT,
    after: null,
  } as const;
  const ahead = await listPatientAppointments(tx, patientId, ask);
  const booked = ahead.filter(({ status }) => status === 'booked').length;
  if (booked === 0) return;
  const classes = booked === 1 ? 'class is' : 'classes are';
  throw fail('illegal-transition', {
    title: `${booked} ${classes} still booked. Cancel them first, then end the course.`,
  });
}
