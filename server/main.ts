import { createServer, type Server } from 'node:http';
import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { version } from '../package.json';
import { offerFirstAdministrator } from './accounts/first-administrator-service';
import { createApp } from './app';
import type { AppContext, AppSettings } from './app-context';
import { ConfigError, loadConfig, type Config } from './config';
import { openDatabase, type Database } from './database/client';
import { demoAccounts } from './demo/accounts';
import { featureJobs } from './features';
import { createLog } from './http/log';
import { startWorker } from './jobs/worker';
import { createChangeFeed } from './live/change-feed';
import type { Mailer } from './mail/mailer';
import { createMailer } from './mail/smtp-mailer';
import { createPayments } from './payments/stripe-payments';

/** Beside the bundle in dist/server; in development the client serves itself. */
const CLIENT_FOLDER = fileURLToPath(new URL('../client/browser', import.meta.url));

const settingsOf = (config: Config): AppSettings => ({
  origin: config.origin,
  secureCookies: config.secureCookies,
  sessionSecret: config.sessionSecret,
  csrfSecret: config.csrfSecret,
  trustProxyHops: config.trustProxyHops,
  programName: config.programName,
  demo: config.demo,
  demoAccounts: config.demo ? demoAccounts : [],
  clientFolder: existsSync(CLIENT_FOLDER) ? CLIENT_FOLDER : null,
  version,
  checkResponses: false,
});

function mailerOf({ smtp: { url, from } }: Config): Mailer | null {
  return url === null ? null : createMailer({ url, from });
}

function contextOf(config: Config): AppContext {
  const log = createLog(config.logLevel);
  const open = (url: string): Database =>
    openDatabase(url, {
      onConnectionLost: (error) => log.warn({ err: error }, 'a database connection was lost'),
    });
  const database = open(config.databaseUrl);
  return {
    database,
    reportsDatabase: config.databaseReplicaUrl ? open(config.databaseReplicaUrl) : database,
    clock: { now: () => new Date() },
    changes: createChangeFeed(database, log),
    payments: config.stripe && createPayments(config.stripe),
    mailer: mailerOf(config),
    log,
    settings: settingsOf(config),
  };
}

function listen(server: Server, { port, host }: Config): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, () => resolve());
  });
}

/** Answers what is under way, takes nothing new, and leaves streams to reconnect elsewhere. */
function close(server: Server): Promise<void> {
  return new Promise((resolve) => {
    server.close(() => resolve());
    server.closeIdleConnections();
    setTimeout(() => server.closeAllConnections(), 10_000).unref();
  });
}

/** For the person at the terminal, not for the log: whoever holds the link becomes the administrator. */
async function printFirstAdministratorLink(context: AppContext): Promise<void> {
  const link = await offerFirstAdministrator(context);
  if (link) console.log(`Make the first administrator here, once, within a day: ${link}`);
}

async function start(): Promise<void> {
  const config = loadConfig(process.env);
  const context = contextOf(config);
  const server = createServer(createApp(context));
  await listen(server, config);
  const worker = config.worker ? await startWorker(featureJobs, context) : null;
  context.log.info({ port: config.port, demo: config.demo, version }, 'listening');
  if (!config.demo) await printFirstAdministratorLink(context);

  let stopping: Promise<void> | undefined;
  const stop = async (): Promise<void> => {
    await Promise.all([close(server), worker?.stop(), context.changes.close()]);
    context.mailer?.close();
    await context.database.$client.end();
    if (context.reportsDatabase !== context.database) await context.reportsDatabase.$client.end();
    context.log.info('stopped');
    process.disconnect?.();
  };
  const stopOnce = (): void => void (stopping ??= stop());
  process.on('SIGTERM', stopOnce);
  process.on('SIGINT', stopOnce);
  // Whoever started this process as a child is gone.
  process.on('disconnect', stopOnce);
}

start().catch((error: unknown) => {
  console.error(error instanceof ConfigError ? error.message : error);
  process.exit(1);
});
