const plain = (text: string): string =>
  text
    .toLowerCase()
    .replaceAll(/[_\s]+/g, ' ')
    .trim();

/** The zones of this browser whose name holds every word of the query, those that begin with it first; `most` at most. */
export function matchingZones(zones: readonly string[], query: string, most = 40): string[] {
  const words = plain(query).split(' ');
  const begins = (zone: string): boolean =>
    plain(zone)
      .split('/')
      .some((part) => part.startsWith(plain(query)));
  const found = zones.filter((zone) => words.every((word) => plain(zone).includes(word)));
  return [...found.filter(begins), ...found.filter((zone) => !begins(zone))].slice(0, most);
}

/** The time of day of an instant in a zone, '' when there is no such zone. */
export function timeIn(timeZone: string, instant: Date): string {
  try {
    return new Intl.DateTimeFormat('en-US', {
      timeZone,
      weekday: 'long',
      hour: 'numeric',
      minute: '2-digit',
    }).format(instant);
  } catch {
    return '';
  }
}
