import { readFile } from 'node:fs/promises';
import * as z from 'zod';
import { onShelf } from './book';
import type { Desk } from './desk';
import type { PaymentIntent } from './objects';
import { chargeCard } from './paying';

const knownPayment = z.strictObject({
  id: z.string().regex(/^pi_\w+$/),
  amount: z.int().positive(),
  currency: z.string().length(3).toLowerCase(),
  metadata: z.record(z.string(), z.string()),
});

/** A payment that was made elsewhere, as by the story of a demonstration, and that the stand-in is to know. */
export type KnownPayment = z.infer<typeof knownPayment>;

/** @throws Error when the file is not a list of payments; one that is not there holds none */
export async function readKnownPayments(path: string): Promise<KnownPayment[]> {
  let text: string;
  try {
    text = await readFile(path, 'utf8');
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return [];
    throw error;
  }
  return z.array(knownPayment).parse(JSON.parse(text));
}

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
