import { describe, expect, it, vi } from 'vitest';
import { Cleanup } from './cleanup.mjs';
import { SetupFailure } from './failure.mjs';
import { explain } from './steps.mjs';

describe('what was started', () => {
  it('is stopped once, the latest first, whatever fails on the way', async () => {
    const told = vi.spyOn(console, 'error').mockImplementation(() => undefined);
    const stopped: string[] = [];
    const cleanup = new Cleanup();
    cleanup.add(() => stopped.push('database'));
    cleanup.add(() => Promise.reject(new SetupFailure({ why: 'It would not stop.' })));
    cleanup.add(() => stopped.push('server'));
    await Promise.all([cleanup.run(), cleanup.run()]);
    expect(stopped).toEqual(['server', 'database']);
    expect(told).toHaveBeenCalledWith('It would not stop.');
    told.mockRestore();
  });

  it('is not added to once the stopping has begun', async () => {
    const cleanup = new Cleanup();
    await cleanup.run();
    expect(cleanup.begun).toBe(true);
    expect(() => cleanup.add(() => undefined)).toThrow();
  });
});

describe('a failure in words', () => {
  it('says what was done, why it failed and what to type', () => {
    const failure = new SetupFailure({ did: 'Ran it.', why: 'No\nroom.', type: 'df -h' });
    expect(explain(failure)).toBe(
      'What was done: Ran it.\nWhy it failed: No\n  room.\nWhat to type:  df -h',
    );
  });

  it('is one sentence where that says it all', () => {
    expect(explain(new SetupFailure({ why: 'Port 3000 is taken.' }))).toBe('Port 3000 is taken.');
  });
});
