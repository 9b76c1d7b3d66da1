import { clockAt } from './clock';
import type { Clock } from './clock';
import { followCourse } from './courses';
import type { Course, CoursePlan } from './courses';
import type { Day } from './days';
import { dice } from './dice';
import { patientAccountIndex } from './cast';
import { fateOf } from './fates';
import type { Fate } from './fates';
import { isMonitored } from './people';
import type { Person } from './people';
import { openSlotBook } from './slots';
import type { Slot, SlotBook, Span } from './slots';

/** A person with the courses so far, in their order. */
export interface FollowedPerson {
  readonly person: Person;
  readonly courses: readonly Course[];
}

const daysToSecondCourse = 40;
export const daysToMaintenance = 5;
const maintenanceSessions = 60;

function firstPlan(person: Person, slot: Slot): CoursePlan {
  return {
    key: `${person.key} course 1`,
    phase: 2,
    diagnosis: person.situation.diagnosis,
    eventOn: person.eventOn,
    enrolledOn: person.enrolledOn,
    slot,
    fate: person.fate,
    extraClass: person.index === patientAccountIndex,
  };
}

/** After a new event the old course has closed and another begins. */
function secondPlan(person: Person, first: Course): CoursePlan | null {
  if (first.closing?.reason !== 'new event') return null;
  const enrolledOn = first.closing.on + daysToSecondCourse;
  const key = `${person.key} course 2`;
  const draw = dice(key, 'fate');
  const { ageAtEnrollment: age, payer } = person;
  const fate = fateOf(draw, { diagnosis: 'stent', age, payer, luck: draw.next() });
  return {
    ...first.plan,
    key,
    diagnosis: 'stent',
    eventOn: first.closing.on - 1,
    enrolledOn,
    fate: { ...fate, startsAfter: 4, maintenance: false, turn: null, gap: null },
  };
}

function maintenanceFate(key: string): Fate {
  const draw = dice(key, 'fate');
  return {
    plannedSessions: maintenanceSessions,
    pace: 2,
    startsAfter: 2,
    reliability: draw.near(0.88, 0.05),
    leaves: draw.chance(0.3) ? { after: draw.whole(8, 30), reason: 'stopped coming' } : null,
    gap: null,
    maintenance: false,
    turn: null,
    signing: { physiologist: 0, physician: 0 },
  };
}

function maintenancePlan(
  person: Person,
  last: Course,
  book: SlotBook,
  end: Clock,
): CoursePlan | null {
  if (!person.fate.maintenance || last.closing?.status !== 'completed') return null;
  const enrolledOn = last.closing.on + daysToMaintenance;
  const key = `${person.key} maintenance`;
  const fate = maintenanceFate(key);
  const planIn = (slot: Slot): CoursePlan => ({
    ...last.plan,
    key,
    phase: 3,
    enrolledOn,
    slot,
    fate,
    extraClass: false,
  });
  const slot = book.keepMaintenance(key, person.site, (asked) =>
    spanOfVisits([followCourse(planIn(asked), end)], enrolledOn),
  );
  return slot && planIn(slot);
}

/** After every course of whoever is there now, so that all of it has happened. */
const inTheEnd = (clock: Clock): Clock =>
  clockAt(clock.anchor, new Date(clock.now.getTime() + 4 * 365 * 86_400_000));

/** From the first place that is ever booked to the last, those that are given back too. */
function spanOfVisits(courses: readonly Course[], from: Day): Span {
  const days = courses.flatMap(({ visits }) => visits.map(({ day }) => day));
  return { from: Math.min(...days, from), to: Math.max(...days, from) };
}

/** The weekly places of a person, kept for as long as the courses will go on in them. */
function keptSlot(person: Person, book: SlotBook, end: Clock): Slot {
  const { key, site, enrolledOn, fate } = person;
  return book.keep({ key, site, pace: fate.pace, monitored: isMonitored(person) }, (slot) => {
    const first = followCourse(firstPlan(person, slot), end);
    const second = secondPlan(person, first);
    const courses = second ? [first, followCourse(second, end)] : [first];
    return spanOfVisits(courses, enrolledOn + (fate.startsAfter ?? 0));
  });
}

/** Everybody's courses to where the clock stands. Places go in the order of asking, so a later telling moves nobody. */
export function followPeople(people: readonly Person[], clock: Clock): FollowedPerson[] {
  const book = openSlotBook();
  const begun = (plan: { enrolledOn: number }, person: Person) =>
    plan.enrolledOn <= clock.today(person.site);
  const end = inTheEnd(clock);
  const slots = people.map((person) => keptSlot(person, book, end));
  const phase2 = people.map((person, each) => {
    const slot = slots[each];
    if (!slot || !begun(person, person)) return { person, courses: [] };
    const first = followCourse(firstPlan(person, slot), clock);
    const second = secondPlan(person, first);
    const courses =
      second && begun(second, person) ? [first, followCourse(second, clock)] : [first];
    return { person, courses };
  });
  const byLastDay = [...phase2].sort(
    (a, b) =>
      (a.courses.at(-1)?.closing?.on ?? Infinity) - (b.courses.at(-1)?.closing?.on ?? Infinity),
  );
  const maintained = new Map<number, Course>();
  for (const { person, courses } of byLastDay) {
    const last = courses.at(-1);
    const plan = last && maintenancePlan(person, last, book, end);
    if (plan && begun(plan, person)) maintained.set(person.index, followCourse(plan, clock));
  }
  return phase2.map(({ person, courses }) => {
    const more = maintained.get(person.index);
    return { person, courses: more ? [...courses, more] : courses };
  });
}
