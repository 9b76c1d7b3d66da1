import type { AppointmentItem } from '@shared/contracts/schedule-contract';
import { DEFAULT_BOOKING_WINDOW } from '@shared/scheduling/booking-window';
import { localDateAt } from '@shared/scheduling/wall-time';
import { formatMoney } from '@shared/units/money';
import { dateInWords, timeOf } from '../../ui/site-time/site-time';
import { isLate } from '../bookable-days';

const hours = DEFAULT_BOOKING_WINDOW.lateCancellationHours;

const amountOf = ({ amountMinor, currency }: NonNullable<AppointmentItem['charge']>): string =>
  formatMoney(amountMinor, currency);

/** What a session costs and until when it can be cancelled for free; null when nothing is paid for it. */
export function costWords(session: AppointmentItem, now: Date): string | null {
  const { charge, site } = session;
  if (charge === null) return null;
  const cost = charge.paid ? `You paid ${amountOf(charge)}.` : `You pay ${amountOf(charge)}.`;
  if (isLate(session, now)) return `${cost} It is too late to cancel for free.`;
  const last = new Date(Date.parse(session.startsAt) - hours * 3_600_000);
  const day = dateInWords(localDateAt(last, site.timeZone), 'long');
  return `${cost} You can cancel for free until ${day}, ${timeOf(last.toISOString(), site.timeZone)}.`;
}

/** What cancelling would cost, told before it is done. */
export function cancellationWords({ charge }: AppointmentItem, late: boolean): string {
  if (!late) {
    if (charge === null) return 'Cancelling costs you nothing.';
    const back = `Cancelling is free: you get your ${amountOf(charge)} back.`;
    return charge.paid ? back : `Cancelling is free: you will not pay the ${amountOf(charge)}.`;
  }
  const why = `The class starts in less than ${hours} hours.`;
  if (charge === null) return `${why} That is late to cancel, but it costs you nothing.`;
  return charge.paid
    ? `${why} If you cancel now, you do not get your ${amountOf(charge)} back.`
    : `${why} If you cancel now, you still pay ${amountOf(charge)}.`;
}

/** What is said once it is cancelled. */
export function cancelledWords({ charge, localDate }: AppointmentItem, late: boolean): string {
  const done = `Cancelled: ${dateInWords(localDate, 'long')}.`;
  if (charge === null) return done;
  if (late) return charge.paid ? done : `${done} You still pay ${amountOf(charge)}.`;
  return charge.paid ? `${done} Your ${amountOf(charge)} is on its way back.` : done;
}
