import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import pg from 'pg';
import { afterEach, beforeAll, afterAll, describe, expect, it } from 'vitest';
import { buildUser } from '../builders/people';
import { startServerProcess, type ServerProcess } from '../builders/server-process';
import { createTestApp, type TestApp } from '../builders/test-app';

describe('the server’s own process', () => {
  let house: TestApp;
  let running: ServerProcess | undefined;

  beforeAll(async () => {
    house = await createTestApp();
  });
  afterEach(async () => {
    await running?.stop();
    running = undefined;
  });
  afterAll(() => house.close());

  /** Cookies and token of a browser that has opened the page. */
  async function newcomer(origin: string) {
    const reply = await fetch(`${origin}/api/auth/session`);
    const cookies = reply.headers.getSetCookie().map((line) => line.split(';')[0] ?? '');
    const token = cookies.find((pair) => pair.startsWith('XSRF-TOKEN='))?.slice(11) ?? '';
    const headers = { 'Content-Type': 'application/json', Cookie: cookies.join('; ') };
    return { ...headers, 'X-XSRF-TOKEN': decodeURIComponent(token) };
  }
  const post = async (origin: string, path: string, body: object) =>
    fetch(`${origin}${path}`, {
      method: 'POST',
      headers: await newcomer(origin),
      body: JSON.stringify(body),
    });

  it('prints, in an empty program, the link that makes the first administrator, and JSON otherwise', async () => {
    const data = mkdtempSync(join(tmpdir(), 'plimsoll-main-'));
    running = await startServerProcess(house, 'UTC', {
      PLIMSOLL_DEMO: 'off',
      PLIMSOLL_DATA: data,
      LOG_LEVEL: 'info',
    });
    const { origin } = running;
    const said = () => running?.output().trim().split('\n') ?? [];
    const spoken = () => said().find((line) => !line.startsWith('{')) ?? '';
    await expect.poll(spoken).toContain(`${origin}/first-administrator#token=`);
    const link = spoken();
    for (const line of said().filter((each) => each !== link)) JSON.parse(line);
    const body = {
      token: link.split('#token=')[1],
      email: 'first@clinic.example',
      displayName: 'First Person',
      password: 'eleven herons under a bridge',
    };
    expect((await post(origin, '/api/auth/first-administrator', body)).status).toBe(204);
    const { email, password } = body;
    expect((await post(origin, '/api/auth/sign-in', { email, password })).status).toBe(200);
    const session = (await (await fetch(`${origin}/api/auth/session`)).json()) as object;
    expect(session).toEqual({ user: null, demo: false, demoAccounts: [] });
  });

  it('finishes what is under way when it is asked to end, takes nothing new, and ends well', async () => {
    await buildUser(house.context.database);
    running = await startServerProcess(house, 'UTC', { PLIMSOLL_WORKER: 'on' });
    const { origin } = running;
    const blocker = new pg.Client({ connectionString: house.testDatabase.ownerUrl });
    await blocker.connect();
    await blocker.query('BEGIN; LOCK TABLE users IN ACCESS EXCLUSIVE MODE');
    const headers = await newcomer(origin);
    const body = JSON.stringify({ email: 'nobody@clinic.example', password: 'x' });
    const pending = fetch(`${origin}/api/auth/sign-in`, { method: 'POST', headers, body });
    await new Promise((resolve) => setTimeout(resolve, 200));
    const ended = running.stop();
    await new Promise((resolve) => setTimeout(resolve, 200));
    await expect(fetch(`${origin}/api/health`)).rejects.toThrow('fetch failed');
    await blocker.query('ROLLBACK');
    await blocker.end();
    expect((await pending).status).toBe(401);
    expect(await ended).toBe(0);
    running = undefined;
  });
});
