import { emptyRecord } from './record-entries';
import type { RecordRows } from './record-entries';
import type { RowOf } from './row-of';

/** An appointment by its class and day: the class date's id is the database's, whoever made it. */
export type AppointmentRow = Omit<
  RowOf<'appointments'>,
  'classDateId' | 'localDate' | 'startsAt' | 'endsAt'
> & { readonly templateId: string; readonly localDate: string };

/** Everything about the people, in the order in which tables may be filled. */
export interface PeopleRows extends RecordRows {
  readonly patients: RowOf<'patients'>[];
  readonly enrollments: RowOf<'enrollments'>[];
  readonly prescriptions: RowOf<'prescriptions'>[];
  readonly appointments: AppointmentRow[];
  readonly sessionRecords: RowOf<'sessionRecords'>[];
  readonly vitalSigns: RowOf<'vitalSigns'>[];
  readonly charges: RowOf<'charges'>[];
  readonly payments: RowOf<'payments'>[];
  readonly ledgerEntries: RowOf<'ledgerEntries'>[];
}

export const noRows = (): PeopleRows => ({
  patients: [],
  enrollments: [],
  ...emptyRecord(),
  prescriptions: [],
  appointments: [],
  sessionRecords: [],
  vitalSigns: [],
  charges: [],
  payments: [],
  ledgerEntries: [],
});
