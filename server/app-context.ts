import type { Logger } from 'pino';
import type { DemoAccount } from '@shared/contracts/accounts-contract';
import type { Database } from './database/client';
import type { ChangeFeed } from './live/change-feed';
import type { Mailer } from './mail/mailer';
import type { Payments } from './payments/payments';

export interface Clock {
  readonly now: () => Date;
}

export interface AppSettings {
  /** What people type: scheme, host and port, without a path. */
  readonly origin: string;
  readonly secureCookies: boolean;
  readonly sessionSecret: string;
  readonly csrfSecret: string;
  /** How many proxies stand before the server and may tell the caller's address. */
  readonly trustProxyHops: number;
  readonly demo: boolean;
  /** Shown on the sign-in page; [] outside demo mode. */
  readonly demoAccounts: readonly DemoAccount[];
  /** Where `ng build` put the client; null: this process serves the API alone. */
  readonly clientFolder: string | null;
  /** The program's name, as patients know it. */
  readonly programName: string;
  readonly version: string;
  /** In tests every answer is held against its contract. */
  readonly checkResponses: boolean;
}

/** What routes and jobs work with; made once by the composition root. */
export interface AppContext {
  readonly database: Database;
  /** A replica when there is one, else the database itself. */
  readonly reportsDatabase: Database;
  readonly clock: Clock;
  /** What any process changes, for the pages that are open here. */
  readonly changes: ChangeFeed;
  /** Null while no payment service is configured. */
  readonly payments: Payments | null;
  /** Null while no mail server is configured: messages wait in the outbox. */
  readonly mailer: Mailer | null;
  readonly settings: AppSettings;
  readonly log: Logger;
}
