import { onShelf } from './book';
import type { Desk } from './desk';
import type { KnownPayment } from './known-payments';
import type { PaymentIntent } from './objects';
import { chargeCard } from './paying';

function enter(desk: Desk, { id, amount, currency, metadata }: KnownPayment): PaymentIntent {
  const intent: PaymentIntent = {
    id,
    object: 'payment_intent',
    amount,
    amount_received: amount,
    capture_method: 'automatic_async',
    created: desk.now(),
    currency,
    customer: null,
    description: null,
    last_payment_error: null,
    latest_charge: null,
    livemode: false,
    metadata,
    payment_method: null,
    payment_method_types: ['card'],
    status: 'succeeded',
  };
  desk.book.paymentIntents[id] = intent;
  intent.latest_charge = chargeCard(desk, intent, { brand: 'visa', last4: '4242' }, null).id;
  return intent;
}

/** A payment by its id. A known one is entered when it is first asked for: most never are. */
export function paymentIntent(desk: Desk, id: string | null): PaymentIntent | undefined {
  const found = onShelf(desk.book.paymentIntents, id);
  if (found) return found;
  const known = desk.settings.knownPayments.find((payment) => payment.id === id);
  return known && enter(desk, known);
}
