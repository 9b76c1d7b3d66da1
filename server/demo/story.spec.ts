import { describe, expect, it } from 'vitest';
import { physicianCausesOf } from '@shared/clinical/plan-limits';
import { defaultPolicy } from '@shared/clinical/prescribing';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import { patientAccount } from './accounts';
import { anchorAt, clockAt } from './clock';
import { isoOf } from './days';
import type { Day } from './days';
import { classPlans, templateId } from './program';
import type { PeopleRows } from './rows';
import { tellStory } from './story';
import { storyChanges } from './story-changes';

const firstDay = new Date('2026-12-01T15:10:00Z');
const anchor = anchorAt(firstDay);
const dayMs = 86_400_000;
const tellings = new Map<string, PeopleRows>();

/** Told once a moment: a telling takes half a second, and nothing here changes one. */
function tellAt(now: Date, from: Day = anchor): PeopleRows {
  const key = `${from} ${now.toISOString()}`;
  const rows = tellings.get(key) ?? tellStory(clockAt(from, now));
  tellings.set(key, rows);
  return rows;
}

const later = (days: number, hours = 0) =>
  new Date(firstDay.getTime() + days * dayMs + hours * 3_600_000);

const story = tellAt(firstDay);
const distinct = <T>(values: Iterable<T>) => [...new Set(values)].sort();

describe('the story', () => {
  it('is told the same from the same day', () => {
    expect(tellStory(clockAt(anchor, firstDay))).toEqual(story);
  });

  it.each([
    [0, 5],
    [1, 0],
    [9, 0],
    [20, 0],
    [34, 0],
    [60, 0],
  ])('takes nothing back %i days and %i hours later', (days, hours) => {
    const next = tellAt(later(days, hours));
    const ids = (rows: PeopleRows) =>
      Object.values(rows).flatMap((table: readonly { id?: string }[]) => table.map(({ id }) => id));
    const told = new Set(ids(next));
    expect(ids(story).filter((id) => !told.has(id))).toEqual([]);
    const kept = ({
      sessionRecords,
      vitalSigns,
      restingRates,
      exerciseTests,
      ledgerEntries,
    }: PeopleRows) =>
      [sessionRecords, vitalSigns, restingRates, exerciseTests, ledgerEntries].flat();
    const after = new Map(kept(next).map((row) => [row.id, row]));
    for (const row of kept(story)) expect(after.get(row.id)).toEqual(row);
    const ranges = new Map(next.prescriptions.map((row) => [row.id, row]));
    for (const { id, status, signedAt, activatedAt } of story.prescriptions) {
      const range = ranges.get(id);
      if (signedAt) expect(range?.signedAt).toEqual(signedAt);
      if (activatedAt) expect(range?.activatedAt).toEqual(activatedAt);
      if (status === 'completed' || status === 'revoked') expect(range?.status).toBe(status);
    }
  });

  it('moves bookings forward only', () => {
    const { changed } = storyChanges(story, tellAt(later(9))).appointments;
    expect(changed.length).toBeGreaterThan(100);
    expect(distinct(changed.map(({ before }) => before.status))).toEqual(['booked']);
  });

  it('has about 150 people in 14 months, none named twice', () => {
    expect(story.patients.length).toBeGreaterThan(140);
    expect(story.patients.length).toBeLessThan(175);
    const names = story.patients.map(({ familyName, givenName }) => `${givenName} ${familyName}`);
    expect(new Set(names).size).toBe(names.length);
    expect(names.filter((name) => /[^\u0020-\u00ff]/.test(name))).toEqual([]);
    expect(isoOf(anchor - 426) <= (story.enrollments[0]?.enrolledOn ?? '')).toBe(true);
  });
});

describe('the courses', () => {
  it('stand at every stage', () => {
    const closings = story.enrollments.map(
      ({ status, closedReason }) => `${status}: ${closedReason ?? ''}`,
    );
    expect(distinct(closings)).toEqual(
      expect.arrayContaining([
        'active: ',
        'on-hold: ',
        'completed: completed',
        'completed: covered number done',
        ...[
          'died',
          'moved away',
          'never started',
          'new event',
          'stopped coming',
          'returned to work',
        ].map((reason) => `discontinued: ${reason}`),
      ]),
    );
    const enrolled = new Set(story.enrollments.map(({ patientId }) => patientId));
    expect(story.patients.some(({ id }) => !enrolled.has(id))).toBe(true);
    const courses = story.enrollments.filter(({ phase }) => phase === 2);
    const again = courses.filter(
      (course) => courses.filter(({ patientId }) => patientId === course.patientId).length > 1,
    );
    expect(again.length).toBeGreaterThan(0);
  });

  it('complete for about half, and not alike for every diagnosis', () => {
    const attended = new Map<string, number>();
    for (const { enrollmentId, status } of story.appointments) {
      if (status === 'fulfilled') attended.set(enrollmentId, (attended.get(enrollmentId) ?? 0) + 1);
    }
    const ripe = isoOf(anchor - 140);
    const closed = story.enrollments.filter(
      ({ id, phase, enrolledOn }) => phase === 2 && enrolledOn < ripe && attended.has(id),
    );
    const completed = closed.filter(({ status }) => status === 'completed');
    expect(completed.length / closed.length).toBeGreaterThan(0.4);
    expect(completed.length / closed.length).toBeLessThan(0.62);
    const rates = distinct(closed.map(({ qualifyingDiagnosis }) => qualifyingDiagnosis)).map(
      (kind) => {
        const of = closed.filter(({ qualifyingDiagnosis }) => qualifyingDiagnosis === kind);
        return of.filter(({ status }) => status === 'completed').length / of.length;
      },
    );
    expect(distinct(rates).length).toBeGreaterThan(3);
  });

  it('have ranges in every state, drafts and ranges that wait for the physician too', () => {
    const states = story.prescriptions.map(({ status, awaiting }) => `${status} ${awaiting ?? ''}`);
    const known = ['active ', 'completed ', 'draft ', 'draft physician', 'revoked '];
    expect(distinct(states)).toEqual(known);
  });

  it('have a physician’s signature wherever the plan wants one', () => {
    for (const row of story.prescriptions) {
      if (!row.activatedAt || row.physicianSignedAt) continue;
      const inputs = row.inputs as PrescriptionRequest;
      const result = row.result as PrescriptionAnswer;
      const first = !row.supersedes;
      expect(physicianCausesOf({ inputs, result, first, student: false }, defaultPolicy)).toEqual(
        [],
      );
    }
  });

  it('have a range that waits for the physician name the one in force, so that it can be signed', () => {
    const active = new Map(
      story.prescriptions
        .filter(({ status }) => status === 'active')
        .map(({ patientId, id }) => [patientId, id]),
    );
    for (const { patientId, awaiting, supersedes } of story.prescriptions) {
      if (awaiting) expect(supersedes).toBe(active.get(patientId) ?? null);
    }
  });

  const rosters = (rows: PeopleRows) => {
    const places = new Map<string, { all: number; monitored: number }>();
    for (const { templateId: template, localDate, status, monitored } of rows.appointments) {
      if (status === 'cancelled') continue;
      const place = places.get(`${template} ${localDate}`) ?? { all: 0, monitored: 0 };
      place.all++;
      if (monitored) place.monitored++;
      places.set(`${template} ${localDate}`, place);
    }
    return places;
  };

  it('fill classes: half of those of a month hold six people or more, self-pay classes too', () => {
    const from = isoOf(anchor - 28);
    const to = isoOf(anchor + 2);
    const selfPay = new Set(
      classPlans.filter((plan) => plan.selfPay).map((plan) => templateId(plan.key, anchor)),
    );
    const recent = [...rosters(story)]
      .map(([key, { all }]) => ({ template: key.slice(0, 36), day: key.slice(37), all }))
      .filter(({ day }) => day >= from && day < to);
    const full = recent.filter(({ all }) => all >= 6);
    expect(full.length).toBeGreaterThan(70);
    expect(full.length / recent.length).toBeGreaterThan(0.4);
    expect(full.filter(({ template }) => selfPay.has(template)).length).toBeGreaterThan(5);
    for (const day of [anchor, anchor + 1]) {
      expect(full.filter((each) => each.day === isoOf(day)).length).toBeGreaterThan(3);
    }
  });

  it.each([
    [0, 0],
    [200, 0],
    [0, 20],
  ])('never overfill a class, %i days on from a first day shifted by %i days', (days, shift) => {
    const capacities = new Map(
      classPlans.map((plan) => [templateId(plan.key, anchor + shift), plan]),
    );
    const rows = tellAt(later(days + shift), anchor + shift);
    for (const [key, { all, monitored }] of rosters(rows)) {
      const plan = capacities.get(key.slice(0, 36));
      expect(all).toBeLessThanOrEqual(plan?.capacity ?? 0);
      expect(monitored).toBeLessThanOrEqual(plan?.monitoredPlaces ?? 0);
    }
  });

  it.each([3, 12, 21, 26.5])('leave the floor a roster today, %d h after midnight UTC', (hour) => {
    const now = new Date(Date.parse('2026-12-03T00:00:00Z') + hour * 3_600_000);
    const rows = tellAt(now);
    const today = isoOf(clockAt(anchor, now).today('quayside'));
    const open = rows.appointments.filter(
      ({ localDate, status }) => localDate === today && status === 'booked',
    );
    expect(open.length).toBeGreaterThan(0);
  });
});

describe('the patient’s account', () => {
  it.each([0, 3, 5, 20])('has a range, bookings and an open charge %i days on', (days) => {
    const now = later(days);
    const rows = tellAt(now);
    const patient = rows.patients.find(({ email }) => email === patientAccount.email);
    const of = <R extends { patientId: string }>(list: readonly R[]) =>
      list.filter(({ patientId }) => patientId === patient?.id);
    const range = of(rows.prescriptions).find(({ status }) => status === 'active');
    const { target, ceiling } = range?.result as PrescriptionAnswer;
    expect(target).not.toBeNull();
    expect(ceiling).not.toBeNull();
    const today = isoOf(clockAt(anchor, now).today('quayside'));
    const ahead = of(rows.appointments).filter(
      ({ status, localDate }) => status === 'booked' && localDate > today,
    );
    expect(ahead.length).toBeGreaterThan(3);
    expect(of(rows.charges).filter(({ status }) => status === 'open').length).toBeGreaterThan(0);
    expect(of(rows.charges).length).toBeGreaterThan(2);
  });
});
