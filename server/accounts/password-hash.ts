import { randomBytes } from 'node:crypto';
import { availableParallelism } from 'node:os';
import argon2 from 'argon2';
import { fail } from '../http/failure';
import { normalizePassword } from './password-rule';

/** OWASP Password Storage Cheat Sheet: Argon2id with 19 MiB of memory, 2 iterations and 1 degree of parallelism. */
const PARAMETERS = { type: argon2.argon2id, memoryCost: 19456, timeCost: 2, parallelism: 1 };

/** One core stays free to answer everyone else, and one of the four threads that Node keeps for such work. */
const AT_ONCE = Math.max(1, Math.min(3, availableParallelism() - 1));
/** Some 2 s of work; whoever comes after that is asked to try again. */
const WAITING = 100;

/** @returns argon2id in PHC form, with its parameters and a salt of its own */
export const hashPassword = (password: string): Promise<string> =>
  argon2.hash(normalizePassword(password), PARAMETERS);

/** Whether the hash was made with weaker parameters than today's. */
export const isOutdated = (hash: string): boolean => argon2.needsRehash(hash, PARAMETERS);

export interface PasswordHasher {
  readonly hash: (password: string) => Promise<string>;
  /** Takes as long when there is no hash to compare with, so that time tells nothing. */
  readonly verify: (hash: string | null, password: string) => Promise<boolean>;
}

/** Hashing that never takes all threads. @throws Failure `unavailable` when too many wait already */
export function createPasswordHasher({ atOnce = AT_ONCE, waiting = WAITING } = {}): PasswordHasher {
  let running = 0;
  const queue: (() => void)[] = [];
  const nobody = hashPassword(randomBytes(32).toString('base64'));

  async function inTurn<T>(work: () => Promise<T>): Promise<T> {
    if (running >= atOnce) {
      if (queue.length >= waiting) throw fail('unavailable', { retryAfterSeconds: 2 });
      await new Promise<void>((resolve) => queue.push(resolve));
    } else {
      running += 1;
    }
    try {
      return await work();
    } finally {
      const next = queue.shift();
      if (next) next();
      else running -= 1;
    }
  }

  return {
    hash: (password) => inTurn(() => hashPassword(password)),
    verify: (hash, password) =>
      inTurn(async () => {
        const matches = await argon2.verify(hash ?? (await nobody), normalizePassword(password));
        return matches && hash !== null;
      }),
  };
}
