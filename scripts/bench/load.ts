import { fork } from 'node:child_process';
import { once } from 'node:events';
import { fileURLToPath } from 'node:url';
import autocannon from 'autocannon';
import type { Statement } from './recorder';

export interface Load {
  readonly url: string;
  readonly method: 'GET' | 'POST' | 'PUT';
  readonly headers?: Readonly<Record<string, string>>;
  /** Made anew for each request. */
  readonly next?: () => { path?: string; body?: unknown; headers?: Record<string, string> };
  readonly body?: unknown;
}

export interface Figure {
  readonly perSecond: number;
  readonly p99Ms: number;
  readonly refused: number;
}

const CONNECTIONS = 16;
const SECONDS = Number(process.env['BENCH_SECONDS'] ?? 6);

/** Calls as fast as answers come, from 16 connections. */
export async function measure({ url, method, headers = {}, next, body }: Load): Promise<Figure> {
  const { origin, pathname } = new URL(url);
  const text = body === undefined ? undefined : JSON.stringify(body);
  const result = await autocannon({
    url: origin,
    connections: CONNECTIONS,
    duration: SECONDS,
    requests: [
      {
        method,
        path: pathname,
        headers: { ...headers },
        ...(text !== undefined && { body: text }),
        ...(next && {
          setupRequest: (request) => {
            const made = next();
            return {
              ...request,
              path: made.path ?? pathname,
              headers: { ...headers, ...made.headers },
              body: JSON.stringify(made.body),
            };
          },
        }),
      },
    ],
  });
  return {
    perSecond: result.requests.average,
    p99Ms: result.latency.p99,
    refused: result.non2xx + result.errors,
  };
}

export type BareCalls = Readonly<
  Record<string, { readonly statements: readonly Statement[]; readonly freshId?: string }>
>;

export interface BareServer {
  readonly url: string;
  readonly stop: () => void;
}

/** A handler of Express and pg alone, in a process of its own. */
export async function startBare(databaseUrl: string, calls: BareCalls): Promise<BareServer> {
  const file = fileURLToPath(new URL('./bare-server.ts', import.meta.url));
  const child = fork(file, {
    execArgv: ['--import', 'tsx'],
    env: { ...process.env, BENCH: JSON.stringify({ databaseUrl, calls }) },
  });
  const [port] = (await once(child, 'message')) as [number];
  return { url: `http://127.0.0.1:${port}`, stop: () => child.disconnect() };
}
