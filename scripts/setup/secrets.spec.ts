import { mkdtempSync, readdirSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { ensureSecrets } from './secrets.mjs';

describe('secrets', () => {
  const folder = mkdtempSync(join(tmpdir(), 'plimsoll-secrets-'));
  const first = ensureSecrets(folder);

  it('are long, all different, and stay', () => {
    const values = Object.values(first);
    expect(values.every((value) => /^[0-9a-f]{64}$/.test(value))).toBe(true);
    expect(new Set(values).size).toBe(values.length);
    expect(ensureSecrets(folder)).toEqual(first);
  });

  it('are readable by their owner alone', () => {
    const place = join(folder, 'secrets');
    expect(statSync(place).mode & 0o777).toBe(0o700);
    for (const name of readdirSync(place)) {
      expect(statSync(join(place, name)).mode & 0o777).toBe(0o600);
    }
  });
});
