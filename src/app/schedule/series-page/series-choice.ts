import type { PlannedDate } from '@shared/contracts/schedule-contract';

/** For each planned date the class date to book, by local date; '' leaves it out. */
export type SeriesChoice = Readonly<Record<string, string>>;

/** What is booked unless the person chooses otherwise: each date that is free; one with a conflict is left out. */
export function initialChoice(plan: readonly PlannedDate[]): SeriesChoice {
  return Object.fromEntries(
    plan.map(({ localDate, classDateId, conflict }) => [
      localDate,
      conflict === null ? (classDateId ?? '') : '',
    ]),
  );
}

/** The class dates to book, each once, in the order of the plan. */
export function chosenIds(plan: readonly PlannedDate[], choice: SeriesChoice): string[] {
  return [...new Set(plan.map(({ localDate }) => choice[localDate] ?? ''))].filter(
    (id) => id !== '',
  );
}

/** Alternatives of a date that no other date of the plan has taken. */
export function freeAlternatives(
  date: PlannedDate,
  choice: SeriesChoice,
): PlannedDate['alternatives'] {
  const taken = Object.entries(choice)
    .filter(([localDate]) => localDate !== date.localDate)
    .map(([, id]) => id);
  return date.alternatives.filter(({ classDateId }) => !taken.includes(classDateId));
}
