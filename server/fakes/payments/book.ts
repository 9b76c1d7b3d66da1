import type {
  BalanceTransaction,
  Charge,
  PaymentIntent,
  Refund,
  ServiceEvent,
  Session,
} from './objects';

/** What a session was asked for besides what it shows: handed on to its payment. */
export interface SessionDetails {
  itemName: string;
  intentMetadata: Record<string, string>;
  description: string | null;
}

/** The first answer to an idempotency key. */
export interface KeptAnswer {
  fingerprint: string;
  status: number;
  body: unknown;
  requestId: string;
}

export interface Delivery {
  id: string;
  eventId: string;
  attempts: number;
  /** Milliseconds since the epoch. */
  nextAttemptAt: number;
  state: 'waiting' | 'held' | 'delivered' | 'dropped' | 'given-up';
  lastStatus: number | null;
}

/** Everything that the stand-in knows; kept in one JSON file. */
export interface Book {
  sessions: Record<string, Session>;
  sessionDetails: Record<string, SessionDetails>;
  paymentIntents: Record<string, PaymentIntent>;
  charges: Record<string, Charge>;
  refunds: Record<string, Refund>;
  balanceTransactions: Record<string, BalanceTransaction>;
  events: Record<string, ServiceEvent>;
  deliveries: Record<string, Delivery>;
  answers: Record<string, KeptAnswer>;
}

export function emptyBook(): Book {
  return {
    sessions: {},
    sessionDetails: {},
    paymentIntents: {},
    charges: {},
    refunds: {},
    balanceTransactions: {},
    events: {},
    deliveries: {},
    answers: {},
  };
}

/** What stands under an id, never what every JavaScript object has by birth. */
export function onShelf<T>(shelf: Record<string, T>, id: string | null): T | undefined {
  return id !== null && Object.hasOwn(shelf, id) ? shelf[id] : undefined;
}

/** Finds an object by its id, whatever it is. */
export function findObject(book: Book, id: string): object | undefined {
  for (const shelf of [
    book.sessions,
    book.paymentIntents,
    book.charges,
    book.refunds,
    book.balanceTransactions,
  ]) {
    const found = onShelf<object>(shelf, id);
    if (found) return found;
  }
  return undefined;
}
