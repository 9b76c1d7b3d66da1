import { createHash, randomBytes } from 'node:crypto';

/** A secret for an address: 256 random bits in base64url. Only its hash is kept. */
export const newToken = (): string => randomBytes(32).toString('base64url');

export const hashOfToken = (token: string): Buffer => createHash('sha256').update(token).digest();
