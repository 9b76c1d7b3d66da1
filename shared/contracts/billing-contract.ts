import * as z from 'zod';
import { cursorField, searchField } from './fields';

// What a patient pays themselves. Money is an integer of minor units beside its ISO 4217 code.

export const chargeStatuses = ['open', 'paid', 'void', 'refunded'] as const;
export const paymentStatuses = ['preparing', 'pending', 'settled', 'failed', 'expired'] as const;
export const refundStatuses = ['pending', 'settled', 'failed'] as const;

const instant = z.iso.datetime({ offset: true });
const money = { amountMinor: z.int().positive(), currency: z.string().length(3) };

export const chargeSchema = z.object({
  id: z.uuid(),
  patientId: z.uuid(),
  /** What is paid for, in the program's words, as *Maintenance class*. */
  description: z.string(),
  ...money,
  status: z.enum(chargeStatuses),
  createdAt: instant,
  /** The class that it pays for; null when there is none. */
  appointment: z
    .object({
      id: z.uuid(),
      startsAt: instant,
      timeZone: z.string(),
      site: z.string(),
      /** Given back; a charge that stays all the same was cancelled late. */
      cancelled: z.boolean(),
    })
    .nullable(),
  paidAt: instant.nullable(),
  /** An attempt to pay that is not decided yet. */
  payment: z.enum(paymentStatuses).nullable(),
  refund: z.enum(refundStatuses).nullable(),
});
export type Charge = z.infer<typeof chargeSchema>;

/** A patient's charges, newest first; without `patientId` one's own. */
export const chargesQuerySchema = z.strictObject({ patientId: z.uuid().optional() });
export const chargesResponseSchema = z.object({ items: z.array(chargeSchema) });

/** What the payer was shown; a charge that differs by now is not paid by mistake. */
export const checkoutRequestSchema = z.strictObject(money);

/** The payment service's own page, where the card is entered. */
export const checkoutResponseSchema = z.object({ url: z.url() });

export const staffChargeSchema = chargeSchema.extend({
  displayName: z.string(),
  recordNumber: z.string(),
});
export type StaffCharge = z.infer<typeof staffChargeSchema>;

export const staffChargesRequestSchema = z.strictObject({
  status: z.enum(chargeStatuses).optional(),
  siteId: z.uuid().optional(),
  /** A name or a record number, as in the search of patients. */
  q: searchField(100).optional(),
  cursor: cursorField.nullish(),
  limit: z.int().min(1).max(100).default(25),
});
export const staffChargesResponseSchema = z.object({
  items: z.array(staffChargeSchema),
  nextCursor: z.string().nullable(),
});

/** Who did it; null for Plimsoll itself, as when a class was closed or a charge was paid twice. */
const person = z.object({ displayName: z.string(), isPatient: z.boolean() }).nullable();

export const refundReasons = ['cancelled', 'paid-after-cancelling', 'paid-twice'] as const;
export type RefundReason = (typeof refundReasons)[number];

/** A charge as the desk answers for it: each attempt to pay, and what went back, with who and when. */
export const chargeHistorySchema = z.object({
  charge: staffChargeSchema,
  payments: z.array(
    z.object({
      id: z.uuid(),
      amountMinor: z.int(),
      currency: z.string(),
      status: z.enum(paymentStatuses),
      /** Who opened the pay page. */
      by: person,
      at: instant,
      settledAt: instant.nullable(),
      refund: z
        .object({
          status: z.enum(refundStatuses),
          reason: z.enum(refundReasons),
          by: person,
          at: instant,
          settledAt: instant.nullable(),
        })
        .nullable(),
    }),
  ),
});
export type ChargeHistory = z.infer<typeof chargeHistorySchema>;

export const webhookHeadersSchema = z.object({ 'stripe-signature': z.string().optional() });
export const webhookResponseSchema = z.object({ received: z.literal(true) });
