import type { Clock } from './clock';
import { followCourse } from './courses';
import type { Course, CoursePlan } from './courses';
import { dice } from './dice';
import { patientAccountIndex } from './cast';
import { fateOf } from './fates';
import type { Fate } from './fates';
import { isMonitored } from './people';
import type { Person } from './people';
import { openSlotBook } from './slots';
import type { Slot, SlotBook } from './slots';

/** A person with the courses so far, in their order. */
export interface FollowedPerson {
  readonly person: Person;
  readonly courses: readonly Course[];
}

const daysToSecondCourse = 40;
export const daysToMaintenance = 5;
const maintenanceSessions = 48;

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
    leaves: draw.chance(0.3) ? { after: draw.whole(4, 20), reason: 'stopped coming' } : null,
    gap: null,
    maintenance: false,
    turn: null,
    signing: { physiologist: 0, physician: 0 },
  };
}

function maintenancePlan(person: Person, last: Course, book: SlotBook): CoursePlan | null {
  if (!person.fate.maintenance || last.closing?.status !== 'completed') return null;
  const enrolledOn = last.closing.on + daysToMaintenance;
  const key = `${person.key} maintenance`;
  const slot = book.keepMaintenance(key, person.site, { from: enrolledOn, to: enrolledOn + 220 });
  if (!slot) return null;
  return {
    ...last.plan,
    key,
    phase: 3,
    enrolledOn,
    slot,
    fate: maintenanceFate(key),
    extraClass: false,
  };
}

/** How long the weekly places are kept: the plan at its pace with a third to spare, and what may come between. */
function keptSlot(person: Person, book: SlotBook): Slot {
  const { startsAfter, plannedSessions, pace, gap, leaves } = person.fate;
  const from = person.enrolledOn + (startsAfter ?? 0);
  const weeks = (plannedSessions / pace) * 1.33 + 2;
  const between = (gap ? gap.days + 7 : 0) + (leaves?.reason === 'new event' ? 190 : 0);
  const to = startsAfter === null ? from : from + Math.ceil(weeks * 7) + between;
  return book.keep(person.key, person.site, pace, isMonitored(person), { from, to });
}

/** Everybody's courses to where the clock stands. Places go in the order of asking, so a later telling moves nobody. */
export function followPeople(people: readonly Person[], clock: Clock): FollowedPerson[] {
  const book = openSlotBook();
  const begun = (plan: { enrolledOn: number }, person: Person) =>
    plan.enrolledOn <= clock.today(person.site);
  const slots = people.map((person) => keptSlot(person, book));
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
    const plan = last && maintenancePlan(person, last, book);
    if (plan && begun(plan, person)) maintained.set(person.index, followCourse(plan, clock));
  }
  return phase2.map(({ person, courses }) => {
    const more = maintained.get(person.index);
    return { person, courses: more ? [...courses, more] : courses };
  });
}
