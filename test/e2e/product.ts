import { spawn, type ChildProcess } from 'node:child_process';
import { mkdirSync, rmSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { TestProject } from 'vitest/node';
import { findFreePort, portFromPath } from '../../scripts/ports.mjs';

declare module 'vitest' {
  export interface ProvidedContext {
    /** Where the product and the caught mail of this run answer. */
    product: { url: string; mailUrl: string };
  }
}

const root = fileURLToPath(new URL('../..', import.meta.url));
const data = fileURLToPath(new URL('../../.plimsoll-test/e2e', import.meta.url));

interface Started {
  readonly child: ChildProcess;
  readonly output: string;
}

/** Runs `npm start` as a new user would, and waits for the last line that it says once it is ready. */
function startProduct(port: number): Promise<Started> {
  const { DATABASE_URL: _, ...env } = process.env;
  const child = spawn(process.execPath, ['scripts/start.mjs'], {
    cwd: root,
    env: { ...env, PORT: String(port), PLIMSOLL_DATA: data },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  return new Promise((resolve, reject) => {
    let output = '';
    const hear = (chunk: Buffer): void => {
      output += chunk.toString();
      if (/Plimsoll is ready at[\s\S]*Stop with Ctrl-C/.test(output)) resolve({ child, output });
    };
    child.stdout.on('data', hear);
    child.stderr.on('data', hear);
    child.on('exit', (code) => reject(new Error(`The product ended with ${code}:\n${output}`)));
  });
}

function addressIn(output: string, before: RegExp): string {
  const found = new RegExp(`${before.source}\\s*(http://127\\.0\\.0\\.1:\\d+)`).exec(output)?.[1];
  if (!found) throw new Error(`No address after ${before.source} in:\n${output}`);
  return found;
}

const ended = (child: ChildProcess): Promise<void> =>
  new Promise((resolve) => child.once('exit', () => resolve()));

/** The product of one run: started from nothing, with its demonstration, in a folder of its own. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  rmSync(data, { recursive: true, force: true });
  mkdirSync(data, { recursive: true });
  const { child, output } = await startProduct(await findFreePort(portFromPath(`${data}/web`)));
  project.provide('product', {
    url: addressIn(output, /ready at/),
    mailUrl: addressIn(output, /E-mail \(stand-in[^)]*\):/),
  });
  return async () => {
    const end = ended(child);
    child.kill('SIGTERM');
    await end;
  };
}
