import type { Charge } from '@shared/contracts/billing-contract';
import { formatMoney } from '@shared/units/money';

type Tone = 'in' | 'over' | 'due' | 'plain';

/** A charge's state in words, with the tone that goes with it. */
export interface ChargeState {
  readonly words: string;
  readonly tone: Tone;
}

export const amountOf = ({ amountMinor, currency }: Charge): string =>
  formatMoney(amountMinor, currency);

/** `Monday, December 7, 9:00 AM`, by the class's own clock. */
export function classTime({ appointment }: Charge): string | null {
  if (appointment === null) return null;
  return new Intl.DateTimeFormat('en-US', {
    weekday: 'long',
    month: 'long',
    day: 'numeric',
    hour: 'numeric',
    minute: '2-digit',
    timeZone: appointment.timeZone,
  }).format(new Date(appointment.startsAt));
}

/** `Dec 7, 2026`, in the class's zone, else in the reader's own. */
export function dayOf(instant: string, { appointment }: Pick<Charge, 'appointment'>): string {
  return new Intl.DateTimeFormat('en-US', {
    dateStyle: 'medium',
    ...(appointment && { timeZone: appointment.timeZone }),
  }).format(new Date(instant));
}

/** `Dec 7, 2026, 9:00 AM`, in the class's zone, else in the reader's own. */
export function momentOf(instant: string, { appointment }: Pick<Charge, 'appointment'>): string {
  const format = new Intl.DateTimeFormat('en-US', {
    dateStyle: 'medium',
    timeStyle: 'short',
    ...(appointment && { timeZone: appointment.timeZone }),
  });
  // Newer runtimes put a narrow no-break space before AM and PM, which our font does not hold.
  return format.format(new Date(instant)).replace(/\u202f/g, ' ');
}

const refundStates: Readonly<Record<NonNullable<Charge['refund']>, ChargeState>> = {
  pending: { words: 'Being paid back', tone: 'due' },
  settled: { words: 'Paid back', tone: 'plain' },
  failed: { words: 'Could not be paid back', tone: 'over' },
};

const states: Readonly<Record<Charge['status'], ChargeState>> = {
  open: { words: 'To pay', tone: 'due' },
  paid: { words: 'Paid', tone: 'in' },
  void: { words: 'Nothing to pay', tone: 'plain' },
  refunded: { words: 'Paid back', tone: 'plain' },
};

export const stateOf = ({ status, refund }: Charge): ChargeState =>
  refund === null || status === 'open' ? states[status] : refundStates[refund];
