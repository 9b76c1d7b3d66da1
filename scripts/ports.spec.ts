import { createServer, type AddressInfo, type Server } from 'node:net';
import { afterEach, describe, expect, it } from 'vitest';
import { findFreePort, isPortFree, portFromPath } from './ports.mjs';

const open: Server[] = [];

async function occupy(): Promise<number> {
  const server = createServer();
  open.push(server);
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
  return (server.address() as AddressInfo).port;
}

afterEach(() => {
  for (const server of open.splice(0)) server.close();
});

describe('ports', () => {
  it('are not free while something listens', async () => {
    expect(await isPortFree(await occupy())).toBe(false);
  });

  it('move up when taken or promised to another', async () => {
    const port = await occupy();
    const next = await findFreePort(port);
    expect(next).toBeGreaterThan(port);
    expect(await findFreePort(next, new Set([next]))).toBeGreaterThan(next);
  });

  it('follow from the folder, within a range of their own', () => {
    const one = portFromPath('/home/one/plimsoll');
    expect(one).toBe(portFromPath('/home/one/plimsoll'));
    expect(one).not.toBe(portFromPath('/home/two/plimsoll'));
    expect(one).toBeGreaterThanOrEqual(20_000);
    expect(one).toBeLessThan(32_000);
  });
});
