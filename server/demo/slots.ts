import type { SiteKey } from './accounts';
import type { Day } from './days';
import { dice } from './dice';
import type { Dice } from './dice';
import { classAt, closingHour, maintenanceDays, maintenanceHour, openingHour } from './program';

/** The weekly places that a course keeps. */
export interface Slot {
  readonly site: SiteKey;
  readonly hour: number;
  readonly weekdays: readonly number[];
  readonly selfPay: boolean;
}

/** The first and the last day on which a place is held. */
export interface Span {
  readonly from: Day;
  readonly to: Day;
}

interface Candidate {
  readonly slot: Slot;
  readonly span: Span;
}

interface Taken extends Span {
  readonly monitored: boolean;
}

/** The most who are there on one day of a span. */
function mostAtOnce(taken: readonly Taken[], span: Span): number {
  const there = (day: Day) => taken.filter(({ from, to }) => from <= day && day <= to).length;
  const arrivals = taken.map(({ from }) => from).filter((from) => from > span.from);
  return Math.max(...[span.from, ...arrivals].map(there));
}

const sunday = 7;

/** Kept free beside what is given back, for people who book themselves. */
const keptFree = 1;

interface Time {
  /** The class that people of this part of the day are put into first; the hours beside it take who finds no place. */
  readonly hour: number;
  /** Of all who ask at the site, the part that wants it. */
  readonly share: number;
}

/** Staff are there for full classes, so a site fills a few times of the day before it opens more. */
const usualTimes: Record<SiteKey, readonly Time[]> = {
  quayside: [
    { hour: 10, share: 0.4 },
    { hour: 14, share: 0.34 },
    { hour: 17, share: 0.26 },
  ],
  'mill-street': [{ hour: 9, share: 1 }],
};

const weeklyPatterns: Record<2 | 3, readonly (readonly number[])[]> = {
  2: [
    [1, 3],
    [2, 4],
    [1, 5],
    [4, 6],
    [3, 5],
    [2, 6],
    [4, 7],
  ],
  3: [
    [1, 3, 5],
    [2, 4, 6],
    [2, 4, 7],
  ],
};

const maintenancePatterns: readonly (readonly number[])[] = [
  [2, 4],
  [2, 4, 6],
];

/** How long a slot would be held if it were given. */
export type SpanOf = (slot: Slot) => Span;

/** The book of weekly places: who came first has chosen first. */
export interface SlotBook {
  /** Days with most room at the time that is asked for, or as near to it as there is a place. */
  keep(who: { key: string; site: SiteKey; pace: 2 | 3; monitored: boolean }, spanOf: SpanOf): Slot;
  /** Null when the class is full. */
  keepMaintenance(key: string, site: SiteKey, spanOf: SpanOf): Slot | null;
}

export function openSlotBook(): SlotBook {
  const taken = new Map<string, Taken[]>();
  const cell = (site: SiteKey, weekday: number, hour: number) => `${site} ${weekday} ${hour}`;

  const inSpan = (site: SiteKey, weekday: number, hour: number, span: Span) =>
    (taken.get(cell(site, weekday, hour)) ?? []).filter(
      (other) => other.from <= span.to && span.from <= other.to,
    );

  /** How full the classes of a slot are, the fullest counted twice, or Infinity when one has no place or channel left. */
  const crowding = (slot: Slot, monitored: boolean, span: Span) => {
    const { capacity, monitoredPlaces } = classAt(slot.site, slot.hour, slot.selfPay);
    const loads = slot.weekdays.map((weekday) => {
      const others = inSpan(slot.site, weekday, slot.hour, span);
      const there = mostAtOnce(others, span);
      const channels = mostAtOnce(
        others.filter((other) => other.monitored),
        span,
      );
      const full = there >= capacity - keptFree || (monitored && channels >= monitoredPlaces - 1);
      return full ? Infinity : there;
    });
    return Math.max(...loads) + loads.reduce((sum, load) => sum + load, 0) / loads.length;
  };

  const take = ({ site, weekdays, hour }: Slot, monitored: boolean, span: Span) => {
    for (const weekday of weekdays) {
      const name = cell(site, weekday, hour);
      taken.set(name, [...(taken.get(name) ?? []), { ...span, monitored }]);
    }
  };

  /** The one with most room, and takes it. */
  const choose = (candidates: readonly Candidate[], draw: Dice, monitored: boolean) => {
    const [best] = candidates
      .map((each) => ({ ...each, load: crowding(each.slot, monitored, each.span) + draw.next() }))
      .sort((a, b) => a.load - b.load);
    if (!best || best.load === Infinity) return null;
    take(best.slot, monitored, best.span);
    return best.slot;
  };

  return {
    keep({ key, site, pace, monitored }, spanOf) {
      const draw = dice(key, 'slot');
      const { hour: usual } = draw.weigh(usualTimes[site], ({ share }) => share);
      // Nothing of a course hangs on the hour, so that its span is asked for once a pattern.
      const patterns = weeklyPatterns[pace].map((weekdays) => ({
        weekdays,
        span: spanOf({ site, hour: usual, weekdays, selfPay: false }),
      }));
      for (const hour of nearestFirst(usual)) {
        const candidates = patterns
          .filter(({ weekdays }) => isHeld(site, hour, weekdays))
          .map(({ weekdays, span }) => ({ slot: { site, hour, weekdays, selfPay: false }, span }));
        const slot = choose(candidates, draw, monitored);
        if (slot) return slot;
      }
      throw new RangeError(`no place left for ${key}`);
    },
    keepMaintenance(key, site, spanOf) {
      const slots = maintenancePatterns.map((weekdays) => ({
        site,
        hour: maintenanceHour,
        weekdays,
        selfPay: true,
      }));
      const candidates = slots.map((slot) => ({ slot, span: spanOf(slot) }));
      return choose(candidates, dice(key, 'slot'), false);
    },
  };
}

/** Every hour that a class begins, those near to one first. */
function nearestFirst(hour: number): number[] {
  const hours = Array.from({ length: closingHour - openingHour }, (_, each) => openingHour + each);
  return hours.sort((a, b) => Math.abs(a - hour) - Math.abs(b - hour));
}

/** Sundays there is one full class, and at noon on some days the class that people pay themselves. */
function isHeld(site: SiteKey, hour: number, weekdays: readonly number[]): boolean {
  if (weekdays.includes(sunday)) return hour === usualTimes[site][0]?.hour;
  return hour !== maintenanceHour || !weekdays.some((day) => maintenanceDays.includes(day));
}
