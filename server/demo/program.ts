import { recurrenceDates } from '@shared/scheduling/recurrence';
import { weeklyRule } from '@shared/scheduling/weekly-rule';
import type { DateWindow } from '@shared/scheduling/recurrence';
import type { SiteKey } from './accounts';
import { dayOf, instantAt, isoOf, minutesLater } from './days';
import type { Day } from './days';
import { idAt } from './dice';
import type { RowOf } from './row-of';

/** How far the story reaches back from the day of the first start: fourteen months. */
export const daysOfHistory = 426;
/** How far ahead patients book. */
export const bookingDays = 21;

const everyDay = [1, 2, 3, 4, 5, 6, 7];
/** Tuesday, Thursday and Saturday noon: the class that people pay themselves. */
export const maintenanceDays: readonly number[] = [2, 4, 6];
const otherDays = everyDay.filter((day) => !maintenanceDays.includes(day));
export const maintenanceHour = 12;
export const openingHour = 7;
export const closingHour = 19;
export const classMinutes = 60;

const wallTime = (hour: number) => `${String(hour).padStart(2, '0')}:00`;

export interface Site {
  readonly key: SiteKey;
  readonly name: string;
  readonly timeZone: string;
  readonly address: string;
  readonly phone: string;
  /** Of all patients, the part that comes here. */
  readonly share: number;
}

/** Invented addresses; numbers 555-0100 to 555-0199 are kept free for fiction. */
export const demoSites: readonly Site[] = [
  {
    key: 'quayside',
    name: 'Quayside',
    timeZone: 'America/New_York',
    address: '14 Ropewalk Quay, Harbor Lane',
    phone: '207-555-0114',
    share: 0.62,
  },
  {
    key: 'mill-street',
    name: 'Mill Street',
    timeZone: 'America/Chicago',
    address: '230 Mill Street, Lower Weir',
    phone: '715-555-0130',
    share: 0.38,
  },
];

export function siteOf(key: SiteKey): Site {
  const site = demoSites.find((each) => each.key === key);
  if (!site) throw new RangeError(key);
  return site;
}

interface ClassPlan {
  readonly key: string;
  readonly site: SiteKey;
  readonly name: string;
  readonly hour: number;
  readonly weekdays: readonly number[];
  readonly capacity: number;
  readonly monitoredPlaces: number;
  readonly selfPay: boolean;
}

/** Mornings are staffed to monitor everybody; later the few channels go to those who need them. */
function places(hour: number): Pick<ClassPlan, 'name' | 'capacity' | 'monitoredPlaces'> {
  if (hour < 9) return { name: 'Early exercise', capacity: 12, monitoredPlaces: 8 };
  if (hour < 12) return { name: 'Morning exercise', capacity: 12, monitoredPlaces: 12 };
  if (hour < 17) return { name: 'Afternoon exercise', capacity: 12, monitoredPlaces: 8 };
  return { name: 'Evening exercise', capacity: 12, monitoredPlaces: 6 };
}

function classesOf(site: SiteKey): ClassPlan[] {
  const hours = Array.from({ length: closingHour - openingHour }, (_, each) => openingHour + each);
  const insured = hours.map((hour) => ({
    key: `${site} ${hour}`,
    site,
    hour,
    weekdays: hour === maintenanceHour ? otherDays : everyDay,
    selfPay: false,
    ...places(hour),
  }));
  const maintenance = {
    key: `${site} maintenance`,
    site,
    name: 'Strength and walking (self-pay)',
    hour: maintenanceHour,
    weekdays: maintenanceDays,
    capacity: 12,
    monitoredPlaces: 4,
    selfPay: true,
  };
  return [...insured, maintenance];
}

export const classPlans: readonly ClassPlan[] = demoSites.flatMap(({ key }) => classesOf(key));

export function classAt(site: SiteKey, hour: number, selfPay: boolean): ClassPlan {
  const found = classPlans.find(
    (plan) => plan.site === site && plan.hour === hour && plan.selfPay === selfPay,
  );
  if (!found) throw new RangeError(`${site} holds no class at ${hour}`);
  return found;
}

/** Snow shut Mill Street for a day, so that a closure stands in the book. */
export function closedDay(anchor: Day): { site: SiteKey; day: Day; reason: string } {
  return { site: 'mill-street', day: anchor - 40, reason: 'No power after the storm' };
}

export const selfPayPrice = {
  name: 'Strength and walking class',
  amountMinor: 1800,
  currency: 'USD',
};

const opened = (anchor: Day) => instantAt(anchor - daysOfHistory, 6 * 60, 'America/New_York');

export const siteId = (key: SiteKey, anchor: Day) => idAt(opened(anchor), 'site', key);
export const priceItemId = (anchor: Day) => idAt(opened(anchor), 'price', selfPayPrice.name);
export const templateId = (key: string, anchor: Day) => idAt(opened(anchor), 'class', key);

export interface ProgramRows {
  readonly sites: RowOf<'sites'>[];
  readonly priceItems: RowOf<'priceItems'>[];
  readonly classTemplates: RowOf<'classTemplates'>[];
  readonly closures: RowOf<'closures'>[];
}

/** @param anchor the day of the first start, from which fourteen months are told backwards */
export function programRows(anchor: Day): ProgramRows {
  const createdAt = opened(anchor);
  const closed = closedDay(anchor);
  return {
    sites: demoSites.map(({ key, share: _, ...site }) => ({
      id: siteId(key, anchor),
      ...site,
      createdAt,
    })),
    priceItems: [{ id: priceItemId(anchor), ...selfPayPrice, active: true, createdAt }],
    classTemplates: classPlans.map((plan) => ({
      id: templateId(plan.key, anchor),
      siteId: siteId(plan.site, anchor),
      name: plan.name,
      kind: 'exercise' as const,
      recurrence: weeklyRule(plan.weekdays),
      startsOn: isoOf(anchor - daysOfHistory),
      endsOn: null,
      localStart: wallTime(plan.hour),
      durationMinutes: classMinutes,
      capacity: plan.capacity,
      monitoredPlaces: plan.monitoredPlaces,
      priceItemId: plan.selfPay ? priceItemId(anchor) : null,
      version: 1,
      createdAt,
    })),
    closures: [
      {
        id: idAt(createdAt, 'closure'),
        siteId: siteId(closed.site, anchor),
        localDate: isoOf(closed.day),
        reason: closed.reason,
      },
    ],
  };
}

type ClassDateRow = RowOf<'classDates'>;

function classDatesOf(plan: ClassPlan, anchor: Day, window: DateWindow): ClassDateRow[] {
  const template = {
    recurrence: weeklyRule(plan.weekdays),
    startsOn: isoOf(anchor - daysOfHistory),
    endsOn: null,
  };
  const closed = closedDay(anchor);
  const closedOn = plan.site === closed.site ? isoOf(closed.day) : null;
  return recurrenceDates(template, window).map((localDate) => {
    const startsAt = instantAt(dayOf(localDate), plan.hour * 60, siteOf(plan.site).timeZone);
    return {
      id: idAt(startsAt, 'class date', plan.key),
      templateId: templateId(plan.key, anchor),
      siteId: siteId(plan.site, anchor),
      localDate,
      startsAt,
      endsAt: minutesLater(startsAt, classMinutes),
      capacity: plan.capacity,
      booked: 0,
      monitoredCapacity: plan.monitoredPlaces,
      monitoredBooked: 0,
      status: localDate === closedOn ? 'closed' : 'scheduled',
      version: 1,
      createdAt: opened(anchor),
    };
  });
}

/** Every class date from the local day `from` to the day before `to`. */
export function classDateRows(anchor: Day, from: Day, to: Day): ClassDateRow[] {
  const window = { from: isoOf(from), to: isoOf(to) };
  return classPlans.flatMap((plan) => classDatesOf(plan, anchor, window));
}
