import type { Clock } from './clock';
import { instantAt, isoOf, minutesLater, weekdayOf } from './days';
import type { Day } from './days';
import type { Fate } from './fates';
import { leavingDay, outcomeOf, plain } from './outcomes';
import type { Outcome, Seen } from './outcomes';
import { dice } from './dice';
import { bookingDays, classAt, classMinutes, maintenanceHour, siteOf } from './program';
import type { DiagnosisKind } from './situations';
import type { Slot } from './slots';

/** One enrollment as it is meant to go. */
export interface CoursePlan {
  readonly key: string;
  readonly phase: 2 | 3;
  readonly diagnosis: DiagnosisKind;
  readonly eventOn: Day;
  readonly enrolledOn: Day;
  readonly slot: Slot;
  readonly fate: Fate;
  /** Whether a self-pay class is booked each Saturday beside the course. */
  readonly extraClass: boolean;
}

export interface Visit extends Outcome {
  readonly key: string;
  readonly classKey: string;
  readonly selfPay: boolean;
  readonly day: Day;
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly bookedAt: Date;
  /** Sessions attended before this one. */
  readonly attendedBefore: number;
  /** Pays soon after booking: only who will keep the place, so that the story has nothing to give back. */
  readonly paysAhead: boolean;
}

export interface Closing {
  readonly on: Day;
  readonly at: Date;
  readonly status: 'completed' | 'discontinued';
  readonly reason: string;
}

/** A course as far as it has gone. */
export interface Course {
  readonly plan: CoursePlan;
  readonly visits: readonly Visit[];
  readonly status: 'active' | 'on-hold' | 'completed' | 'discontinued';
  readonly closing: Closing | null;
  /** How often its status has changed. */
  readonly changes: number;
  /** A closing that was not for good: when it was, and the day of the return, once that has come. */
  readonly pause: { readonly at: Date; readonly back: Day } | null;
}

const extraWeekday = 6;
const daysToGiveUp = 40;
const maintenanceAhead = 10;

/** A course that is being followed, day by day, to where the clock stands. */
interface Walk {
  readonly plan: CoursePlan;
  readonly clock: Clock;
  readonly visits: Visit[];
  /** Booked and not yet held. */
  expected: number;
  seen: Seen;
}

const zoneOf = ({ plan }: Pick<Walk, 'plan'>) => siteOf(plan.slot.site).timeZone;

/** What has not happened yet is not told. */
function soFar({ clock, plan }: Walk, outcome: Outcome, endsAt: Date): Outcome {
  const happened = outcome.cancelledAt
    ? outcome.cancelledAt <= clock.now
    : endsAt <= clock.heldUntil(plan.slot.site);
  return happened ? outcome : plain('booked');
}

function visitOn(walk: Walk, day: Day, hour: number, bookedAt: Date, outcome: Outcome): Visit {
  const { plan } = walk;
  const selfPay = hour === maintenanceHour && (plan.slot.selfPay || plan.extraClass);
  const startsAt = instantAt(day, hour * 60, zoneOf(walk));
  const endsAt = minutesLater(startsAt, classMinutes);
  const key = `${plan.key} ${isoOf(day)} ${hour}`;
  const keeps = outcome.cancelledAt === null && plan.fate.leaves === null && plan.fate.gap === null;
  return {
    key,
    classKey: classAt(plan.slot.site, hour, selfPay).key,
    selfPay,
    day,
    startsAt,
    endsAt,
    bookedAt,
    attendedBefore: walk.seen.attended,
    paysAhead: selfPay && keeps && dice(key, 'ahead').chance(0.4),
    ...soFar(walk, outcome, endsAt),
  };
}

function count(walk: Walk, { state, day }: Visit): void {
  const { seen } = walk;
  const leaving = leavingDay(walk.plan, seen) !== null;
  if (state === 'booked') walk.expected++;
  if (state === 'noshow') {
    const missedSinceLeaving = seen.missedSinceLeaving + (leaving ? 1 : 0);
    walk.seen = { ...seen, missed: seen.missed + 1, missedSinceLeaving };
  }
  if (state === 'attended') {
    const attended = seen.attended + 1;
    const { gap } = walk.plan.fate;
    const away = gap?.after === attended ? { from: day + 1, to: day + 1 + gap.days } : seen.away;
    walk.seen = { ...seen, attended, lastSession: day, away };
  }
}

function bookedAtFor(walk: Walk, day: Day): Date {
  const { plan, seen } = walk;
  const ahead = plan.phase === 2 ? bookingDays : maintenanceAhead;
  const earliest = seen.away && day >= seen.away.to ? seen.away.to : plan.enrolledOn;
  return instantAt(Math.max(day - ahead, earliest), 13 * 60 + (plan.enrolledOn % 50), zoneOf(walk));
}

/** @returns false when nothing further is booked */
function step(walk: Walk, day: Day): boolean {
  const { plan, clock, seen } = walk;
  if (seen.attended + walk.expected >= plan.fate.plannedSessions) return false;
  const bookedAt = bookedAtFor(walk, day);
  if (bookedAt > clock.now) return false;
  if (!plan.slot.weekdays.includes(weekdayOf(day))) return true;
  const outcome = outcomeOf({ ...plan, anchor: clock.anchor }, day, seen);
  if (!outcome) return leavingDay(plan, seen) === null;
  const visit = visitOn(walk, day, plan.slot.hour, bookedAt, outcome);
  walk.visits.push(visit);
  count(walk, visit);
  return true;
}

/** Beside the course, and not counted in its plan: a second walk along the same days. */
function stepExtra(walk: Walk, day: Day): void {
  if (!walk.plan.extraClass || weekdayOf(day) !== extraWeekday) return;
  const bookedAt = instantAt(day - 8, 10 * 60 + 15, zoneOf(walk));
  if (bookedAt > walk.clock.now) return;
  walk.visits.push(visitOn(walk, day, maintenanceHour, bookedAt, plain('attended')));
}

function closingOf(walk: Walk): Closing | null {
  const { plan, clock, seen } = walk;
  const zone = zoneOf(walk);
  const close = (on: Day, at: Date, status: Closing['status'], reason: string) =>
    at <= clock.now ? { on, at, status, reason } : null;
  if (plan.fate.startsAfter === null) {
    const on = plan.enrolledOn + daysToGiveUp;
    return close(on, instantAt(on, 11 * 60, zone), 'discontinued', 'never started');
  }
  if (seen.attended >= plan.fate.plannedSessions && seen.lastSession !== null) {
    const on = seen.lastSession;
    const at = instantAt(on, (plan.slot.hour + 1) * 60 + 50, zone);
    return close(
      on,
      at,
      'completed',
      plan.fate.plannedSessions < 36 ? 'covered number done' : 'completed',
    );
  }
  const leaves = leavingDay(plan, seen);
  if (leaves === null) return null;
  return close(
    leaves,
    instantAt(leaves, 16 * 60, zone),
    'discontinued',
    plan.fate.leaves?.reason ?? '',
  );
}

function statusOf(
  walk: Walk,
  closing: Closing | null,
): Pick<Course, 'status' | 'closing' | 'changes' | 'pause'> {
  const { plan, clock, seen } = walk;
  const noon = (day: Day) => instantAt(day, 12 * 60, zoneOf(walk));
  const left = seen.away !== null && noon(seen.away.from) <= clock.now;
  const back = seen.away !== null && noon(seen.away.to) <= clock.now;
  const before = (left ? 1 : 0) + (back ? 1 : 0);
  const away = plan.fate.gap?.closed && back ? seen.away : null;
  const pause = away && { at: noon(away.from), back: away.to };
  if (closing) return { status: closing.status, closing, changes: before + 1, pause };
  if (!left || back || !seen.away)
    return { status: 'active', closing: null, changes: before, pause };
  if (!plan.fate.gap?.closed) return { status: 'on-hold', closing: null, changes: before, pause };
  const { from } = seen.away;
  return {
    status: 'discontinued',
    closing: { on: from, at: noon(from), status: 'discontinued', reason: 'asked to stop' },
    changes: before,
    pause,
  };
}

/** Follows a plan to the moment of the clock. */
export function followCourse(plan: CoursePlan, clock: Clock): Course {
  const seen = { attended: 0, missed: 0, missedSinceLeaving: 0, lastSession: null, away: null };
  const walk: Walk = { plan, clock, visits: [], expected: 0, seen };
  const last = clock.today(plan.slot.site) + bookingDays;
  if (plan.fate.startsAfter !== null) {
    let going = true;
    for (let day = plan.enrolledOn + plan.fate.startsAfter; going && day <= last; day++) {
      going = step(walk, day);
      if (going) stepExtra(walk, day);
    }
  }
  return { plan, visits: walk.visits, ...statusOf(walk, closingOf(walk)) };
}
