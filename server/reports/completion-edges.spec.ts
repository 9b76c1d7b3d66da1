import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { counterDifferences } from '../schedule/counters-service';
import { daysAfter, visitsFrom, type CourseVisit } from '../../test/builders/courses';
import {
  buildReportsWorld,
  readBehind,
  readCompletion,
  type ReportsWorld,
} from '../../test/builders/reports-world';

// Each course has a payer of its own, by which the report is asked for that course alone.

describe('what completes a course', () => {
  let world: ReportsWorld;
  let courses = 0;

  beforeAll(async () => {
    world = await buildReportsWorld();
  });
  afterAll(() => world.close());

  type Enrollment = Parameters<ReportsWorld['addCourse']>[0]['enrollment'];

  async function course(
    visits: readonly CourseVisit[],
    enrollment: Enrollment = {},
  ): Promise<string> {
    courses += 1;
    const payer = `payer ${courses}`;
    await world.addCourse({ visits, enrollment: { payer, plannedSessions: 3, ...enrollment } });
    return payer;
  }

  /** Enrolled, completed and ongoing. */
  async function counts(payer: string): Promise<number[]> {
    const { total } = await readCompletion(world.director, { payer });
    return [total.enrolled, total.completed, total.ongoing];
  }

  async function define(completionDefinition: 'A' | 'B'): Promise<void> {
    await world.director.put('/api/reports/settings').send({ completionDefinition }).expect(200);
  }

  const FIRST = '2025-02-03';
  const lastOnDay = (day: number): CourseVisit[] => [
    ...visitsFrom(FIRST, 2),
    { on: daysAfter(FIRST, day) },
  ];

  it.each([
    [251, 1],
    [252, 1],
    [253, 0],
  ])('counts the last planned session on day %i as %i completed', async (day, completed) => {
    expect(await counts(await course(lastOnDay(day)))).toEqual([1, completed, 0]);
    expect(await counterDifferences(world.house.context.database)).toEqual([]);
  });

  it.each([
    [251, 1],
    [252, 1],
    [253, 0],
  ])('holds an open course on its day %i as %i ongoing', async (day, ongoing) => {
    // Today is 2026-12-01 at the site.
    const payer = await course([{ on: daysAfter('2026-12-01', -day) }]);
    expect(await counts(payer)).toEqual([1, 0, ongoing]);
    expect((await readCompletion(world.director, { payer })).final).toBe(ongoing === 0);
  });

  it('takes today from the clock of the site', async () => {
    const payer = await course([{ on: daysAfter('2026-12-01', -252) }]);
    const ongoingAt = async (instant: string): Promise<number> => {
      world.house.clock.set(instant);
      const director = await world.agentOf('director');
      return (await readCompletion(director, { payer })).total.ongoing;
    };
    const ongoing = [
      await ongoingAt('2026-12-02T04:59:00Z'),
      await ongoingAt('2026-12-02T05:00:00Z'),
    ];
    world.house.clock.set('2026-12-01T15:00:00Z');
    expect(ongoing).toEqual([1, 0]);
  });

  it.each([
    ['active', 1],
    ['on-hold', 1],
    ['completed', 0],
    ['discontinued', 0],
  ] as const)('in its window a course that is %s is %i ongoing', async (status, ongoing) => {
    const payer = await course(visitsFrom('2026-11-02', 2), { status });
    expect(await counts(payer)).toEqual([1, 0, ongoing]);
  });

  it('lets a completed course stay completed, whether it is closed or not', async () => {
    const open = await course(visitsFrom('2026-11-02', 3));
    const closed = await course(visitsFrom('2026-11-02', 3), { status: 'completed' });
    expect(await counts(open)).toEqual([1, 1, 0]);
    expect(await counts(closed)).toEqual([1, 1, 0]);
  });

  it('counts two sessions of one day as two', async () => {
    const day = '2025-03-03';
    const payer = await course([...visitsFrom(day, 2), { on: day, at: 'afternoon' }]);
    expect(await counts(payer)).toEqual([1, 1, 0]);
    expect((await readCompletion(world.director, { payer })).total.meanSessions).toBe(3);
  });

  it.each<[string, Omit<CourseVisit, 'on'>]>([
    ['an orientation', { at: 'orientation' }],
    ['a visit without exercise', { exercised: false }],
    ['a visit whose record is not signed', { status: 'checked-in' }],
    ['a no-show', { status: 'noshow' }],
  ])('does not count %s', async (_, visit) => {
    const alone = await course([{ on: '2025-02-01', ...visit }]);
    expect(await counts(alone)).toEqual([0, 0, 0]);
    const third = await course([...visitsFrom(FIRST, 2), { on: '2025-03-01', ...visit }]);
    expect(await counts(third)).toEqual([1, 0, 0]);
  });

  it('starts the window at the first session, not at what came before it', async () => {
    const before = { on: '2025-01-06', at: 'orientation' } as const;
    expect(await counts(await course([before, ...lastOnDay(252)]))).toEqual([1, 1, 0]);
  });

  it('measures against the planned sessions by B, and against 36 by A', async () => {
    const short = await course(visitsFrom(FIRST, 18), { plannedSessions: 18 });
    const almost = await course(visitsFrom(FIRST, 35), { plannedSessions: 36 });
    const whole = await course(visitsFrom(FIRST, 36), { plannedSessions: 36 });
    const longer = await course(visitsFrom(FIRST, 36), { plannedSessions: 72 });
    const completed = () =>
      Promise.all(
        [short, almost, whole, longer].map(async (payer) => (await counts(payer)).slice(0, 2)),
      );
    expect(await completed()).toEqual([
      [1, 1],
      [1, 0],
      [1, 1],
      [1, 0],
    ]);
    await define('A');
    const { definition } = await readCompletion(world.director);
    const byA = await completed();
    const { total } = await readBehind(world.director, { payer: longer, part: 'completed' });
    await define('B');
    expect(definition).toEqual({
      name: 'A',
      plannedDefault: 36,
      withinWeeks: 36,
      text: 'Of those who started: 36 sessions attended within 36 weeks of the first.',
    });
    expect(byA).toEqual([
      [1, 0],
      [1, 0],
      [1, 1],
      [1, 1],
    ]);
    expect(total).toBe(1);
  });

  it('leaves maintenance out', async () => {
    const payer = await course(visitsFrom(FIRST, 3), { phase: 3 });
    expect(await counts(payer)).toEqual([0, 0, 0]);
  });

  it('takes the first session from “from” on and before “to”', async () => {
    const payer = await course([{ on: '2025-04-10' }]);
    const enrolled = async (from: string, to: string) =>
      (await readCompletion(world.director, { payer, from, to })).total.enrolled;
    expect(await enrolled('2025-04-10', '2025-04-11')).toBe(1);
    expect(await enrolled('2025-04-09', '2025-04-10')).toBe(0);
    expect(await enrolled('2025-04-11', '2025-04-12')).toBe(0);
  });

  it('has no rate where nobody started', async () => {
    const report = await readCompletion(world.director, { payer: 'nobody' });
    const none = { enrolled: 0, completed: 0, ongoing: 0, rate: null, low: null, high: null };
    expect(report.items).toEqual([expect.objectContaining({ group: 'all', ...none })]);
    expect(report.total).toMatchObject({ ...none, rateAtMost: null, meanSessions: null });
    expect(report.final).toBe(true);
    const byMonth = await readCompletion(world.director, { payer: 'nobody', groupBy: 'month' });
    expect(byMonth.items).toEqual([]);
  });
});
