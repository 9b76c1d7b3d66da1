import { patientAccountIndex } from './cast';
import { openChart } from './chart';
import type { Chart } from './chart';
import { accountUserId, atSite, crewOf, workday } from './charting';
import type { Crew } from './charting';
import type { Clock } from './clock';
import type { Day } from './days';
import { idAt } from './dice';
import type { EffortReading } from './observed-work';
import type { Person } from './people';
import type { IssuedRange, Withdrawal } from './ranges';
import type { Scribe } from './record-entries';
import { noRows } from './rows';
import type { PeopleRows } from './rows';

/** One person's story while it is told: the rows so far, and what is known that the next ones rest on. */
export interface Telling {
  readonly person: Person;
  readonly clock: Clock;
  readonly rows: PeopleRows;
  readonly patientId: string;
  readonly userId: string | null;
  readonly crew: Crew;
  chart: Chart;
  readonly ranges: IssuedRange[];
  /** How many of them earlier courses hold. */
  rangesBefore: number;
  readonly readings: EffortReading[];
  attended: number;
  firstSession: Day | null;
  lastSession: Day | null;
  /** Only what was seen in class after it counts as seen on today's drugs. */
  changedOn: Day;
  /** When the record last changed so that the range in force no longer rests on it. */
  withdrawal: Withdrawal | null;
  /** When the next range is to be written. */
  nextRange: { readonly on: Day; readonly afterChange: boolean } | null;
  turnDone: boolean;
}

export function beginTelling(person: Person, clock: Clock): Telling {
  const referredAt = atSite(person.site, person.referredOn, workday.referral);
  return {
    person,
    clock,
    rows: noRows(),
    patientId: idAt(referredAt, person.key, 'patient'),
    userId: person.index === patientAccountIndex ? accountUserId(clock.anchor) : null,
    crew: crewOf(person.site, clock.anchor),
    chart: openChart(person),
    ranges: [],
    rangesBefore: 0,
    readings: [],
    attended: 0,
    firstSession: null,
    lastSession: null,
    changedOn: person.eventOn + 1,
    withdrawal: null,
    nextRange: null,
    turnDone: person.fate.turn === null,
  };
}

/** The physiologist at the chart. */
export function scribeAt({ person, patientId, crew }: Telling, at: Date): Scribe {
  return { personKey: person.key, patientId, by: crew.physiologist, at };
}
