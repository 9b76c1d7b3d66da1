import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import pg from 'pg';
import { createApp } from '../../server/app';
import type { AppContext } from '../../server/app-context';
import { openDatabase } from '../../server/database/client';
import { featureRoutes } from '../../server/features';
import { createLog } from '../../server/http/log';
import { createChangeFeed } from '../../server/live/change-feed';
import type { Product } from '../demonstration-product';

export interface Statement {
  readonly text: string;
  readonly values: readonly unknown[];
}

/** What the house adds to the business of a request: its own cost is what is measured. */
const house =
  /^\s*(BEGIN|COMMIT|ROLLBACK)|FROM sessions|UPDATE sessions|INSERT INTO audit_events|AS "userId" FROM patients/i;

function contextOf(product: Product): AppContext {
  const database = openDatabase(product.databaseUrl);
  const log = createLog('silent');
  return {
    database,
    reportsDatabase: database,
    clock: { now: () => new Date() },
    changes: createChangeFeed(database, log),
    payments: null,
    mailer: null,
    log,
    settings: {
      origin: product.url,
      secureCookies: false,
      sessionSecret: product.secrets.session,
      csrfSecret: product.secrets.csrf,
      trustProxyHops: 0,
      programName: 'Harbor Lane',
      demo: true,
      demoAccounts: [],
      clientFolder: null,
      version: 'bench',
      checkResponses: false,
    },
  };
}

export interface Recorder {
  /** The business statements of one call, in order. */
  readonly record: (path: string, init: RequestInit) => Promise<Statement[]>;
  readonly close: () => Promise<void>;
}

/** The server in this process, its connections watched: a bare handler then runs the very same SQL. */
export async function startRecorder(product: Product): Promise<Recorder> {
  const heard: Statement[] = [];
  const { prototype } = pg.Client;
  const original = Object.getOwnPropertyDescriptor(prototype, 'query');
  if (!original) throw new Error('pg.Client has no query to listen to');
  const query = original.value as (...given: unknown[]) => unknown;
  Object.defineProperty(prototype, 'query', {
    ...original,
    value(...given: unknown[]) {
      const [first, second] = given;
      const config = (typeof first === 'string' ? { text: first } : first) as Partial<Statement>;
      const values = Array.isArray(second) ? (second as unknown[]) : (config.values ?? []);
      heard.push({ text: config.text ?? '', values });
      return Reflect.apply(query, this, given);
    },
  });
  const context = contextOf(product);
  const server = createServer(createApp(context, featureRoutes(context)));
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  return {
    record: async (path, init) => {
      heard.length = 0;
      const response = await fetch(`http://127.0.0.1:${port}${path}`, init);
      if (!response.ok) throw new Error(`${path}: ${await response.text()}`);
      return heard.filter(({ text }) => !house.test(text));
    },
    close: async () => {
      Object.defineProperty(prototype, 'query', original);
      server.close();
      await context.database.$client.end();
    },
  };
}
