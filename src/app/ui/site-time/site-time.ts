/** Words for instants and dates; a class is always told by the clock of its site. */

const english = 'en-US';

/** `9:00 AM` on the clock of a zone. @param instant ISO 8601 with offset */
export function timeOf(instant: string, timeZone: string): string {
  const format = new Intl.DateTimeFormat(english, { timeZone, timeStyle: 'short' });
  return plainSpaces(format.format(new Date(instant)));
}

/** `9:00 AM to 10:00 AM` on the clock of a zone. */
export function spanOf(
  { startsAt, endsAt }: { readonly startsAt: string; readonly endsAt: string },
  timeZone: string,
): string {
  return `${timeOf(startsAt, timeZone)} to ${timeOf(endsAt, timeZone)}`;
}

/** `9:00 AM` of a wall time, HH:MM. */
export function clockOf(localTime: string): string {
  return timeOf(`1970-01-01T${localTime}:00Z`, 'UTC');
}

const dateFormats = {
  /** Monday, December 7 */
  long: { weekday: 'long', month: 'long', day: 'numeric' },
  /** Mon, Dec 7 */
  short: { weekday: 'short', month: 'short', day: 'numeric' },
  /** December 7, 2026 */
  full: { month: 'long', day: 'numeric', year: 'numeric' },
  /** December 2026 */
  month: { month: 'long', year: 'numeric' },
} as const satisfies Record<string, Intl.DateTimeFormatOptions>;

/** A calendar date in words; no clock and no zone takes part. @param localDate YYYY-MM-DD */
export function dateInWords(localDate: string, format: keyof typeof dateFormats): string {
  const options = { ...dateFormats[format], timeZone: 'UTC' };
  return new Intl.DateTimeFormat(english, options).format(new Date(`${localDate}T00:00:00Z`));
}

/** The zone that this browser shows its own clock in. */
export function browserZone(): string {
  return new Intl.DateTimeFormat().resolvedOptions().timeZone;
}

/**
 * `Times are Eastern Standard Time, the clock of Quayside`, when the clock of the browser shows another time, else null.
 * @param instant at which the two are compared
 */
export function otherZoneNote(
  site: { readonly name: string; readonly timeZone: string },
  instant: Date,
  own = browserZone(),
): string | null {
  const shown = (timeZone: string) =>
    new Intl.DateTimeFormat(english, { timeZone, dateStyle: 'short', timeStyle: 'short' }).format(
      instant,
    );
  if (shown(site.timeZone) === shown(own)) return null;
  const parts = new Intl.DateTimeFormat(english, {
    timeZone: site.timeZone,
    timeZoneName: 'long',
  }).formatToParts(instant);
  const name = parts.find(({ type }) => type === 'timeZoneName')?.value ?? site.timeZone;
  return `Times are ${name}, the clock of ${site.name}.`;
}

/** Newer runtimes put a narrow no-break space before AM and PM, which our font does not hold. */
function plainSpaces(text: string): string {
  return text.replace(/\u202f/g, ' ');
}
