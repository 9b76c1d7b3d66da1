import type { Request, Response } from 'express';
import { Passport } from 'passport';
import { Strategy } from 'passport-local';
import type { AppContext } from '../app-context';
import { fail, Failure } from '../http/failure';
import { findCredentials, type Credentials } from './accounts-repository';
import type { KnownDevices } from './device-cookie';
import type { PasswordHasher } from './password-hash';
import { takeTry, type Tries } from './sign-in-throttle';

/** What signing in needs beside the context; made once a server. */
export interface SignInParts {
  readonly hasher: PasswordHasher;
  readonly devices: KnownDevices;
}

/** @returns who has this address and password; the same failure whichever of the two is wrong */
export type Authenticate = (request: Request, response: Response) => Promise<Credentials>;

/**
 * @throws Failure `wrong-credentials`, `too-many-requests` or `unavailable`, after the same work for every address
 */
async function checkPassword(
  context: AppContext,
  { hasher, devices }: SignInParts,
  request: Request,
  { email, password }: { email: string; password: string },
): Promise<Credentials> {
  const pool = context.database.$client;
  const found = await findCredentials(pool, email);
  const tries: Tries = found
    ? { userId: found.id, deviceId: devices.read(request, found.id) }
    : { unknownEmail: email };
  await takeTry(pool, tries, context.clock.now());
  const hash = found && !found.disabled ? found.passwordHash : null;
  if ((await hasher.verify(hash, password)) && found) return found;
  const record = { action: 'sign-in', objectType: 'user', objectId: found?.id ?? null } as const;
  throw fail('wrong-credentials', { record: { ...record, outcome: 'failure' } });
}

/** Passport's local strategy over `checkPassword`; our own session store keeps who signed in. */
export function createAuthenticate(context: AppContext, parts: SignInParts): Authenticate {
  const passport = new Passport();
  const fields = { usernameField: 'email', passReqToCallback: true, session: false } as const;
  passport.use(
    new Strategy(fields, (request, email, password, done) => {
      checkPassword(context, parts, request, { email, password }).then(
        (credentials) => done(null, credentials),
        (error: unknown) => done(error),
      );
    }),
  );
  return (request, response) =>
    new Promise((resolve, reject) => {
      const decide = (error: Error | null, credentials?: Credentials | false): void => {
        if (credentials) resolve(credentials);
        else reject(error ?? new Failure('wrong-credentials'));
      };
      const handler = passport.authenticate('local', { session: false }, decide) as (
        request: Request,
        response: Response,
      ) => void;
      handler(request, response);
    });
}
