import type { SiteKey } from './accounts';
import type { Day } from './days';
import { dice } from './dice';
import { classAt, classPlans, maintenanceDays, maintenanceHour, openingHour } from './program';

/** The weekly places that a course keeps. */
export interface Slot {
  readonly site: SiteKey;
  readonly hour: number;
  readonly weekdays: readonly number[];
  readonly selfPay: boolean;
}

interface Span {
  readonly from: Day;
  readonly to: Day;
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

/** Places kept free for people who book themselves. */
const keptFree = 2;

/** What the front desk is asked for most: not too early, not too late; 1 where not said. */
const wanted: Record<SiteKey, Readonly<Record<number, number>>> = {
  quayside: { 9: 1.6, 10: 6, 11: 1.6 },
  'mill-street': { 9: 4 },
};

const weeklyPatterns: Record<2 | 3, readonly (readonly number[])[]> = {
  2: [
    [1, 4],
    [2, 5],
    [3, 6],
    [4, 7],
    [1, 5],
    [2, 6],
    [3, 7],
  ],
  3: [
    [1, 3, 5],
    [2, 4, 6],
    [2, 4, 7],
    [1, 3, 6],
    [3, 5, 7],
    [1, 4, 6],
    [2, 5, 7],
  ],
};

const maintenancePatterns: readonly (readonly number[])[] = [
  [2, 4],
  [2, 6],
  [4, 6],
];

/** The book of weekly places: who came first has chosen first. */
export interface SlotBook {
  /** A pattern and hour where there is most room for what is wanted. */
  keep(key: string, site: SiteKey, pace: 2 | 3, monitored: boolean, span: Span): Slot;
  /** Null when the class is full. */
  keepMaintenance(key: string, site: SiteKey, span: Span): Slot | null;
}

export function openSlotBook(): SlotBook {
  const taken = new Map<string, Taken[]>();
  const cell = (site: SiteKey, weekday: number, hour: number) => `${site} ${weekday} ${hour}`;

  const inSpan = (site: SiteKey, weekday: number, hour: number, span: Span) =>
    (taken.get(cell(site, weekday, hour)) ?? []).filter(
      (other) => other.from <= span.to && span.from <= other.to,
    );

  /** How full a class is for its wish, or Infinity when it has no place or no channel left. */
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
      return full ? Infinity : (there + 1) / (wanted[slot.site][slot.hour] ?? 1);
    });
    return Math.max(...loads) / 2 + loads.reduce((sum, load) => sum + load, 0) / loads.length;
  };

  const choose = (candidates: readonly Slot[], key: string, monitored: boolean, span: Span) => {
    const draw = dice(key, 'slot');
    const [best] = candidates
      .map((slot) => ({ slot, load: crowding(slot, monitored, span) + draw.next() / 5 }))
      .sort((a, b) => a.load - b.load);
    if (!best || best.load === Infinity) return null;
    for (const weekday of best.slot.weekdays) {
      const name = cell(best.slot.site, weekday, best.slot.hour);
      taken.set(name, [...(taken.get(name) ?? []), { ...span, monitored }]);
    }
    return best.slot;
  };

  return {
    keep(key, site, pace, monitored, span) {
      const hours = [...new Set(classPlans.map(({ hour }) => hour))];
      const candidates = weeklyPatterns[pace].flatMap((weekdays) =>
        hours
          .filter((hour) => hour >= openingHour && !atNoonWithMaintenance(hour, weekdays))
          .map((hour) => ({ site, hour, weekdays, selfPay: false })),
      );
      const slot = choose(candidates, key, monitored, span);
      if (!slot) throw new RangeError(`no place left for ${key}`);
      return slot;
    },
    keepMaintenance(key, site, span) {
      const candidates = maintenancePatterns.map((weekdays) => ({
        site,
        hour: maintenanceHour,
        weekdays,
        selfPay: true,
      }));
      return choose(candidates, key, false, span);
    },
  };
}

function atNoonWithMaintenance(hour: number, weekdays: readonly number[]): boolean {
  return hour === maintenanceHour && weekdays.some((day) => maintenanceDays.includes(day));
}
