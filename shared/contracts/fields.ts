import * as z from 'zod';
import './zod';

// Fields that requests share. PostgreSQL's text holds no NUL, and no field of one line needs a control character.

const oneLine = /^\P{Cc}*$/u;
const severalLines = /^[\P{Cc}\t\n\r]*$/u;

/** One line of text, its ends trimmed, with at least one character. */
export const textField = (maximum: number, empty = 'Fill this in') =>
  z
    .string(empty)
    .trim()
    .min(1, empty)
    .max(maximum, `Use at most ${maximum} characters`)
    .regex(oneLine, 'Use plain text on one line');

/** Words to search by; may be empty. */
export const searchField = (maximum: number) =>
  z
    .string()
    .max(maximum, `Use at most ${maximum} characters`)
    .regex(oneLine, 'Use plain text on one line');

/** Text of several lines, its ends trimmed. */
export const noteField = (maximum: number) =>
  z
    .string()
    .trim()
    .max(maximum, `Use at most ${maximum} characters`)
    .regex(severalLines, 'Use plain text');

/** ISO 8601 knows a year 0 and years to 9999; beyond these the database or its arithmetic does not follow. */
const isInRange = (text: string): boolean => text >= '1900' && text < '2200';
const rangeFault = 'Enter a year from 1900 to 2199';

/** A date of the local calendar, YYYY-MM-DD, 1900 to 2199. */
export const localDateField = z.iso.date('Enter a date').refine(isInRange, rangeFault);

/** An instant with its offset, 1900 to 2199. */
export const instantField = z.iso
  .datetime({ offset: true, error: 'Give an instant with its offset' })
  .refine(isInRange, rangeFault);

/** Where a list that runs by time goes on: the instant and the id of the last row that was shown. */
export const timePosition = z.tuple([instantField, z.uuid()]);

/** A number within bounds, ends included; `unit` stands in the message. */
export const numberField = (bounds: { lowest: number; highest: number }, unit: string) => {
  const message = `Enter ${bounds.lowest} to ${bounds.highest}${unit === '' ? '' : ` ${unit}`}`;
  return z.number(message).min(bounds.lowest, message).max(bounds.highest, message);
};

/** A whole number within bounds, ends included. */
export const wholeNumberField = (bounds: { lowest: number; highest: number }, unit: string) => {
  const message = `Enter ${bounds.lowest} to ${bounds.highest}${unit === '' ? '' : ` ${unit}`}`;
  return z.int(message).min(bounds.lowest, message).max(bounds.highest, message);
};

/** As many rows of a list as a caller may ask for at once. */
export const pageLimitField = z
  .int('Enter a whole number')
  .min(1, 'Ask for 1 to 100 rows')
  .max(100, 'Ask for 1 to 100 rows')
  .default(25);

/** Where a list goes on, as the answer before gave it. */
export const cursorField = z.string().min(1).max(2000);

/** A page of a list; `nextCursor` is null at the end. */
export const pageOf = <Item extends z.ZodType>(item: Item) =>
  z.object({ items: z.array(item), nextCursor: z.string().nullable() });

/** An IANA time zone that this runtime knows. */
export const timeZoneField = z.string().refine((zone) => {
  try {
    return new Intl.DateTimeFormat('en-US', { timeZone: zone }).resolvedOptions().timeZone !== '';
  } catch {
    return false;
  }
}, 'Choose a time zone from the list');

/** A secret in an address: 256 bits in base64url. */
export const tokenField = z.string().regex(/^[\w-]{43}$/);
