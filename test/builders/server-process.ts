import { spawn, type ChildProcess } from 'node:child_process';
import { createServer } from 'node:net';
import type { AddressInfo } from 'node:net';
import { fileURLToPath } from 'node:url';
import type { TestApp } from './test-app';

/** The product's own server in a process of its own, as production runs it but without the job queue. */
export interface ServerProcess {
  readonly origin: string;
  /** What it printed so far. */
  readonly output: () => string;
  /** Asks it to end and waits for it; resolves to its exit status. */
  readonly stop: () => Promise<number | null>;
  /** Ends it at once, as a power cut would: kill -9. */
  readonly kill: () => Promise<number | null>;
}

const root = fileURLToPath(new URL('../../', import.meta.url));

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address() as AddressInfo;
      probe.close(() => resolve(port));
    });
  });
}

async function whenReady(origin: string, child: ChildProcess, output: string[]): Promise<void> {
  for (let tries = 0; tries < 300; tries += 1) {
    if (child.exitCode !== null) break;
    const health = await fetch(`${origin}/api/health`).catch(() => null);
    if (health?.ok) return;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error(`The server process did not get ready:\n${output.join('')}`);
}

/**
 * Starts a server process on the database of a test app, with its secrets: sessions made there hold here.
 * @param timeZone the process's own zone, which must not matter
 * @param env further settings
 */
export async function startServerProcess(
  testApp: TestApp,
  timeZone = 'UTC',
  env: Readonly<Record<string, string>> = {},
): Promise<ServerProcess> {
  const port = await freePort();
  const origin = `http://127.0.0.1:${port}`;
  const output: string[] = [];
  const child = spawn(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
    cwd: root,
    env: {
      PATH: process.env['PATH'],
      TZ: timeZone,
      PORT: String(port),
      DATABASE_URL: testApp.testDatabase.url,
      PLIMSOLL_WORKER: 'off',
      PLIMSOLL_SESSION_SECRET: testApp.context.settings.sessionSecret,
      PLIMSOLL_CSRF_SECRET: testApp.context.settings.csrfSecret,
      LOG_LEVEL: 'warn',
      ...env,
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  child.stdout.on('data', (data) => output.push(String(data)));
  child.stderr.on('data', (data) => output.push(String(data)));
  const ended = new Promise<number | null>((resolve) => child.once('exit', resolve));
  await whenReady(origin, child, output);
  return {
    origin,
    output: () => output.join(''),
    stop: () => {
      child.kill('SIGTERM');
      return ended;
    },
    kill: () => {
      child.kill('SIGKILL');
      return ended;
    },
  };
}
