const localDate = new Intl.DateTimeFormat('en-US', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
  timeZone: 'UTC',
});

/** A date of the local calendar, YYYY-MM-DD, as "Nov 18, 2026". */
export const formatLocalDate = (date: string): string =>
  localDate.format(new Date(`${date}T00:00:00Z`));

/** The day of an instant in a zone, as "Nov 18, 2026". */
export const formatDay = (instant: string, timeZone: string): string =>
  new Intl.DateTimeFormat('en-US', {
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    timeZone,
  }).format(new Date(instant));

/** The wall clock of an instant in a zone, as "9:05 AM". */
export const formatTime = (instant: string, timeZone: string): string =>
  new Intl.DateTimeFormat('en-US', { hour: 'numeric', minute: '2-digit', timeZone }).format(
    new Date(instant),
  );
