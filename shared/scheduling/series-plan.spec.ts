import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { occurrenceOn } from './class-dates';
import { overlaps } from './intervals';
import {
  conflictOf,
  planSeries,
  seriesDates,
  seriesHorizon,
  type OfferedClass,
  type PatientLoad,
  type SeriesAsk,
} from './series-plan';
import { addDays } from './wall-time';

const zone = 'America/New_York';
const ask: SeriesAsk = { weekdays: [1, 3, 5], startTime: '09:00', from: '2026-12-07', count: 6 };
const free: PatientLoad = {
  courseActive: true,
  courseLeft: 36,
  dailyLimit: 2,
  needsMonitor: true,
  held: [],
};

function offer(
  localDate: string,
  localStart: string,
  given: Partial<OfferedClass> = {},
): OfferedClass {
  return {
    classDateId: `${localDate} ${localStart}`,
    ...occurrenceOn(localDate, { localStart, durationMinutes: 60 }, zone),
    localStart,
    open: true,
    placesLeft: 4,
    monitorsLeft: 2,
    ...given,
  };
}

/** Classes at 8:00, 9:00 and 14:00 on every day of three weeks. */
function offers(change: (offered: OfferedClass) => Partial<OfferedClass> = () => ({})) {
  return Array.from({ length: 21 }, (_, day) => addDays('2026-12-07', day))
    .flatMap((date) => ['08:00', '09:00', '14:00'].map((start) => offer(date, start)))
    .map((offered) => ({ ...offered, ...change(offered) }));
}

describe('seriesDates', () => {
  it('names the weekdays in order, from the first date on', () => {
    expect(seriesDates(ask)).toEqual([
      '2026-12-07',
      '2026-12-09',
      '2026-12-11',
      '2026-12-14',
      '2026-12-16',
      '2026-12-18',
    ]);
    expect(seriesHorizon(ask)).toBe('2026-12-21');
    expect(() => seriesDates({ ...ask, weekdays: [] })).toThrow(RangeError);
  });
});

describe('planSeries', () => {
  it('takes the place at the wished hour on each date', () => {
    const plan = planSeries(ask, offers(), free, zone);
    expect(plan.map(({ classDateId }) => classDateId)).toEqual(
      seriesDates(ask).map((date) => `${date} 09:00`),
    );
    expect(plan.every(({ conflict }) => conflict === null)).toBe(true);
  });

  it('names a full class and offers the nearest hours of the same day, then near days', () => {
    const full = offers(({ localDate, localStart }) =>
      localDate === '2026-12-09' && localStart === '09:00' ? { placesLeft: 0 } : {},
    );
    const date = planSeries(ask, full, free, zone)[1];
    expect(date).toMatchObject({ classDateId: '2026-12-09 09:00', conflict: 'class-full' });
    expect(date?.alternatives.map(({ classDateId }) => classDateId)).toEqual([
      '2026-12-09 08:00',
      '2026-12-09 14:00',
      '2026-12-08 09:00',
    ]);
  });

  it('says so when there is no class, with the instant it would have had', () => {
    const without = offers().filter(({ localDate }) => localDate !== '2026-12-11');
    const date = planSeries(ask, without, free, zone)[2];
    expect(date).toMatchObject({ classDateId: null, conflict: 'class-closed' });
    expect(date?.startsAt.toISOString()).toBe('2026-12-11T14:00:00.000Z');
  });

  it('counts its own earlier dates against the course', () => {
    const plan = planSeries(ask, offers(), { ...free, courseLeft: 4 }, zone);
    expect(plan.map(({ conflict }) => conflict)).toEqual([
      null,
      null,
      null,
      null,
      'course-complete',
      'course-complete',
    ]);
    expect(plan[4]?.alternatives).toEqual([]);
  });

  it('sees what the patient holds: the hour, and the day’s limit', () => {
    const held = [offer('2026-12-07', '08:30'), offer('2026-12-09', '14:00')];
    const plan = planSeries(ask, offers(), { ...free, dailyLimit: 1, held }, zone);
    expect(plan[0]?.conflict).toBe('daily-limit');
    expect(plan[1]?.conflict).toBe('daily-limit');
    const two = planSeries(ask, offers(), { ...free, held }, zone);
    expect(two[0]?.conflict).toBe('overlapping-appointment');
    expect(two[0]?.alternatives[0]?.classDateId).toBe('2026-12-07 14:00');
    expect(two[1]?.conflict).toBeNull();
  });

  it('asks for a channel only for a patient who needs one', () => {
    const none = offers(() => ({ monitorsLeft: 0 }));
    expect(planSeries(ask, none, free, zone)[0]?.conflict).toBe('monitors-full');
    const unmonitored = { ...free, needsMonitor: false };
    expect(planSeries(ask, none, unmonitored, zone)[0]?.conflict).toBeNull();
  });

  it('prefers a free class of two that start together', () => {
    const twin = offer('2026-12-07', '09:00', { classDateId: 'twin' });
    const all = [
      ...offers(({ localStart }) => (localStart === '09:00' ? { placesLeft: 0 } : {})),
      twin,
    ];
    expect(planSeries(ask, all, free, zone)[0]?.classDateId).toBe('twin');
  });
});

describe('whatever is offered', () => {
  const classes = fc.array(
    fc.record({
      day: fc.integer({ min: 0, max: 20 }),
      start: fc.constantFrom('08:00', '08:30', '09:00', '14:00'),
      open: fc.boolean(),
      placesLeft: fc.integer({ min: 0, max: 2 }),
      monitorsLeft: fc.integer({ min: 0, max: 2 }),
    }),
    { maxLength: 60 },
  );
  const loads = fc.record({
    courseActive: fc.constant(true),
    courseLeft: fc.integer({ min: 0, max: 8 }),
    dailyLimit: fc.integer({ min: 1, max: 2 }),
    needsMonitor: fc.boolean(),
  });

  it('a plan books no full, closed or overlapping class, and offers none', () => {
    fc.assert(
      fc.property(classes, loads, (given, load) => {
        const all = given.map(({ day, start, ...rest }, index) =>
          offer(addDays('2026-12-07', day), start, { ...rest, classDateId: String(index) }),
        );
        const byId = (id: string | null) => all.find(({ classDateId }) => classDateId === id);
        const patient = { ...load, held: [] };
        const plan = planSeries(ask, all, patient, zone);
        const taken = plan
          .filter(({ conflict }) => conflict === null)
          .map((date) => byId(date.classDateId)!);
        expect(plan).toHaveLength(ask.count);
        expect(taken.length).toBeLessThanOrEqual(load.courseLeft);
        taken.forEach((one, index) => {
          expect(one.open && one.placesLeft > 0).toBe(true);
          expect(taken.slice(index + 1).some((other) => overlaps(one, other))).toBe(false);
        });
        for (const { classDateId } of plan.flatMap(({ alternatives }) => alternatives)) {
          expect(conflictOf(byId(classDateId), patient, taken)).toBeNull();
        }
      }),
      { numRuns: 300 },
    );
  });
});
