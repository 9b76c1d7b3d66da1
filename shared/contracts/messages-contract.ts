import * as z from 'zod';
import { cursorField, tokenField } from './fields';
import './zod';

export const messageKinds = [
  'booking-confirmation',
  'booking-cancellation',
  'reminder',
  'receipt',
  'invitation',
  'password-reset',
] as const;
export type MessageKind = (typeof messageKinds)[number];

/** Why a message did not reach anybody, in the order in which the desk can do something about it. */
export const undeliveredReasons = [
  /** The record holds no e-mail address. */
  'no-address',
  /** The address refused mail for good before. */
  'address-refused-before',
  /** The address is none, or its server does not know it. */
  'address-refused',
  /** The mail server would not take the message. */
  'message-refused',
  /** The mail server could not be reached for two days. */
  'not-reached',
] as const;
export type UndeliveredReason = (typeof undeliveredReasons)[number];

export const undeliveredSchema = z.object({
  id: z.uuid(),
  kind: z.enum(messageKinds),
  reason: z.enum(undeliveredReasons),
  /** When it was meant to go out. */
  dueAt: z.iso.datetime({ offset: true }),
  patientId: z.uuid(),
  displayName: z.string(),
  recordNumber: z.string(),
  /** Null when there is none, so that the desk knows to call instead. */
  phone: z.string().nullable(),
});
export type Undelivered = z.infer<typeof undeliveredSchema>;

export const undeliveredRequestSchema = z.strictObject({
  cursor: cursorField.nullish(),
  limit: z.int().min(1).max(100).default(25),
});
export const undeliveredResponseSchema = z.object({
  items: z.array(undeliveredSchema),
  nextCursor: z.string().nullable(),
});

/** What a patient wants to be sent by e-mail. What they book, cancel and pay is told in any case. */
export const messagePreferencesSchema = z.object({
  /** A reminder on the day before a class. */
  reminders: z.boolean(),
});
export type MessagePreferences = z.infer<typeof messagePreferencesSchema>;

/** `PUT /api/my/message-preferences` */
export const messagePreferencesRequestSchema = z.strictObject({ reminders: z.boolean() });

/** `GET` and `POST /api/unsubscribe/:token`; the token of a reminder decides whose they are. */
export const unsubscribeParamsSchema = z.object({ token: tokenField });
