import { and, eq, like } from 'drizzle-orm';
import type { Queryable } from '../database/client';
import { payments } from '../database/schema';

const prefix = 'pi_demo_';

/** What the payment service would call a payment that the story made. */
export const storyPaymentId = (paymentId: string): string =>
  `${prefix}${paymentId.replaceAll('-', '')}`;

/** A payment as its service knows it: an amount, and our opaque ids. */
export interface StoryPayment {
  readonly id: string;
  readonly amount: number;
  readonly currency: string;
  readonly metadata: { readonly charge_id: string; readonly attempt_id: string };
}

/** Every payment of the story, for the stand-in of the service, which did not see them made. */
export async function storyPayments(database: Queryable): Promise<StoryPayment[]> {
  const rows = await database
    .select()
    .from(payments)
    .where(and(eq(payments.status, 'settled'), like(payments.servicePaymentId, `${prefix}%`)));
  return rows.map(({ id, chargeId, amountMinor, currency, servicePaymentId }) => ({
    id: servicePaymentId ?? '',
    amount: amountMinor,
    currency: currency.toLowerCase(),
    metadata: { charge_id: chargeId, attempt_id: id },
  }));
}
