import { anginaInClass, canTurn, seatedAfter, turned } from './chart';
import { atSite, workday } from './charting';
import type { Clock } from './clock';
import type { Course, Visit } from './courses';
import { isoOf, minutesLater } from './days';
import { idAt } from './dice';
import { daysToMaintenance } from './plans';
import type { FollowedPerson } from './plans';
import { isMonitored } from './people';
import { siteId } from './program';
import { prescriptionRows, rangeAt } from './ranges';
import type { RangeOwner } from './ranges';
import { writeAnginaInClass, writeDiagnosis, writeIntake, writeRestingRates } from './record-rows';
import { passTime, reviewAtReturn, writeRange } from './reviews';
import type { PeopleRows } from './rows';
import { beginTelling, scribeAt } from './telling';
import type { Telling } from './telling';
import { writeAppointment, writeSession } from './visit-rows';
import type { Visitor } from './visit-rows';

/** Places beside the plan: for no-shows, which keep theirs, and for classes that people pay themselves. */
const placesToSpare = 10;
const placesForExtras = 16;

function refer({ person, rows, patientId, userId, crew, clock }: Telling, at: Date): void {
  rows.patients.push({
    id: patientId,
    recordNumber: `HL-${1001 + person.index}`,
    familyName: person.familyName,
    givenName: person.givenName,
    birthDate: isoOf(person.birthDay),
    sexAtBirth: person.sex,
    email: person.email,
    phone: person.phone,
    timeZone: null,
    siteId: siteId(person.site, clock.anchor),
    userId,
    version: 1,
    createdAt: at,
  });
  const scribe = { personKey: person.key, patientId, by: crew.desk, at };
  writeDiagnosis(rows, scribe, person.situation.diagnosis, person.eventOn);
}

function writeEnrollment(telling: Telling, course: Course, at: Date): string {
  const { plan } = course;
  const id = idAt(at, plan.key, 'course');
  const { plannedSessions } = plan.fate;
  telling.rows.enrollments.push({
    id,
    patientId: telling.patientId,
    siteId: siteId(telling.person.site, telling.clock.anchor),
    phase: plan.phase,
    status: course.status,
    qualifyingDiagnosis: plan.diagnosis,
    qualifyingEventOn: isoOf(plan.eventOn),
    payer: plan.phase === 3 ? 'Self-pay' : telling.person.payer,
    enrolledOn: isoOf(plan.enrolledOn),
    closedOn: course.closing ? isoOf(course.closing.on) : null,
    closedReason: course.closing?.reason ?? null,
    plannedSessions,
    sessionLimit: plannedSessions + placesToSpare + (plan.extraClass ? placesForExtras : 0),
    dailyLimit: 2,
    monitored: plan.phase === 2 && isMonitored(telling.person),
    version: 1 + course.changes,
    createdAt: at,
  });
  return id;
}

/** Intake with its first range; a second course begins from the record of the first. */
function enroll(telling: Telling, course: Course, at: Date): void {
  const { plan } = course;
  const { site } = telling.person;
  if (plan.phase === 3) {
    telling.nextRange = null;
    return;
  }
  telling.rangesBefore = telling.ranges.length;
  telling.firstSession = null;
  if (telling.ranges.length === 0) {
    const { anchor } = telling.clock;
    writeIntake(telling.rows, scribeAt(telling, at), telling.chart, plan.enrolledOn, anchor);
  } else {
    const scribe = scribeAt(telling, at);
    const seated = seatedAfter(telling.chart, telling.attended);
    writeDiagnosis(telling.rows, scribe, plan.diagnosis, plan.eventOn);
    writeRestingRates(telling.rows, scribe, telling.chart, seated, plan.enrolledOn, [3, 1, 0]);
    const { test } = telling.chart.facts;
    const facts = { ...telling.chart.facts, test: test && { ...test, eventSince: true } };
    telling.chart = { ...telling.chart, facts };
    telling.changedOn = plan.eventOn;
  }
  writeRange(telling, plan.enrolledOn, atSite(site, plan.enrolledOn, workday.range));
}

/** Angina comes in the first class on or after its day, and with it a threshold and a new range. */
function anginaDue({ person, turnDone, chart }: Telling, course: Course, visit: Visit): boolean {
  const { turn } = person.fate;
  return (
    !turnDone &&
    turn?.kind === 'angina in class' &&
    canTurn(chart, turn) &&
    visit.state === 'attended' &&
    visit.day >= course.plan.enrolledOn + turn.afterDays
  );
}

function noteAngina(telling: Telling, visit: Visit): void {
  const at = minutesLater(visit.endsAt, 12);
  writeAnginaInClass(telling.rows, scribeAt(telling, at), telling.chart, visit.day);
  telling.chart = turned(telling.chart, 'angina in class', visit.day);
  telling.turnDone = true;
  telling.withdrawal = { at, reason: 'threshold' };
  telling.nextRange = { on: visit.day + 1, afterChange: true };
}

function attend(telling: Telling, course: Course, visit: Visit, visitor: Visitor): void {
  const angina = anginaDue(telling, course, visit);
  const ranges = telling.ranges.slice(telling.rangesBefore);
  const range = rangeAt(ranges, visit.startsAt, telling.withdrawal);
  const anginaAt = angina ? anginaInClass(telling.chart).heartRate : null;
  const readings = writeSession(telling.rows, visit, visitor, telling.chart, range, anginaAt);
  if (visit.state !== 'attended') return;
  telling.attended++;
  telling.firstSession ??= visit.day;
  telling.lastSession = visit.day;
  for (const { phase, status, heartRate, perceivedExertion } of readings) {
    if (phase !== 'exercise' || status === 'amended' || !heartRate || !perceivedExertion) continue;
    telling.readings.push({
      visit: visit.key,
      day: visit.day,
      heartRate,
      effort: perceivedExertion,
    });
  }
  if (angina) noteAngina(telling, visit);
}

/** A range ends with its course, unless the person goes on in the maintenance class. */
function rangesEnd(telling: Telling, course: Course, next: Course | undefined): Date | null {
  if (next?.plan.phase === 3) return next.closing?.at ?? null;
  const { closing } = course;
  if (!closing || closing.status !== 'completed' || !telling.person.fate.maintenance) {
    return closing?.at ?? null;
  }
  const undecided = telling.clock.today(telling.person.site) <= closing.on + daysToMaintenance;
  return undecided ? null : closing.at;
}

/** Writes down the ranges from one on, which end at a moment; null: the last one stays in force. */
function endRanges(telling: Telling, from: number, owner: RangeOwner, endsAt: Date | null): void {
  const issued = telling.ranges.slice(from);
  telling.rows.prescriptions.push(...prescriptionRows(issued, owner, endsAt, telling.clock.now));
}

/** A range ends with its course: who comes back to a course that was closed begins with another. */
function comeBack(telling: Telling, { plan, pause }: Course, from: number, owner: RangeOwner) {
  if (!pause) return;
  passTime(telling, plan, pause.at);
  endRanges(telling, from, owner, pause.at);
  telling.rangesBefore = telling.ranges.length;
  telling.withdrawal = null;
  reviewAtReturn(telling, pause.back);
}

function tellVisits(telling: Telling, course: Course, visits: readonly Visit[], visitor: Visitor) {
  for (const visit of visits) {
    writeAppointment(telling.rows, visit, visitor, telling.clock);
    if (visit.state !== 'attended' && visit.state !== 'held') continue;
    passTime(telling, course.plan, atSite(telling.person.site, visit.day + 1, 0));
    attend(telling, course, visit, visitor);
  }
}

function tellCourse(telling: Telling, course: Course, next: Course | undefined): void {
  const { plan, pause, visits } = course;
  const { clock, patientId, crew, userId } = telling;
  const at = atSite(telling.person.site, plan.enrolledOn, workday.intake);
  if (at > clock.now) return;
  const enrollmentId = writeEnrollment(telling, course, at);
  const { physiologist, physician } = crew;
  const owner = { patientId, enrollmentId, physiologist, physician };
  const firstRange = telling.ranges.length;
  enroll(telling, course, at);
  const monitored = plan.phase === 2 && isMonitored(telling.person);
  const visitor = { patientId, enrollmentId, userId, monitored, crew };
  const before = visits.filter(({ day }) => !pause || day < pause.back);
  tellVisits(telling, course, before, visitor);
  comeBack(telling, course, firstRange, owner);
  tellVisits(telling, course, visits.slice(before.length), visitor);
  passTime(telling, plan, course.closing?.at ?? clock.now);
  const sinceReturn = pause ? telling.rangesBefore : firstRange;
  endRanges(telling, sinceReturn, owner, rangesEnd(telling, course, next));
}

/** Tells one person's story to where the clock stands. */
export function tellPerson({ person, courses }: FollowedPerson, clock: Clock): PeopleRows | null {
  const telling = beginTelling(person, clock);
  const referredAt = atSite(person.site, person.referredOn, workday.referral);
  if (referredAt > clock.now) return null;
  refer(telling, referredAt);
  courses.forEach((course, each) => tellCourse(telling, course, courses[each + 1]));
  return telling.rows;
}
