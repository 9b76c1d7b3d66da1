import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { askLockHolder, tryLock, waitForLock } from './lock.mjs';

const newFolder = (): string => mkdtempSync(join(tmpdir(), 'plimsoll-lock-'));

describe('the lock of a folder', () => {
  it('is held by one at a time, who tells about itself', async () => {
    const folder = newFolder();
    const lock = await tryLock(folder, 'start', () => 'process 7, port 3000');
    expect(lock).not.toBeNull();
    expect(await tryLock(folder, 'start')).toBeNull();
    expect(await askLockHolder(folder, 'start')).toBe('process 7, port 3000');
    await lock?.release();
    expect(await askLockHolder(folder, 'start')).toBe('');
  });

  it('is another one for another purpose or folder', async () => {
    const folder = newFolder();
    const locks = await Promise.all([
      tryLock(folder, 'start'),
      tryLock(folder, 'cluster'),
      tryLock(newFolder(), 'start'),
    ]);
    expect(locks).not.toContain(null);
    for (const lock of locks) await lock?.release();
  });

  it('passes to one of those who wait', async () => {
    const folder = newFolder();
    let inside = 0;
    let most = 0;
    const work = async (): Promise<void> => {
      const lock = await waitForLock(folder, 'cluster');
      inside += 1;
      most = Math.max(most, inside);
      await new Promise((resolve) => setTimeout(resolve, 10));
      inside -= 1;
      await lock.release();
    };
    await Promise.all([work(), work(), work()]);
    expect(most).toBe(1);
  });

  it('gives up when the other keeps it too long', async () => {
    const folder = newFolder();
    const lock = await tryLock(folder, 'start');
    await expect(waitForLock(folder, 'start', 20)).rejects.toThrow('too long');
    await lock?.release();
  });
});
