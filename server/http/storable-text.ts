import type { Request } from 'express';
import { fail } from './failure';

/** Half of a surrogate pair, which is no character. */
const LONE_SURROGATE = /[\uD800-\uDBFF](?![\uDC00-\uDFFF])|(?<![\uD800-\uDBFF])[\uDC00-\uDFFF]/;

const isStorable = (text: string): boolean =>
  !text.includes('\u0000') && !LONE_SURROGATE.test(text);

function refuse(path: string): never {
  const message = 'This holds a character that cannot be stored';
  throw fail('invalid-request', { errors: [{ path, code: 'custom', message }] });
}

/**
 * Refuses what PostgreSQL cannot store: NUL, and halves of characters. They can only come as `\u` escapes.
 * @param raw the bytes that the value was read from
 */
export function requireStorable(value: unknown, raw: Buffer): void {
  if (!raw.includes('\\u')) return;
  // No recursion: a caller decides how deep the value is.
  const left: [path: string, value: unknown][] = [['', value]];
  for (let next = left.pop(); next; next = left.pop()) {
    const [path, item] = next;
    if (typeof item === 'string' && !isStorable(item)) refuse(path);
    if (typeof item !== 'object' || item === null) continue;
    for (const [key, inner] of Object.entries(item)) {
      if (!isStorable(key)) refuse(path);
      left.push([path ? `${path}.${key}` : key, inner]);
    }
  }
}

/** The same for the address, in which only NUL can hide. */
export function requireStorableAddress(request: Request): void {
  if (request.originalUrl.includes('%00')) refuse('query');
}
