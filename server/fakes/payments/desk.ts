import { emptyBook, type Book } from './book';
import { createFaults, type Faults } from './faults';
import type { KnownPayment } from './known-payments';
import { apiVersion, makeId, type ServiceEvent } from './objects';
import type { StateFile } from '../state-file';
import { createWebhooks, type Webhooks, type WebhookSettings } from './webhooks';

export interface DeskSettings {
  /** Where a payer's browser reaches the pay page, without a slash at the end. */
  publicUrl: string;
  /** The one secret key taken; null takes every test key. */
  apiKey: string | null;
  webhook: WebhookSettings;
  /** Payments that were not made here. */
  knownPayments: readonly KnownPayment[];
}

/** The call that an event tells of; null for what happens on the pay page or by itself. */
export interface Cause {
  requestId: string;
  idempotencyKey: string | null;
}

/** What every part of the stand-in works with. */
export interface Desk {
  readonly settings: DeskSettings;
  readonly faults: Faults;
  readonly webhooks: Webhooks;
  readonly book: Book;
  /** Seconds since the epoch, as the service counts. */
  now(): number;
  save(): Promise<void>;
  emit(
    type: string,
    object: object,
    cause: Cause | null,
    previous?: Record<string, unknown>,
  ): ServiceEvent;
  reset(): Promise<void>;
}

export function createDesk(settings: DeskSettings, state: StateFile<Book>): Desk {
  const faults = createFaults();
  const webhooks = createWebhooks(
    settings.webhook,
    () => state.value,
    () => state.save(),
  );
  const now = (): number => Math.floor(Date.now() / 1000);
  return {
    settings,
    faults,
    webhooks,
    get book() {
      return state.value;
    },
    now,
    save: () => state.save(),
    emit(type, object, cause, previous) {
      const event: ServiceEvent = {
        id: makeId('evt'),
        object: 'event',
        api_version: apiVersion,
        created: now(),
        data: {
          object: structuredClone(object),
          ...(previous ? { previous_attributes: previous } : {}),
        },
        livemode: false,
        pending_webhooks: 1,
        request: { id: cause?.requestId ?? null, idempotency_key: cause?.idempotencyKey ?? null },
        type,
      };
      state.value.events[event.id] = event;
      webhooks.plan(event);
      return event;
    },
    reset() {
      webhooks.stop();
      webhooks.setRules({ hold: false, loseEvery: 0, copies: 1 });
      faults.clear();
      state.value = emptyBook();
      return state.save();
    },
  };
}
