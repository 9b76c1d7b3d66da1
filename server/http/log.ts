import { randomUUID } from 'node:crypto';
import { DrizzleQueryError } from 'drizzle-orm';
import type { Request, RequestHandler, Response } from 'express';
import { pino, stdSerializers, stdTimeFunctions, type DestinationStream, type Logger } from 'pino';
import { pinoHttp } from 'pino-http';
import { databaseErrorOf } from '../database/transaction';

/** Where a secret or a person's words could stand if someone logged too much. */
const REDACTED = ['req.headers', 'res.headers', '*.password', '*.token', '*.email', '*.body'];

const framesOf = (error: Error): string =>
  (error.stack ?? '')
    .split('\n')
    .filter((line) => /^\s+at /.test(line))
    .join('\n');

/** The database quotes rows in its messages, so of its errors only codes and names are kept. */
function serializeError(error: unknown): object {
  const database = databaseErrorOf(error);
  if (database) {
    const { code, constraint, table, routine } = database;
    return { type: 'DatabaseError', code, constraint, table, routine, stack: framesOf(database) };
  }
  const cause = error instanceof DrizzleQueryError ? error.cause : error;
  return cause instanceof Error ? stdSerializers.err(cause) : { type: typeof cause };
}

/**
 * JSON, one line an event, instants in UTC. It holds ids alone: no name, address, reading or secret.
 * @param destination standard output unless given
 */
export function createLog(level: string, destination?: DestinationStream): Logger {
  const options = {
    level,
    timestamp: stdTimeFunctions.isoTime,
    base: undefined,
    serializers: { err: serializeError },
    redact: REDACTED,
  };
  return destination ? pino(options, destination) : pino(options);
}

const routeOf = (request: Request): string => request.routeTemplate ?? 'unmatched';

/** One line a call to the API: what was called by its template, by whom, how it ended, how long it took. */
export function requestLog(log: Logger): RequestHandler {
  return pinoHttp<Request, Response>({
    logger: log,
    genReqId: () => randomUUID(),
    autoLogging: { ignore: (request) => !request.url.startsWith('/api') },
    wrapSerializers: false,
    serializers: {
      req: (request: Request) => ({ id: request.id, method: request.method }),
      res: (response: Response) => ({ status: response.statusCode }),
      err: serializeError,
    },
    customProps: (request, response) => ({
      route: routeOf(request),
      userId: request.actor?.id ?? null,
      code: response.locals['code'] as unknown,
    }),
    customLogLevel: (_request, response, error) =>
      error || response.statusCode >= 500 ? 'error' : 'info',
    customSuccessMessage: () => 'call',
    customErrorMessage: () => 'call failed',
    customAttributeKeys: { responseTime: 'ms' },
  });
}
