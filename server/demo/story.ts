import type { Clock } from './clock';
import { peopleAround } from './people';
import { tellPerson } from './person-story';
import { followPeople } from './plans';
import type { FollowedPerson } from './plans';
import { noRows } from './rows';
import type { PeopleRows } from './rows';

/** Longer than anybody stays away before coming back to a course or to another. */
const longestAbsenceMs = 65 * 86_400_000;

function isOver({ courses }: FollowedPerson, since: Date): boolean {
  const before = since.getTime() - longestAbsenceMs;
  return (
    courses.length > 0 &&
    courses.every(({ closing }) => closing !== null && closing.at.getTime() < before)
  );
}

/**
 * Everything about the people of the demonstration, as it stands at a moment. The same anchor tells the same past from
 * every later moment, so that two tellings differ only by what has happened between them.
 * @param openSince leaves out people whose courses were all over long before, whose rows no longer change
 */
export function tellStory(clock: Clock, openSince?: Date): PeopleRows {
  const latest = Math.max(clock.today('quayside'), clock.today('mill-street'));
  const rows = noRows();
  for (const followed of followPeople(peopleAround(latest, clock.anchor), clock)) {
    if (openSince && isOver(followed, openSince)) continue;
    const told = tellPerson(followed, clock);
    if (!told) continue;
    for (const table of Object.keys(rows) as (keyof PeopleRows)[]) {
      (rows[table] as unknown[]).push(...told[table]);
    }
  }
  return rows;
}
