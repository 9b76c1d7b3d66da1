import type { Chart } from './chart';
import type { Crew } from './charting';
import type { Clock } from './clock';
import type { Visit } from './courses';
import { isoOf, minutesLater } from './days';
import { dice, idAt } from './dice';
import { writeMoney } from './money-rows';
import { templateId } from './program';
import type { StandingRange } from './ranges';
import type { RowOf } from './row-of';
import type { PeopleRows } from './rows';
import { vitalRows } from './vitals';

/** Whose visit it is. */
export interface Visitor {
  readonly patientId: string;
  readonly enrollmentId: string;
  readonly userId: string | null;
  readonly monitored: boolean;
  readonly crew: Crew;
}

/** How often each status has been reached from `booked`: it is the row's version less one. */
const changesTo = { booked: 0, cancelled: 1, noshow: 1, held: 3, attended: 3 } as const;
const statusOf = {
  booked: 'booked',
  cancelled: 'cancelled',
  noshow: 'noshow',
  held: 'fulfilled',
  attended: 'fulfilled',
} as const;

export const appointmentId = (visit: Visit): string => idAt(visit.bookedAt, visit.key, 'place');

export function writeAppointment(
  rows: PeopleRows,
  visit: Visit,
  visitor: Visitor,
  clock: Clock,
): void {
  const came = visit.state === 'attended' || visit.state === 'held';
  const early = dice(visit.key, 'door').whole(4, 14);
  rows.appointments.push({
    id: appointmentId(visit),
    templateId: templateId(visit.classKey, clock.anchor),
    localDate: isoOf(visit.day),
    patientId: visitor.patientId,
    enrollmentId: visitor.enrollmentId,
    status: statusOf[visit.state],
    monitored: visitor.monitored && !visit.selfPay,
    exercised: visit.state !== 'held',
    version: 1 + changesTo[visit.state],
    createdAt: visit.bookedAt,
    createdBy: visitor.userId ?? visitor.crew.desk,
    arrivedAt: came ? minutesLater(visit.startsAt, -early) : null,
    checkedInAt: came ? minutesLater(visit.startsAt, 2 - early) : null,
    cancelledAt: visit.cancelledAt,
    cancelledBy: visit.cancelledAt ? visitor.crew.desk : null,
    cancelledReason: visit.cancelledReason,
  });
  if (visit.selfPay) {
    writeMoney(
      rows,
      visit,
      {
        patientId: visitor.patientId,
        appointmentId: appointmentId(visit),
        payer: visitor.userId ?? visitor.crew.desk,
        owesLast: visitor.userId !== null,
      },
      clock,
    );
  }
}

/** The signed record of a visit that took place, with its readings. */
export function writeSession(
  rows: PeopleRows,
  visit: Visit,
  visitor: Visitor,
  chart: Chart,
  range: StandingRange | null,
  anginaAt: number | null,
): RowOf<'vitalSigns'>[] {
  const startedAt = minutesLater(visit.startsAt, 1);
  const recordId = idAt(startedAt, visit.key, 'record');
  const { nurse } = visitor.crew;
  rows.sessionRecords.push({
    id: recordId,
    appointmentId: appointmentId(visit),
    patientId: visitor.patientId,
    startedAt,
    prescriptionId: range?.id ?? null,
    rangeWithdrawn: [...(range?.withdrawn ?? [])],
    identityConfirmedWith: ['name', 'birth-date'],
    receivedAt: minutesLater(startedAt, 0.1),
    recordedBy: nurse,
    signedAt: minutesLater(visit.endsAt, 4 + (visit.day % 30)),
    signedBy: nurse,
    exercised: visit.state === 'attended',
  });
  const readings = vitalRows({
    visit,
    chart,
    prescriptionId: range?.id ?? null,
    answer: range?.answer ?? null,
    recordId,
    patientId: visitor.patientId,
    nurse,
    anginaAt,
  });
  rows.vitalSigns.push(...readings);
  return readings;
}
