import express, { type ErrorRequestHandler } from 'express';
import { listenOnLoopback } from '../listen';
import { openStateFile } from '../state-file';
import { ApiError, missing } from './api-error';
import { emptyBook } from './book';
import { checkoutSessionRoutes, expireDue, payPageAddress } from './checkout-sessions';
import { controlRoutes } from './controls';
import { createDesk } from './desk';
import type { KnownPayment } from './known-payments';
import { payPageRoutes } from './pay-page';
import { readRoutes } from './reads';
import { refundRoutes } from './refunds';

export interface PaymentServiceOptions {
  /** 0 takes a free one. */
  port: number;
  /** Null keeps nothing beyond the process. */
  stateFile: string | null;
  webhookUrl: string | null;
  webhookSecret: string;
  /** Where a payer's browser reaches it; by default its own address on loopback. */
  publicUrl?: string;
  /** The one key taken; by default every `sk_test_…`. */
  apiKey?: string;
  /** Payments that were not made here; none by default. */
  knownPayments?: readonly KnownPayment[];
  /** Milliseconds before each further try of a webhook. */
  webhookWaits?: readonly number[];
}

export interface PaymentService {
  url: string;
  port: number;
  stop(): Promise<void>;
}

const expiryCheckEvery = 30_000;

/**
 * Starts the local stand-in of the hosted payment service: the part of its API, pay page and
 * webhooks that Plimsoll uses, for one machine, without money. Listens on 127.0.0.1 alone.
 */
export async function startPaymentService(options: PaymentServiceOptions): Promise<PaymentService> {
  const state = await openStateFile(options.stateFile, emptyBook);
  const app = express();
  const listening = await listenOnLoopback(app, options.port);
  const url = `http://127.0.0.1:${listening.port}`;
  const desk = createDesk(
    {
      publicUrl: options.publicUrl ?? url,
      apiKey: options.apiKey ?? null,
      knownPayments: options.knownPayments ?? [],
      webhook: {
        url: options.webhookUrl,
        secret: options.webhookSecret,
        ...(options.webhookWaits ? { waits: options.webhookWaits } : {}),
      },
    },
    state,
  );
  app.disable('x-powered-by');
  app.set('query parser', 'extended');
  controlRoutes(desk, app);
  payPageRoutes(desk, app);
  app.use('/v1', express.urlencoded({ extended: true }));
  checkoutSessionRoutes(desk, app);
  refundRoutes(desk, app);
  readRoutes(desk, app);
  app.use((request) => {
    throw missing('route', `${request.method} ${request.path}`, 'path');
  });
  app.use(answerFailure);

  // The port may be another than before the restart.
  for (const session of Object.values(desk.book.sessions)) {
    if (session.status === 'open') session.url = payPageAddress(desk, session.id);
  }
  desk.webhooks.resume();
  const expiry = setInterval(() => {
    expireDue(desk);
    desk.save().catch(report);
  }, expiryCheckEvery);
  expiry.unref();
  return {
    url,
    port: listening.port,
    async stop() {
      clearInterval(expiry);
      desk.webhooks.stop();
      await listening.close();
      await desk.save();
    },
  };
}

const report = (error: unknown): void => console.error('payment stand-in:', error);

const answerFailure: ErrorRequestHandler = (error, _request, response, _next) => {
  if (!(error instanceof ApiError)) report(error);
  const answer =
    error instanceof ApiError
      ? error
      : new ApiError(500, 'api_error', { message: 'The stand-in failed; see its log.' });
  response.status(answer.status).json(answer.body);
};
