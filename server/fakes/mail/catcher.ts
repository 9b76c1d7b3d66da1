import express, { type Express } from 'express';
import * as z from 'zod';
import { listenOnLoopback } from '../listen';
import { localOnly } from '../local-only';
import { openMessageFolder, type MessageFolder } from './message-folder';
import { listPage, messagePage, notFoundPage } from './pages';
import { readMessage } from './read-message';
import { listenForMail } from './smtp';
import { createSmtpFaults, smtpFaultRule, type SmtpFaults } from './smtp-faults';

export interface MailCatcherOptions {
  /** Port of the page; 0 takes a free one. */
  port: number;
  smtpPort: number;
  /** Null keeps nothing beyond the process. */
  folder: string | null;
}

export interface MailCatcher {
  /** Address of the page. */
  url: string;
  smtpPort: number;
  stop(): Promise<void>;
}

const mostListed = 200;

/** Starts a mail server for one machine that delivers nothing and shows everything. */
export async function startMailCatcher(options: MailCatcherOptions): Promise<MailCatcher> {
  const folder = await openMessageFolder(options.folder);
  const faults = createSmtpFaults();
  const smtp = await listenForMail(options.smtpPort, folder, faults);
  const app = express();
  app.disable('x-powered-by');
  app.use(localOnly);
  pageRoutes(app, folder);
  apiRoutes(app, folder);
  controlRoutes(app, folder, faults);
  const listening = await listenOnLoopback(app, options.port);
  return {
    url: `http://127.0.0.1:${listening.port}`,
    smtpPort: smtp.port,
    async stop() {
      await Promise.all([listening.close(), smtp.close()]);
    },
  };
}

function pageRoutes(app: Express, folder: MessageFolder): void {
  app.use((_request, response, next) => {
    response.set({
      // A message in its frame falls under this too: its styles are inline, its pictures are none.
      'content-security-policy':
        "default-src 'none'; style-src 'unsafe-inline'; img-src data:; frame-src 'self'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'",
      'cache-control': 'no-store',
      'referrer-policy': 'no-referrer',
      'x-content-type-options': 'nosniff',
    });
    next();
  });
  app.get('/', async (_request, response) => {
    const newest = folder.all().slice(-mostListed).reverse();
    const messages = await Promise.all(newest.map(readMessage));
    response.type('html').send(listPage(messages, folder.all().length));
  });
  app.get('/messages/:id', async (request, response) => {
    const caught = folder.find(request.params.id);
    if (caught) response.type('html').send(messagePage(await readMessage(caught), caught.raw));
    else response.status(404).type('html').send(notFoundPage());
  });
}

const filters = z.object({ to: z.string().optional() });

function apiRoutes(app: Express, folder: MessageFolder): void {
  app.get('/api/messages', async (request, response) => {
    const { to } = filters.parse(request.query);
    const wanted = folder
      .all()
      .filter(({ recipients }) => to === undefined || recipients.includes(to));
    const items = await Promise.all(wanted.map(readMessage));
    response.json({ items: items.reverse() });
  });
  app.get('/api/messages/:id', async (request, response) => {
    const caught = folder.find(request.params.id);
    if (caught) response.json({ ...(await readMessage(caught)), raw: caught.raw });
    else response.status(404).json({ message: 'No such message.' });
  });
}

const control = z.strictObject({ faults: z.array(smtpFaultRule).min(1).max(100) });

function controlRoutes(app: Express, folder: MessageFolder, faults: SmtpFaults): void {
  app.get('/_health', (_request, response) => {
    response.json({ status: 'ok' });
  });
  app.post('/_reset', async (_request, response) => {
    faults.clear();
    await folder.clear();
    response.status(204).end();
  });
  app.post('/_control', express.json(), (request, response) => {
    const asked = control.safeParse(request.body);
    if (!asked.success) {
      response.status(422).json({ message: z.prettifyError(asked.error) });
      return;
    }
    faults.add(asked.data.faults);
    response.status(204).end();
  });
}
