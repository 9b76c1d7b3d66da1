const count = /^[1-9]\d{0,2}$/;

/** The parts that a rule of dates may have, and how each is written (RFC 5545 section 3.3.10). */
const PARTS: Record<string, RegExp> = {
  FREQ: /^(DAILY|WEEKLY|MONTHLY|YEARLY)$/,
  INTERVAL: count,
  COUNT: count,
  UNTIL: /^\d{8}(T\d{6}Z?)?$/,
  BYDAY: /^([+-]?[1-5]?(MO|TU|WE|TH|FR|SA|SU))(,[+-]?[1-5]?(MO|TU|WE|TH|FR|SA|SU))*$/,
  BYMONTHDAY: /^-?([1-9]|[12]\d|3[01])(,-?([1-9]|[12]\d|3[01]))*$/,
  BYMONTH: /^([1-9]|1[0-2])(,([1-9]|1[0-2]))*$/,
  BYSETPOS: /^-?[1-9]\d?(,-?[1-9]\d?)*$/,
  WKST: /^(MO|TU|WE|TH|FR|SA|SU)$/,
};

/** The parts of a rule, or null when one is malformed or stands twice. */
function partsOf(recurrence: string): Map<string, string> | null {
  const parts = new Map<string, string>();
  for (const part of recurrence.split(';')) {
    const [, name, value] = /^([A-Z]+)=([A-Z0-9,+-]+)$/.exec(part) ?? [];
    if (name === undefined || value === undefined || parts.has(name)) return null;
    parts.set(name, value);
  }
  return parts;
}

/**
 * Why a text is no rule that a class can recur by, or null when it is one. Rules of dates alone are taken: the time of day
 * is the class's own, so BYHOUR and the like have no place.
 */
export function recurrenceFault(recurrence: string): string | null {
  const parts = partsOf(recurrence);
  if (parts === null) return 'not a recurrence rule';
  for (const [name, value] of parts) {
    const pattern = PARTS[name];
    if (pattern === undefined) return `${name} has no place in a class’s rule`;
    if (!pattern.test(value)) return `${name} can’t be ${value}`;
  }
  if (!parts.has('FREQ')) return 'FREQ is missing';
  if (parts.has('COUNT') && parts.has('UNTIL')) return 'COUNT and UNTIL exclude each other';
  return null;
}
