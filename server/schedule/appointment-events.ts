import type { Price } from '@shared/contracts/schedule-contract';
import type { Transaction } from '../database/client';

/** An appointment with what others need to know of its class. */
export interface AppointmentFacts {
  readonly appointmentId: string;
  readonly classDateId: string;
  readonly patientId: string;
  readonly enrollmentId: string;
  readonly siteId: string;
  readonly className: string;
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly localDate: string;
  /** The site's IANA zone. */
  readonly timeZone: string;
  /** Set for a class that the patient pays. */
  readonly price: (Price & { readonly priceItemId: string }) | null;
}

/** What happened to a place, told inside the transaction in which it happens. */
export type AppointmentEvent =
  | {
      readonly type: 'booked';
      /** One, or every date of a series, earliest first. */
      readonly appointments: readonly [AppointmentFacts, ...AppointmentFacts[]];
    }
  | {
      readonly type: 'cancelled';
      readonly appointment: AppointmentFacts;
      /** By the program (a closure, an error struck out), not at the patient's wish. */
      readonly byProgram: boolean;
      /** Inside the window in which a cancellation counts as late. */
      readonly late: boolean;
    };

/** Who or what did it, and when. */
export interface AppointmentCause {
  /** Null for a job. */
  readonly actorId: string | null;
  readonly at: Date;
}

/**
 * A feature that acts when places are taken and given back: billing's charge, the reminder. It writes in the transaction that
 * it is given; what it throws undoes the booking. The composition root lists them, so that the schedule knows none by name.
 */
export type AppointmentListener = (
  tx: Transaction,
  event: AppointmentEvent,
  cause: AppointmentCause,
) => Promise<void>;
