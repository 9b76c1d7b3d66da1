import { createHmac, randomBytes, timingSafeEqual } from 'node:crypto';
import type { Request, Response } from 'express';
import type { AppSettings } from '../app-context';
import { cookieName, cookiesOf } from '../http/cookies';

const DAYS_180 = 180 * 24 * 60 * 60_000;

/**
 * Remembers the browsers from which a person signed in, so that a stranger who guesses at the account cannot keep its
 * owner out: tries from a known browser are counted apart. It opens nothing by itself.
 */
export interface KnownDevices {
  /** @returns the device's id when the browser shows that this person signed in from it */
  readonly read: (request: Request, userId: string) => string | null;
  readonly remember: (response: Response, userId: string) => void;
}

export function createKnownDevices({ sessionSecret, secureCookies }: AppSettings): KnownDevices {
  const name = cookieName('device', secureCookies);
  const sign = (deviceId: string, userId: string): Buffer =>
    createHmac('sha256', sessionSecret).update(`device ${deviceId} ${userId}`).digest();
  return {
    read: (request, userId) => {
      const [deviceId = '', signature = ''] = (cookiesOf(request)[name] ?? '').split('.');
      const given = Buffer.from(signature, 'base64url');
      const right = sign(deviceId, userId);
      return given.length === right.length && timingSafeEqual(given, right) ? deviceId : null;
    },
    remember: (response, userId) => {
      const deviceId = randomBytes(16).toString('base64url');
      const value = `${deviceId}.${sign(deviceId, userId).toString('base64url')}`;
      response.cookie(name, value, {
        httpOnly: true,
        sameSite: 'lax',
        path: '/',
        secure: secureCookies,
        maxAge: DAYS_180,
      });
    },
  };
}
