import type * as z from 'zod';
import { fail } from './failure';

/** A place in a list as an opaque text: the sort keys of the last row that was shown. */
export const encodeCursor = (keys: readonly (string | number)[]): string =>
  Buffer.from(JSON.stringify(keys)).toString('base64url');

function readJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}

/** @throws Failure `invalid-request` when the cursor is not one of this list's */
export function decodeCursor<S extends z.ZodType>(schema: S, cursor: string): z.output<S> {
  const parsed = schema.safeParse(readJson(Buffer.from(cursor, 'base64url').toString('utf8')));
  if (parsed.success) return parsed.data;
  const message = 'Use the nextCursor of the page before';
  throw fail('invalid-request', { errors: [{ path: 'cursor', code: 'custom', message }] });
}

/** One row more than asked for tells whether there is a next page. */
export function pageOf<T>(
  rows: readonly T[],
  limit: number,
  keysOf: (row: T) => readonly (string | number)[],
): { items: T[]; nextCursor: string | null } {
  const items = rows.slice(0, limit);
  const last = items.at(-1);
  const nextCursor = rows.length > limit && last ? encodeCursor(keysOf(last)) : null;
  return { items, nextCursor };
}
