import * as z from 'zod';

/** Where a list by name goes on: after this patient. Names stand in it, so it travels in a body, never in an address. */
export interface NamePosition {
  readonly familyName: string;
  readonly givenName: string;
  readonly id: string;
}

// PostgreSQL's text holds no NUL.
const name = z.string().regex(/^[^\0]*$/);
const positionSchema = z.tuple([name, name, z.uuid()]);

export const cursorOfName = ({ familyName, givenName, id }: NamePosition): string =>
  Buffer.from(JSON.stringify([familyName, givenName, id])).toString('base64url');

function parsed(cursor: string): unknown {
  try {
    return JSON.parse(Buffer.from(cursor, 'base64url').toString());
  } catch {
    return undefined;
  }
}

/** @returns undefined for what is no cursor of ours */
export function positionOfCursor(cursor: string): NamePosition | undefined {
  const { data } = positionSchema.safeParse(parsed(cursor));
  return data && { familyName: data[0], givenName: data[1], id: data[2] };
}
