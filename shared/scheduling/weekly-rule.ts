const DAYS = ['MO', 'TU', 'WE', 'TH', 'FR', 'SA', 'SU'] as const;

/**
 * The RFC 5545 rule of a class held each week on given days.
 * @param weekdays ISO weekdays, 1 (Monday) to 7 (Sunday)
 */
export function weeklyRule(weekdays: readonly number[]): string {
  const days = DAYS.filter((_, index) => weekdays.includes(index + 1));
  return `FREQ=WEEKLY;BYDAY=${days.join(',')}`;
}

/** The ISO weekdays of a rule that `weeklyRule` could have made, else null: such a rule is shown as its text. */
export function weekdaysOfRule(recurrence: string): number[] | null {
  const [, list] = /^FREQ=WEEKLY;BYDAY=([A-Z,]+)$/.exec(recurrence) ?? [];
  if (list === undefined) return null;
  const weekdays = list.split(',').map((day) => DAYS.findIndex((known) => known === day) + 1);
  return weekdays.includes(0) ? null : weekdays.sort((a, b) => a - b);
}
