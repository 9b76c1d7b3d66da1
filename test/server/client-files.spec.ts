import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createTestApp, type TestApp } from '../builders/test-app';

const page =
  '<html><head><meta name="csp-nonce" content="__CSP_NONCE__"></head><app-root ngCspNonce="__CSP_NONCE__"></app-root></html>';

describe('the client, served', () => {
  let house: TestApp;
  let folder: string;

  beforeAll(async () => {
    folder = mkdtempSync(join(tmpdir(), 'client-'));
    const files = {
      'index.html': page,
      'main-ABCD1234.js': `console.log("${'x'.repeat(3000)}")`,
      'main-ABCD1234.js.map': '{}',
      'favicon.svg': '<svg xmlns="http://www.w3.org/2000/svg"/>',
      '.env': 'SECRET=1',
    };
    for (const [name, content] of Object.entries(files)) writeFileSync(join(folder, name), content);
    house = await createTestApp({ settings: { clientFolder: folder } });
  });
  afterAll(async () => {
    await house.close();
    rmSync(folder, { recursive: true });
  });

  const open = (path: string) =>
    request(house.app).get(path).set('Accept', 'text/html,application/xhtml+xml');

  it('gives every address of the client its page, each time with a nonce of its own', async () => {
    const nonces = new Set<string>();
    for (const path of ['/', '/patients/0199', '/set-password', '/']) {
      const reply = await open(path).expect(200);
      const policy = reply.headers['content-security-policy'] ?? '';
      const nonce = /style-src 'self' 'nonce-([^']+)'/.exec(policy)?.[1] ?? '';
      nonces.add(nonce);
      expect(nonce).toMatch(/^[\w+/]{22}==$/);
      expect(reply.text.split(nonce)).toHaveLength(3);
      expect(reply.text).not.toContain('__CSP_NONCE__');
      expect(reply.headers['cache-control']).toBe('no-store');
      expect(reply.headers['content-type']).toBe('text/html; charset=utf-8');
      const directives = [
        "script-src 'self'",
        "object-src 'none'",
        "frame-ancestors 'none'",
        "form-action 'self'",
      ];
      expect(policy.split('; ')).toEqual(expect.arrayContaining(directives));
      expect(policy).not.toContain('unsafe');
    }
    expect(nonces.size).toBe(4);
  });

  it('keeps files that are named by their content for good, and asks after the others', async () => {
    const script = await request(house.app).get('/main-ABCD1234.js').expect(200);
    expect(script.headers['cache-control']).toBe('public, max-age=31536000, immutable');
    expect(script.headers['content-type']).toMatch(/^text\/javascript; charset=utf-8/);
    const icon = await request(house.app).get('/favicon.svg').expect(200);
    expect(icon.headers['cache-control']).toBe('no-cache');
    expect(icon.headers['content-security-policy']).toContain("default-src 'none'");
    expect(icon.headers['x-content-type-options']).toBe('nosniff');
  });

  it.each(['br', 'gzip'])('packs what is worth packing: %s', async (encoding) => {
    const reply = await request(house.app)
      .get('/main-ABCD1234.js')
      .set('Accept-Encoding', encoding);
    expect(reply.headers['content-encoding']).toBe(encoding);
  });

  it.each([
    '/.env',
    '/.git/HEAD',
    '/package.json',
    '/main-ABCD1234.js.map',
    '/nothing.js',
    '/index.html',
    '/..%2f..%2fetc/passwd',
    '/api/nothing',
  ])('has nothing at %s', async (path) => {
    for (const reply of [await open(path), await request(house.app).get(path)]) {
      expect(reply.status).toBe(404);
      expect(reply.headers['content-type']).toBe('application/problem+json; charset=utf-8');
    }
  });

  it('gives its page to people who open an address, and to nothing else', async () => {
    await request(house.app).get('/patients').set('Accept', 'application/json').expect(404);
    await request(house.app).post('/patients').set('Accept', 'text/html').expect(404);
    expect(
      (await request(house.app).head('/patients').set('Accept', 'text/html').expect(200)).text,
    ).toBeUndefined();
  });
});
