import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  answerTo,
  withoutTest,
  withoutThresholds,
  type Change,
} from '../../../test/builders/prescription-request';
import { bpm, kilograms, meters, mets, minutes, mmHg, watts } from '../../units';
import { defaultPolicy } from '../prescribing';
import type { MachineSetting } from './machine-setting';
import { metsOfSetting } from './machine-setting';
import { defaultProgressionPolicy } from './progression-policy';
import type { ProgressionAction, ProgressionFacts } from './propose-progression';
import { proposeProgression } from './propose-progression';
import type { SessionFacts, SessionReading } from './session-facts';

const setting: fc.Arbitrary<MachineSetting> = fc.oneof(
  fc.record({
    modality: fc.constantFrom('treadmill-walk' as const, 'treadmill-run' as const),
    speedMph: fc.integer({ min: 15, max: 55 }).map((tenths) => tenths / 10),
    gradePercent: fc.integer({ min: 0, max: 24 }).map((halves) => halves / 2),
  }),
  fc.record({
    modality: fc.constantFrom('cycle' as const, 'arm' as const),
    powerWatts: fc.integer({ min: 4, max: 44 }).map((fives) => watts(5 * fives)),
  }),
  fc.record({
    modality: fc.constant('step' as const),
    stepHeightMeters: fc.constantFrom(meters(0.1), meters(0.15), meters(0.3)),
    stepsPerMinute: fc.integer({ min: 10, max: 32 }),
  }),
  fc.record({
    modality: fc.constant('stepper' as const),
    mets: fc.integer({ min: 15, max: 90 }).map((tenths) => mets(tenths / 10)),
  }),
);

const seldom = { freq: 8 };

const reading: fc.Arbitrary<SessionReading> = fc.record({
  phase: fc.constantFrom('resting', 'exercise', 'exercise', 'exercise', 'recovery'),
  heartRate: fc.option(fc.integer({ min: 60, max: 125 }).map(bpm), seldom),
  systolic: fc.option(fc.integer({ min: 90, max: 200 }).map(mmHg)),
  diastolic: fc.option(fc.integer({ min: 50, max: 85 }).map(mmHg)),
  oxygenSaturation: fc.option(fc.integer({ min: 85, max: 100 })),
  perceivedExertion: fc.option(fc.integer({ min: 8, max: 16 }), seldom),
  symptoms: fc.constantFrom<readonly string[]>(
    ['none'],
    ['none'],
    ['none'],
    [],
    ['leg-pain'],
    ['dizziness'],
  ),
});

/** A rate and an effort at work, nothing else amiss. */
const plainReading = (rates: readonly [number, number], efforts: readonly [number, number]) =>
  fc
    .record({
      heartRate: fc.integer({ min: rates[0], max: rates[1] }).map(bpm),
      perceivedExertion: fc.integer({ min: efforts[0], max: efforts[1] }),
    })
    .map((given): SessionReading => ({
      ...given,
      phase: 'exercise',
      systolic: null,
      diastolic: null,
      oxygenSaturation: null,
      symptoms: ['none'],
    }));

const some = (each: fc.Arbitrary<SessionReading>) => fc.array(each, { minLength: 2, maxLength: 4 });

/** Mostly clean sessions: without them hardly any run would come to more; then ones near the limits, then anything. */
const readings = fc.oneof(
  { weight: 6, arbitrary: some(plainReading([75, 104], [9, 12])) },
  { weight: 2, arbitrary: some(plainReading([95, 112], [11, 15])) },
  { weight: 1, arbitrary: fc.array(reading, { maxLength: 4 }) },
);

const sessionOf = (daysAgo: number, at: MachineSetting): fc.Arbitrary<SessionFacts> =>
  fc.record({
    daysAgo: fc.constant(daysAgo),
    setting: fc.option(fc.constant(at), { freq: 20 }),
    minutes: fc.option(fc.integer({ min: 5, max: 45 }).map(minutes), { freq: 20 }),
    shortBouts: fc.constantFrom(false, false, false, true),
    doseMissed: fc.constantFrom(false, false, false, false, true),
    underThisPrescription: fc.constantFrom(true, true, true, true, false),
    readings,
  });

const changes: fc.Arbitrary<Change[]> = fc.constantFrom<Change[]>(
  [],
  [withoutThresholds],
  [withoutThresholds, withoutTest],
  [withoutTest],
  [(i) => (i.thresholds = [{ kind: 'angina', heartRate: 120, clearMets: 4 }])],
  [(i) => (i.rhythm = 'atrial-fibrillation')],
  [(i) => (i.conditions.dissection = true), withoutThresholds],
  [(i) => (i.conditions.pulmonaryHypertension = true), withoutThresholds],
  [(i) => (i.devices.icd = { status: 'present', zones: [{ rate: 130, kind: 'shock' }] })],
);

const facts: fc.Arbitrary<ProgressionFacts> = setting.chain((at) =>
  fc.record({
    sessions: fc.oneof(
      { weight: 4, arbitrary: fc.tuple(sessionOf(0, at), sessionOf(2, at), sessionOf(5, at)) },
      { weight: 1, arbitrary: fc.tuple(sessionOf(0, at)) },
    ),
    prescription: changes.map((each) => answerTo(each)),
    withdrawn: fc.constantFrom(false, false, false, false, true),
    weight: fc.option(fc.integer({ min: 45, max: 140 }).map(kilograms), { freq: 20 }),
    equipment: fc.constant(defaultPolicy.equipment),
  }),
);

const policy = defaultProgressionPolicy;
const propose = (given: ProgressionFacts) => proposeProgression(given, policy);
const isMore = (action: ProgressionAction) => action === 'harder' || action === 'longer';
const runs = { numRuns: 3000 };

/** Told anew from the prescription, so that the rule does not vouch for itself. */
const limitOf = ({ prescription }: ProgressionFacts, { modality }: MachineSetting): number => {
  const { workCeilingMets, targetMets, workloads } = prescription;
  const arms = workloads.filter((row) => row.modality === 'arm' && row.point === 'limit');
  const target = modality === 'arm' ? arms[0]?.mets : targetMets?.upper;
  return Math.min(workCeilingMets ?? Infinity, target ?? Infinity);
};

const counted = ({ sessions }: ProgressionFacts) => sessions.slice(0, policy.sessionsNeeded);

describe('whatever happened', () => {
  it('more is proposed often enough for these properties to say something', () => {
    const actions = fc
      .sample(facts, { numRuns: 2000, seed: 7 })
      .map((given) => propose(given).action);
    const tally = (action: ProgressionAction) => actions.filter((each) => each === action).length;
    for (const action of ['hold', 'longer', 'harder', 'easier', 'review'] as const) {
      expect(tally(action)).toBeGreaterThan(20);
    }
  });

  it('more never follows a symptom, a passed limit or effort above the prescribed', () => {
    fc.assert(
      fc.property(facts, (given) => {
        if (!isMore(propose(given).action)) return;
        const { ceiling, askLine, perceivedExertion, pressureCeiling, oxygenFloor } =
          given.prescription;
        for (const { readings: all } of counted(given)) {
          for (const each of all) {
            expect(each.symptoms.filter((symptom) => symptom !== 'none')).toEqual([]);
            expect(each.heartRate ?? 0).toBeLessThanOrEqual(ceiling?.value ?? Infinity);
            expect(each.systolic ?? 0).toBeLessThanOrEqual(pressureCeiling?.systolic ?? Infinity);
            expect(each.oxygenSaturation ?? 100).toBeGreaterThanOrEqual(oxygenFloor ?? 0);
            if (each.phase === 'exercise') {
              expect(each.perceivedExertion ?? 0).toBeLessThanOrEqual(perceivedExertion.upper);
              expect(each.heartRate ?? 0).toBeLessThanOrEqual(askLine ?? Infinity);
            }
          }
        }
        expect(given.withdrawn).toBe(false);
      }),
      runs,
    );
  });

  it('the new work passes no ceiling and no equation’s range, and is what the equation says', () => {
    fc.assert(
      fc.property(facts, (given) => {
        const { action, from, to } = propose(given);
        if (to === null) return;
        const work = metsOfSetting(to.setting, given.weight);
        expect(to.mets).toBe(work);
        if (action === 'longer') {
          expect(to.setting).toEqual(from?.setting);
          expect(to.minutes ?? 0).toBeGreaterThan(from?.minutes ?? Infinity);
          expect(to.minutes ?? Infinity).toBeLessThanOrEqual(policy.goalMinutes);
          if (work === null) expect(limitOf(given, to.setting)).toBe(Infinity);
        } else {
          expect(work).not.toBeNull();
        }
        expect(work ?? 0).toBeLessThanOrEqual(limitOf(given, to.setting) + 1e-6);
        if (action === 'easier' || action === 'review') {
          expect(work ?? Infinity).toBeLessThan(from?.mets ?? 0);
        }
        if (action === 'harder') {
          expect(work ?? 0).toBeGreaterThan(from?.mets ?? Infinity);
          expect((work ?? Infinity) - (from?.mets ?? 0)).toBeLessThanOrEqual(
            policy.metsStep + 1e-6,
          );
          expect(to.setting.modality).toBe(from?.setting.modality);
        }
      }),
      runs,
    );
  });

  it('hold proposes nothing new, and every proposal says why', () => {
    fc.assert(
      fc.property(facts, (given) => {
        const { action, reasons, to } = propose(given);
        expect(reasons.length).toBeGreaterThan(0);
        for (const { text, source } of reasons) expect([text, source]).not.toContain('');
        if (action === 'hold') expect(to).toBeNull();
      }),
      runs,
    );
  });
});

type Hide = (given: ProgressionFacts, index: number) => ProgressionFacts;

const hideInSession =
  (hide: (session: SessionFacts) => SessionFacts): Hide =>
  (given, index) => ({
    ...given,
    sessions: given.sessions.map((session, at) =>
      at === index % given.sessions.length ? hide(session) : session,
    ),
  });

const withoutReadings = (
  session: SessionFacts,
  change: (reading: SessionReading) => SessionReading,
): SessionFacts => ({ ...session, readings: session.readings.map(change) });

const hides: Readonly<Record<string, Hide>> = {
  weight: (given) => ({ ...given, weight: null }),
  setting: hideInSession((session) => ({ ...session, setting: null })),
  minutes: hideInSession((session) => ({ ...session, minutes: null })),
  rates: hideInSession((session) => withoutReadings(session, (it) => ({ ...it, heartRate: null }))),
  efforts: hideInSession((session) =>
    withoutReadings(session, (it) => ({ ...it, perceivedExertion: null })),
  ),
  symptoms: hideInSession((session) => withoutReadings(session, (it) => ({ ...it, symptoms: [] }))),
  readings: hideInSession((session) => ({ ...session, readings: [] })),
};

describe('what is not known', () => {
  it.each(Object.keys(hides))('never makes it harder: %s', (name) => {
    fc.assert(
      fc.property(facts, fc.nat(2), (given, index) => {
        const before = propose(given);
        const after = propose(hides[name]?.(given, index) ?? given);
        if (!isMore(before.action)) expect(isMore(after.action)).toBe(false);
        if (before.action === 'longer') expect(after.action).not.toBe('harder');
        if (after.action === 'harder') expect(after.to?.mets).toBe(before.to?.mets);
      }),
      { numRuns: 1000 },
    );
  });
});
