import type { SiteKey } from './accounts';
import { cast } from './cast';
import type { CastMember } from './cast';
import type { Day } from './days';
import { weekdayOf } from './days';
import { dice } from './dice';
import type { Dice } from './dice';
import { fateOf, payers } from './fates';
import type { Fate } from './fates';
import { familyNames, mensNames, womensNames } from './names';
import { daysOfHistory, demoSites } from './program';
import { allSituations, singleSituations, situationNamed, usualSituations } from './situations';
import type { Situation } from './situations';

export interface Person {
  readonly index: number;
  /** Follows the index: the seed of all that is drawn for this person. */
  readonly key: string;
  readonly familyName: string;
  readonly givenName: string;
  readonly sex: 'female' | 'male' | 'unknown';
  readonly ageAtEnrollment: number;
  readonly birthDay: Day;
  readonly email: string | null;
  readonly phone: string | null;
  readonly site: SiteKey;
  readonly payer: string;
  readonly situation: Situation;
  readonly referredOn: Day;
  readonly enrolledOn: Day;
  readonly eventOn: Day;
  readonly fate: Fate;
}

/** A person or so a week for the first ten months, then eight a week: the program grew. */
const earlyPeople = 46;
const peopleByTheFirstDay = 166;

function arrival(index: number): number {
  return index < earlyPeople
    ? 5 - daysOfHistory + Math.floor(index * 6.5)
    : Math.floor(-106 + (index - earlyPeople) * 0.88);
}

/** Its multiples less their whole part lie evenly between 0 and 1. */
const goldenRatio = (1 + Math.sqrt(5)) / 2;

/** Intake is on weekdays, save where the cast says otherwise. */
function enrollmentDay(index: number, anchor: Day): Day {
  const pinned = cast.get(index)?.enrolled;
  if (pinned !== undefined) return anchor + pinned;
  const day = anchor + arrival(index);
  return weekdayOf(day) > 5 ? day + 8 - weekdayOf(day) : day;
}

/** The single situations are dealt among those who were there by the first day, a usual one to all others. */
function dealSituations(): ReadonlyMap<number, Situation> {
  const draw = dice('deal');
  const free = Array.from({ length: peopleByTheFirstDay - 4 }, (_, index) => index)
    .filter((index) => !cast.has(index))
    .map((index) => ({ index, at: draw.next() }))
    .sort((a, b) => a.at - b.at);
  return new Map(
    singleSituations.map((situation, each) => [free[each]?.index ?? -1, situation] as const),
  );
}

const dealt = dealSituations();

function situationOf(index: number, draw: Dice): Situation {
  const pinned = cast.get(index)?.situation;
  if (pinned) return situationNamed(pinned);
  const single = dealt.get(index);
  if (single) return single;
  return index < peopleByTheFirstDay
    ? draw.weigh(usualSituations, ({ share }) => share)
    : draw.weigh(allSituations, ({ share }) => share || 0.3);
}

function sexOf({ sex, diagnosis }: Situation, draw: Dice): Person['sex'] {
  if (sex !== 'either') return sex;
  return draw.chance(diagnosis === 'bypass' || diagnosis === 'heart-attack' ? 0.3 : 0.4)
    ? 'female'
    : 'male';
}

/** Names go round the lists, so that none comes twice in several years. */
function nameOf(index: number, sex: Person['sex']): Pick<Person, 'familyName' | 'givenName'> {
  const given = sex === 'male' ? mensNames : womensNames;
  const at = (list: readonly string[], position: number) => list[position % list.length] ?? '';
  return { familyName: at(familyNames, index * 89), givenName: at(given, index * 37 + 11) };
}

/** A mailbox that can be typed: accents off, under a domain that cannot exist. */
function emailOf(name: Pick<Person, 'familyName' | 'givenName'>): string {
  const plain = (text: string) =>
    text
      .normalize('NFD')
      .replace(/[^a-zA-Z-]/g, '')
      .toLowerCase();
  return `${plain(name.givenName)}.${plain(name.familyName)}@mail.example`;
}

function contactOf(
  index: number,
  name: Pick<Person, 'familyName' | 'givenName'>,
  draw: Dice,
): Pick<Person, 'email' | 'phone'> {
  const line = String(100 + (index % 100)).padStart(4, '0');
  return {
    email: draw.chance(0.14) ? null : emailOf(name),
    phone: draw.chance(0.05) ? null : `${draw.pick(['207', '715', '603'])}-555-${line}`,
  };
}

function fateFor(pinned: CastMember | undefined, usual: Fate): Fate {
  return pinned?.fate ? { ...usual, ...pinned.fate } : usual;
}

/** Before the referral, and before the test where the test still stands after it. */
function eventDay(
  { diagnosis, facts: { test } }: Situation,
  enrolledOn: Day,
  referredOn: Day,
  draw: Dice,
): Day {
  const event = referredOn - draw.whole(2, diagnosis === 'heart-failure' ? 60 : 21);
  return test ? Math.min(event, enrolledOn - test.daysAgo - draw.whole(4, 12)) : event;
}

function personAt(index: number, anchor: Day): Person {
  const key = `person ${index}`;
  const draw = dice(key);
  const pinned = cast.get(index);
  const situation = situationOf(index, draw);
  const sex = pinned?.sex ?? sexOf(situation, draw);
  const name = pinned?.name ?? nameOf(index, sex);
  const age = draw.whole(...situation.ages);
  const payer = draw.weigh(payers, ({ weight, from }) => (age >= from ? weight : 0)).name;
  const enrolledOn = enrollmentDay(index, anchor);
  const referredOn = enrolledOn - draw.whole(3, 9);
  return {
    index,
    key,
    ...name,
    sex,
    ageAtEnrollment: age,
    birthDay: enrolledOn - Math.floor(age * 365.25) - draw.whole(20, 340),
    ...contactOf(index, name, draw),
    ...(pinned?.email ? { email: pinned.email } : {}),
    site: pinned?.site ?? draw.weigh(demoSites, ({ share }) => share).key,
    payer,
    situation,
    referredOn,
    enrolledOn,
    eventOn: eventDay(situation, enrolledOn, referredOn, draw),
    fate: fateFor(
      pinned,
      fateOf(draw, { diagnosis: situation.diagnosis, age, payer, luck: (index * goldenRatio) % 1 }),
    ),
  };
}

/** Whether a channel is kept for this person. */
export function isMonitored({ situation, key }: Person): boolean {
  const { risk } = situation.facts;
  return risk === 'moderate' ? dice(key, 'monitored').chance(0.6) : risk !== 'low';
}

/** In the order of arrival, everybody up to a few weeks after a day: who comes later changes nothing for them. */
export function peopleAround(day: Day, anchor: Day): Person[] {
  const people: Person[] = [];
  const longestWait = 16;
  for (let index = 0; anchor + arrival(index) <= day + longestWait; index++) {
    people.push(personAt(index, anchor));
  }
  return people;
}
