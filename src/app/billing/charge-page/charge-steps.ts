import type { ChargeHistory, RefundReason } from '@shared/contracts/billing-contract';
import { momentOf } from '../../ui/charge/charge-words';

/** Something that happened to a charge. */
export interface Step {
  readonly what: string;
  /** In words, by the class's own clock. */
  readonly when: string;
  /** Who did it, where somebody did. */
  readonly who: string | null;
}

type Payment = ChargeHistory['payments'][number];
type Person = Payment['by'];

const nameOf = (person: Person): string =>
  person === null ? 'Plimsoll' : `${person.displayName}${person.isPatient ? ', the patient' : ''}`;

const reasons: Readonly<Record<RefundReason, string>> = {
  cancelled: 'the place was given back',
  'paid-after-cancelling': 'it was paid after the place was given back',
  'paid-twice': 'it was paid twice',
};

/** What an attempt came to where nothing else tells it. */
const ends: Readonly<Partial<Record<Payment['status'], string>>> = {
  preparing: 'The pay page did not open yet',
  pending: 'The pay page is open',
  failed: 'This attempt did not count',
  expired: 'The pay page closed unpaid',
};

interface Dated {
  readonly at: string;
  readonly what: string;
  readonly who: string | null;
}

function refundSteps(refund: NonNullable<Payment['refund']>): Dated[] {
  const asked = {
    at: refund.at,
    what: `To be paid back, since ${reasons[refund.reason]}`,
    who: nameOf(refund.by),
  };
  if (refund.settledAt !== null) {
    return [asked, { at: refund.settledAt, what: 'Paid back in full', who: null }];
  }
  const what =
    refund.status === 'failed'
      ? 'The payment service refused to pay it back'
      : 'Not back yet; asked about every ten minutes';
  return [asked, { at: refund.at, what, who: null }];
}

function paymentSteps({ at, by, status, settledAt, refund }: Payment): Dated[] {
  const end = ends[status];
  return [
    { at, what: 'Pay page opened', who: nameOf(by) },
    ...(settledAt === null ? [] : [{ at: settledAt, what: 'Paid', who: null }]),
    ...(end === undefined ? [] : [{ at, what: end, who: null }]),
    ...(refund === null ? [] : refundSteps(refund)),
  ];
}

/** Everything that happened to a charge, in its order. */
export function stepsOf({ charge, payments }: ChargeHistory): Step[] {
  const dated: Dated[] = [
    { at: charge.createdAt, what: 'Charged, as the class was booked', who: null },
    ...payments.flatMap(paymentSteps),
  ];
  return dated
    .map((step, order) => ({ ...step, order }))
    .sort((a, b) => Date.parse(a.at) - Date.parse(b.at) || a.order - b.order)
    .map(({ at, what, who }) => ({ what, who, when: momentOf(at, charge) }));
}
