import * as z from 'zod';
import { fail } from '../http/failure';
import type { AppointmentsPosition } from './appointments-queries';

const position = z.tuple([z.iso.datetime(), z.uuid()]);

export const encodePosition = ({ startsAt, id }: AppointmentsPosition): string =>
  Buffer.from(JSON.stringify([startsAt.toISOString(), id])).toString('base64url');

/** @throws Failure `invalid-request` when the text is no cursor of ours */
export function decodePosition(cursor: string): AppointmentsPosition {
  try {
    const text = Buffer.from(cursor, 'base64url').toString();
    const [startsAt, id] = position.parse(JSON.parse(text));
    return { startsAt: new Date(startsAt), id };
  } catch {
    const message = 'Start again from the first page';
    throw fail('invalid-request', { errors: [{ path: 'cursor', code: 'invalid_value', message }] });
  }
}
