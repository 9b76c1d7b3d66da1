import type { Day } from './days';
import { instantAt, isoOf } from './days';
import { dice } from './dice';
import type { Fate, LeavingReason } from './fates';
import { bookingDays, closedDay, siteOf } from './program';
import type { Slot } from './slots';

/** `held`: came, and was not let exercise. */
export type VisitState = 'booked' | 'attended' | 'held' | 'noshow' | 'cancelled';

/** What becomes of one booking. */
export interface Outcome {
  readonly state: VisitState;
  readonly cancelledAt: Date | null;
  readonly cancelledReason: string | null;
  readonly cancelledByProgram: boolean;
}

/** What has been seen of a course before a day. */
export interface Seen {
  readonly attended: number;
  readonly missed: number;
  readonly lastSession: Day | null;
  /** No-shows since the last session, once the person has left. */
  readonly missedSinceLeaving: number;
  readonly away: { readonly from: Day; readonly to: Day } | null;
}

/** What an outcome depends on that does not change. */
export interface OutcomeContext {
  readonly key: string;
  readonly slot: Slot;
  readonly fate: Fate;
  readonly anchor: Day;
}

/** So that no-shows never eat up the places that a course may hold. */
const mostMissed = 6;

/** Days from the last session to the closing of the course. */
const closesAfter: Record<LeavingReason, number> = {
  'stopped coming': 21,
  'returned to work': 3,
  'moved away': 2,
  died: 2,
  'new event': 4,
  'medical discharge': 3,
};

export const plain = (state: VisitState): Outcome => ({
  state,
  cancelledAt: null,
  cancelledReason: null,
  cancelledByProgram: false,
});

const cancelled = (cancelledAt: Date, reason: string, byProgram = false): Outcome => ({
  state: 'cancelled',
  cancelledAt,
  cancelledReason: reason,
  cancelledByProgram: byProgram,
});

/** The day on which a course closes because the person left, once the last session is behind. */
export function leavingDay({ fate }: Pick<OutcomeContext, 'fate'>, seen: Seen): Day | null {
  if (!fate.leaves || seen.lastSession === null || seen.attended < fate.leaves.after) return null;
  return seen.lastSession + closesAfter[fate.leaves.reason];
}

function leavingOutcome(
  context: OutcomeContext,
  day: Day,
  closes: Day,
  seen: Seen,
): Outcome | null {
  const zone = siteOf(context.slot.site).timeZone;
  if (day < closes) {
    return seen.missedSinceLeaving < 2
      ? plain('noshow')
      : cancelled(instantAt(day - 1, 15 * 60 + 40, zone), 'Not reached by phone');
  }
  if (day - bookingDays >= closes) return null;
  const reason = context.fate.leaves?.reason ?? 'left';
  return cancelled(instantAt(closes, 16 * 60, zone), `Course closed: ${reason}`, true);
}

function awayOutcome(context: OutcomeContext, day: Day, from: Day): Outcome | null {
  if (day - bookingDays >= from) return null;
  const at = instantAt(from, 12 * 60, siteOf(context.slot.site).timeZone);
  return cancelled(at, context.fate.gap?.closed ? 'Asked to stop' : 'On hold');
}

function usualOutcome({ key, slot, fate, anchor }: OutcomeContext, day: Day, seen: Seen): Outcome {
  const zone = siteOf(slot.site).timeZone;
  const closed = closedDay(anchor);
  if (day === closed.day && slot.site === closed.site) {
    return cancelled(instantAt(day, 6 * 60 + 5, zone), `Closed: ${closed.reason}`, true);
  }
  const draw = dice(key, 'outcome', isoOf(day));
  if (draw.chance(fate.reliability)) return plain(draw.chance(0.012) ? 'held' : 'attended');
  if (draw.chance(0.45) && seen.missed < mostMissed) return plain('noshow');
  const reason = draw.pick(['Unwell', 'No ride', 'Other appointment', 'Weather', 'Family']);
  if (draw.chance(0.3)) return cancelled(instantAt(day, 6 * 60 + 20, zone), reason);
  const daysBefore = draw.whole(1, 2);
  return cancelled(instantAt(day - daysBefore, 15 * 60 + draw.whole(0, 110), zone), reason);
}

/** What a booking on a day comes to; null: none is made. */
export function outcomeOf(context: OutcomeContext, day: Day, seen: Seen): Outcome | null {
  const closes = leavingDay(context, seen);
  if (closes !== null) return leavingOutcome(context, day, closes, seen);
  const { away } = seen;
  if (away && day >= away.from && day < away.to) return awayOutcome(context, day, away.from);
  return usualOutcome(context, day, seen);
}
