import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  completionGroupings,
  type CompletionGrouping,
  type CompletionReport,
} from '@shared/contracts/reports-contract';
import { agentFor, type Agent } from '../../test/builders/agent';
import { buildCourses, daysAfter, type CourseVisit } from '../../test/builders/courses';
import { buildSite, buildUser } from '../../test/builders/people';
import {
  buildReportsWorld,
  readBehind,
  readCompletion,
  type ReportsWorld,
} from '../../test/builders/reports-world';

const TODAY = '2026-12-01';
const DAY = 86_400_000;

const visit = fc.record({
  day: fc.nat(280),
  at: fc.constantFrom('morning', 'afternoon', 'orientation'),
  status: fc.constantFrom('fulfilled', 'fulfilled', 'fulfilled', 'checked-in', 'noshow'),
  exercised: fc.constantFrom(true, true, true, false),
});

const oneCourse = fc.record({
  site: fc.nat(1),
  from: fc.integer({ min: 0, max: 600 }).map((days) => daysAfter('2025-01-02', days)),
  visits: fc.uniqueArray(visit, { maxLength: 7, selector: ({ day }) => day }),
  twice: fc.boolean(),
  planned: fc.integer({ min: 1, max: 5 }),
  status: fc.constantFrom('active', 'on-hold', 'completed', 'discontinued'),
  age: fc.integer({ min: 50 * 365, max: 80 * 365 }),
  sex: fc.constantFrom('female', 'male', 'unknown'),
  payer: fc.constantFrom('commercial', 'public', 'self-pay'),
  diagnosis: fc.constantFrom('heart-attack', 'stent', 'bypass', 'valve'),
});

/** What the database holds of a visit, with what its course and patient are grouped by. */
interface Fact {
  readonly course: string;
  readonly on: string;
  readonly counts: boolean;
  readonly open: boolean;
  readonly planned: number;
  readonly site: string;
  readonly sex: string;
  readonly payer: string;
  readonly diagnosis: string;
  readonly birth: string;
}

const FACTS = `
  SELECT e.id AS course, a.local_date::text AS "on",
         a.status = 'fulfilled' AND a.exercised AND t.kind = 'exercise' AS counts,
         e.status IN ('active', 'on-hold') AS open, e.planned_sessions AS planned, e.site_id AS site,
         p.sex_at_birth AS sex, e.payer, e.qualifying_diagnosis AS diagnosis, p.birth_date::text AS birth
    FROM appointments a JOIN class_dates d ON d.id = a.class_date_id
    JOIN class_templates t ON t.id = d.template_id
    JOIN enrollments e ON e.id = a.enrollment_id JOIN patients p ON p.id = e.patient_id`;

function grouped<T>(all: readonly T[], keyOf: (each: T) => string): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  for (const each of all) groups.set(keyOf(each), [...(groups.get(keyOf(each)) ?? []), each]);
  return groups;
}

/** Completed years, told from the digits of the dates. */
function ageOn(date: string, birth: string): number {
  const years = Number(date.slice(0, 4)) - Number(birth.slice(0, 4));
  return date.slice(5) < birth.slice(5) ? years - 1 : years;
}

function band(age: number): string {
  if (age < 55) return 'under-55';
  if (age < 65) return '55-64';
  return age < 75 ? '65-74' : '75-and-over';
}

interface Recomputed {
  readonly id: string;
  readonly groups: Readonly<Record<CompletionGrouping, string>>;
  readonly state: 'completed' | 'ongoing' | 'left';
  readonly sessions: number;
}

function recompute(facts: readonly Fact[]): Recomputed[] {
  const byCourse = grouped(
    facts.filter(({ counts }) => counts),
    ({ course }) => course,
  );
  return [...byCourse].map(([id, sessions]) => {
    const first = sessions.map(({ on }) => on).sort()[0] ?? '';
    const dayOf = (date: string): number => (Date.parse(date) - Date.parse(first)) / DAY;
    const within = sessions.filter(({ on }) => dayOf(on) <= 252).length;
    const [fact] = sessions;
    if (!fact) throw new Error('A group has members');
    const open = fact.open && dayOf(TODAY) <= 252;
    const { site, sex, payer, diagnosis } = fact;
    return {
      id,
      sessions: sessions.length,
      state: within >= fact.planned ? 'completed' : open ? 'ongoing' : 'left',
      groups: {
        none: 'all',
        month: first.slice(0, 7),
        'age-band': band(ageOn(first, fact.birth)),
        ...{ site, sex, payer, diagnosis },
      },
    };
  });
}

const idsOf = (courses: readonly { id: string }[]): string[] => courses.map(({ id }) => id).sort();

describe('the counts of completion', () => {
  let world: ReportsWorld;
  let second: string;
  let both: Agent;
  let expected: Recomputed[];

  beforeAll(async () => {
    world = await buildReportsWorld();
    const { database } = world.house.context;
    const other = await buildSite(database);
    second = other.id;
    const addTo = [world.addCourse, await buildCourses(database, other)] as const;
    both = await agentFor(
      world.house,
      await buildUser(database, { roles: ['director'], siteIds: [world.site.id, second] }),
    );
    for (const made of fc.sample(oneCourse, { numRuns: 150, seed: 36_252 })) {
      const visits: CourseVisit[] = made.visits.map(({ day, ...rest }) => ({
        on: daysAfter(made.from, day),
        ...rest,
      }));
      const [again] = visits;
      if (made.twice && again) {
        visits.push({ on: again.on, at: again.at === 'morning' ? 'afternoon' : 'morning' });
      }
      await addTo[made.site === 0 ? 0 : 1]({
        visits: visits.filter(({ on }) => on <= TODAY),
        patient: { birthDate: daysAfter(made.from, -made.age), sexAtBirth: made.sex },
        enrollment: {
          payer: made.payer,
          qualifyingDiagnosis: made.diagnosis,
          plannedSessions: made.planned,
          status: made.status,
        },
      });
    }
    const { rows } = await database.$client.query<Fact>(FACTS);
    expected = recompute(rows);
  });
  afterAll(() => world.close());

  it('has courses of every state to tell apart', () => {
    const states = grouped(expected, ({ state }) => state);
    for (const state of ['completed', 'ongoing', 'left'] as const) {
      expect(states.get(state)?.length).toBeGreaterThan(5);
    }
  });

  const countsOf = (courses: readonly Recomputed[]) => ({
    enrolled: courses.length,
    completed: courses.filter(({ state }) => state === 'completed').length,
    ongoing: courses.filter(({ state }) => state === 'ongoing').length,
  });

  function expectReport(report: CompletionReport, courses: readonly Recomputed[]): void {
    expect(report.total).toMatchObject(countsOf(courses));
    const sessions = courses.reduce((sum, each) => sum + each.sessions, 0);
    if (courses.length > 0) {
      expect(report.total.meanSessions).toBeCloseTo(sessions / courses.length, 10);
    }
  }

  it.each(completionGroupings)('by %s are what the appointments say', async (groupBy) => {
    const report = await readCompletion(both, { groupBy });
    const groups = grouped(expected, (course) => course.groups[groupBy]);
    expect(report.items.map(({ group }) => group)).toEqual([...groups.keys()].sort());
    for (const row of report.items)
      expect(row).toMatchObject(countsOf(groups.get(row.group) ?? []));
    expectReport(report, expected);
  });

  it.each(completionGroupings)(
    'by %s each open the list of just those courses',
    async (groupBy) => {
      const report = await readCompletion(both, { groupBy });
      for (const { group, enrolled, completed, ongoing } of report.items) {
        const counted = { enrolled, completed, ongoing, left: enrolled - completed - ongoing };
        for (const [part, count] of Object.entries(counted)) {
          const { total, items } = await readBehind(both, { groupBy, group, part, limit: '7' });
          const told = expected.filter(
            (course) =>
              course.groups[groupBy] === group && (part === 'enrolled' || course.state === part),
          );
          expect([total, items.length], `${group} ${part}`).toEqual([count, count]);
          expect(items.map(({ enrollmentId }) => enrollmentId).sort()).toEqual(idsOf(told));
        }
      }
    },
  );

  const FILTERS = {
    sex: 'sex',
    ageBand: 'age-band',
    payer: 'payer',
    diagnosis: 'diagnosis',
    siteId: 'site',
  } as const;

  it.each(Object.entries(FILTERS))('filtered by %s are those of that group', async (filter, by) => {
    for (const { group } of (await readCompletion(both, { groupBy: by })).items) {
      const query = { [filter]: group, groupBy: 'month' };
      const of = expected.filter((course) => course.groups[by] === group);
      expectReport(await readCompletion(both, query), of);
      const { items } = await readBehind(both, { ...query, part: 'enrolled', limit: '100' });
      expect(items.map(({ enrollmentId }) => enrollmentId).sort()).toEqual(idsOf(of));
    }
  });

  it('hold the reader’s own sites alone', async () => {
    const here = expected.filter(({ groups }) => groups.site === world.site.id);
    const report = await readCompletion(world.director, { groupBy: 'site' });
    expect(report.items.map(({ group, label }) => [group, label])).toEqual([
      [world.site.id, world.site.name],
    ]);
    expectReport(report, here);
    const { items } = await readBehind(world.director, { part: 'enrolled', limit: '100' });
    expect(items.map(({ enrollmentId }) => enrollmentId).sort()).toEqual(idsOf(here));
    const { total } = await readCompletion(world.director, { siteId: second });
    expect(total.enrolled).toBe(0);
    const beyond = await readBehind(world.director, { siteId: second, part: 'enrolled' });
    expect(beyond).toEqual({ total: 0, items: [] });
    const nowhere = await readCompletion(await world.agentOf('director', []));
    expect(nowhere.total.enrolled).toBe(0);
  });
});
