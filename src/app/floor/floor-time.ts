const formats = new Map<string, Intl.DateTimeFormat>();

function formatOf(timeZone: string): Intl.DateTimeFormat {
  const known = formats.get(timeZone);
  if (known) return known;
  const format = new Intl.DateTimeFormat('en-US', { timeZone, hour: 'numeric', minute: '2-digit' });
  formats.set(timeZone, format);
  return format;
}

/** `9:24` on the clock of a zone: within one class nobody asks which half of the day. */
export const clockText = (at: Date | string, timeZone: string): string =>
  formatOf(timeZone)
    .formatToParts(new Date(at))
    .filter(({ type }) => type === 'hour' || type === 'minute')
    .map(({ value }) => value)
    .join(':');
