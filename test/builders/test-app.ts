import type { Express } from 'express';
import type { Logger } from 'pino';
import { createApp } from '../../server/app';
import type { AppContext, AppSettings } from '../../server/app-context';
import { openDatabase } from '../../server/database/client';
import { featureRoutes } from '../../server/features';
import { createLog } from '../../server/http/log';
import { createChangeFeed } from '../../server/live/change-feed';
import type { RouteDefinition } from '../../server/http/route';
import { createTestDatabase, type TestDatabase } from '../database/test-database';
import { testClock, type TestClock } from './test-clock';

export interface TestApp {
  readonly app: Express;
  readonly context: AppContext;
  readonly clock: TestClock;
  readonly testDatabase: TestDatabase;
  /** What the server logged, an object a line. */
  readonly logged: () => Record<string, unknown>[];
  /** A second server process, as far as can be told from outside, on the same database. */
  readonly twin: () => TestApp;
  readonly close: () => Promise<void>;
}

export interface TestAppOptions {
  readonly clock?: TestClock;
  readonly settings?: Partial<AppSettings>;
  readonly payments?: AppContext['payments'];
  readonly mailer?: AppContext['mailer'];
  /** Mounted beside the product's own. */
  readonly extraRoutes?: readonly RouteDefinition[];
}

const testSettings: AppSettings = {
  origin: 'http://127.0.0.1:3000',
  secureCookies: false,
  sessionSecret: 'a secret of the specs alone, and a long one',
  csrfSecret: 'another secret of the specs alone, as long',
  trustProxyHops: 0,
  programName: 'Harbor Lane',
  demo: false,
  demoAccounts: [],
  clientFolder: null,
  version: '0.0.0-spec',
  checkResponses: true,
};

function memoryLog(): { log: Logger; logged: TestApp['logged'] } {
  const lines: string[] = [];
  const log = createLog('info', { write: (line) => void lines.push(line) });
  return { log, logged: () => lines.map((line) => JSON.parse(line) as Record<string, unknown>) };
}

function appOn(testDatabase: TestDatabase, options: TestAppOptions): TestApp {
  const database = openDatabase(testDatabase.url, { max: 20 });
  const clock = options.clock ?? testClock();
  const { log, logged } = memoryLog();
  const context: AppContext = {
    database,
    reportsDatabase: database,
    clock,
    changes: createChangeFeed(database, log),
    payments: options.payments ?? null,
    mailer: options.mailer ?? null,
    settings: { ...testSettings, ...options.settings },
    log,
  };
  const routes = [...featureRoutes(context), ...(options.extraRoutes ?? [])];
  const app = createApp(context, routes);
  return {
    app,
    context,
    clock,
    testDatabase,
    logged,
    twin: () => appOn(testDatabase, { ...options, clock }),
    close: async () => {
      await context.changes.close();
      await database.$client.end();
    },
  };
}

/** The whole server on a database of its own. Call it in `beforeAll`, and `close` in `afterAll`. */
export async function createTestApp(options: TestAppOptions = {}): Promise<TestApp> {
  const testDatabase = await createTestDatabase();
  const made = appOn(testDatabase, options);
  return {
    ...made,
    close: async () => {
      await made.close();
      await testDatabase.drop();
    },
  };
}
