import { once } from 'node:events';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { Express } from 'express';

export interface Listening {
  port: number;
  close(): Promise<void>;
}

/** Serves an application on loopback alone. Port 0 takes a free one. */
export async function listenOnLoopback(app: Express, port: number): Promise<Listening> {
  const server = createServer(app);
  server.listen(port, '127.0.0.1');
  await once(server, 'listening');
  return {
    port: (server.address() as AddressInfo).port,
    async close() {
      if (!server.listening) return;
      const closed = once(server, 'close');
      server.close();
      server.closeAllConnections();
      await closed;
    },
  };
}

/** Runs `stop` once, when the process is asked to end or the one that started it has gone. */
export function stopOnRequest(stop: () => Promise<void>): void {
  let stopping = false;
  const end = (): void => {
    if (stopping) return;
    stopping = true;
    stop().then(
      () => process.exit(0),
      (error: unknown) => {
        console.error(error);
        process.exit(1);
      },
    );
  };
  for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, end);
  process.on('disconnect', end);
}
