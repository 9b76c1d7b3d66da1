import { describe, expect, it } from 'vitest';
import {
  answerTo,
  withoutTest,
  withoutThresholds,
  type Change,
} from '../../../test/builders/prescription-request';
import { bpm, kilograms, mets, minutes, mmHg, watts } from '../../units';
import { policyFaults } from '../policy-numbers';
import { defaultPolicy } from '../prescribing';
import type { MachineSetting } from './machine-setting';
import { defaultProgressionPolicy, progressionNumbers } from './progression-policy';
import type { ProgressionFacts } from './propose-progression';
import { proposeProgression } from './propose-progression';
import type { SessionFacts, SessionReading } from './session-facts';

const reading = (changes: Partial<SessionReading> = {}): SessionReading => ({
  phase: 'exercise',
  heartRate: bpm(99),
  systolic: null,
  diastolic: null,
  oxygenSaturation: null,
  perceivedExertion: 12,
  symptoms: ['none'],
  ...changes,
});

const walkAt = (speedMph: number, gradePercent: number): MachineSetting => ({
  modality: 'treadmill-walk',
  speedMph,
  gradePercent,
});

const session = (changes: Partial<SessionFacts> = {}): SessionFacts => ({
  daysAgo: 0,
  setting: walkAt(2.8, 0),
  minutes: minutes(30),
  shortBouts: false,
  doseMissed: false,
  underThisPrescription: true,
  readings: [reading(), reading(), reading()],
  ...changes,
});

/** Rates and efforts, alike in each reading. */
const steady = (heartRate: number, perceivedExertion: number): SessionReading[] =>
  Array.from({ length: 3 }, () => reading({ heartRate: bpm(heartRate), perceivedExertion }));

/** The worked example: range 91–108, ceiling 108, effort 11–14, 3.16–4.45 METs, work ceiling 4.45. */
const facts = (
  sessions: SessionFacts[],
  changes: Change[] = [],
  more: Partial<ProgressionFacts> = {},
): ProgressionFacts => ({
  sessions,
  prescription: answerTo(changes),
  withdrawn: false,
  weight: kilograms(84),
  equipment: defaultPolicy.equipment,
  ...more,
});

const twice = (changes: Partial<SessionFacts> = {}): SessionFacts[] => [
  session(changes),
  session({ ...changes, daysAgo: 2 }),
];

const propose = (...args: Parameters<typeof facts>) => {
  const proposal = proposeProgression(facts(...args), defaultProgressionPolicy);
  return { ...proposal, codes: proposal.reasons.map(({ code }) => code) };
};

describe('the next step', () => {
  it('is longer before it is harder', () => {
    const it = propose(twice({ minutes: minutes(20) }));
    expect(it).toMatchObject({ action: 'longer', codes: ['duration-first'], to: { minutes: 25 } });
    expect(it.to?.setting).toEqual(walkAt(2.8, 0));
    expect(propose(twice({ minutes: minutes(28) })).to?.minutes).toBe(30);
  });

  it('is harder by the equation when long enough and easy', () => {
    const it = propose(twice());
    // 3.146 METs and a tenth of them: 3.46; 3.0 mph is 3.299, 0.5 % of grade more is 3.506.
    expect(it).toMatchObject({
      action: 'harder',
      codes: ['easy-in-range'],
      to: { setting: walkAt(3, 0), minutes: 30 },
    });
    expect(it.from?.mets).toBeCloseTo(3.1458, 4);
    expect(it.to?.mets).toBeCloseTo(3.2992, 3);
    expect(it.reasons[0]?.source).toContain('AACVPR');
  });

  it('goes by grade from 3.0 mph on, and stops at the work ceiling', () => {
    expect(propose(twice({ setting: walkAt(3, 1) })).to?.setting).toEqual(walkAt(3, 1.5));
    // 3.0 mph at 2.5 % is 4.33 METs, at 3 % 4.54: over the ceiling of 4.45.
    expect(propose(twice({ setting: walkAt(3, 2.5) }))).toMatchObject({
      action: 'hold',
      codes: ['no-room'],
    });
    expect(propose(twice({ setting: { modality: 'stepper', mets: mets(4.4) } }))).toMatchObject({
      action: 'hold',
    });
  });

  it('is harder below the range, whatever the duration, with effort to spare', () => {
    const low = { readings: steady(85, 11), minutes: minutes(15) };
    expect(propose(twice(low))).toMatchObject({ action: 'harder', codes: ['below-range'] });
    expect(propose(twice({ ...low, readings: steady(85, 14) }))).toMatchObject({
      action: 'hold',
      codes: ['rate-and-effort-disagree'],
    });
    expect(propose(twice({ ...low, shortBouts: true }))).toMatchObject({ action: 'longer' });
  });

  it.each<[string, Partial<SessionFacts>, string, string[]]>([
    [
      'no effort recorded',
      { readings: [reading({ perceivedExertion: null })] },
      'hold',
      ['not-recorded'],
    ],
    ['one rate only', { readings: [reading()] }, 'hold', ['not-recorded']],
    ['nothing read', { readings: [] }, 'hold', ['not-recorded', 'symptoms-not-asked']],
    [
      'symptoms not asked',
      { readings: [reading({ symptoms: [] }), reading({ symptoms: [] })] },
      'hold',
      ['symptoms-not-asked'],
    ],
    ['a missed dose', { doseMissed: true }, 'hold', ['dose-missed']],
    ['no setting', { setting: null }, 'hold', ['not-recorded']],
    ['no minutes', { minutes: null }, 'hold', ['not-recorded']],
    ['a new prescription', { underThisPrescription: false }, 'hold', ['new-prescription']],
    ['little room in rate', { readings: steady(106, 12) }, 'hold', ['in-range']],
    ['little room in effort', { readings: steady(99, 14) }, 'hold', ['in-range']],
    [
      'one effort above',
      { readings: [reading(), reading(), reading({ perceivedExertion: 15 })] },
      'hold',
      ['one-effort-above'],
    ],
    ['a speed outside the equation', { setting: walkAt(1.5, 0) }, 'hold', ['equation-range']],
    [
      'arms without a limit',
      { setting: { modality: 'arm', powerWatts: watts(30) } },
      'hold',
      ['arm-limit-unknown'],
    ],
  ])('%s: %s', (_what, changes, action, codes) => {
    const given = changes.setting?.modality === 'arm' ? [withoutTest, withoutThresholds] : [];
    expect(propose(twice(changes), given)).toMatchObject({ action, codes });
  });

  it.each<[string, SessionFacts[], string]>([
    ['one session', [session()], 'few-sessions'],
    ['other work', [session(), session({ daysAgo: 2, setting: walkAt(2.7, 0) })], 'work-changed'],
    [
      'another machine',
      [session(), session({ daysAgo: 2, setting: { modality: 'stepper', mets: mets(3) } })],
      'work-changed',
    ],
    ['an absence', [session(), session({ daysAgo: 15 })], 'after-absence'],
    ['an absence before', [...twice(), session({ daysAgo: 30 })], 'after-absence'],
    [
      'a symptom before',
      [
        session(),
        session({ daysAgo: 2, readings: [reading(), reading({ symptoms: ['dizziness'] })] }),
      ],
      'earlier-trouble',
    ],
    [
      'a passed ceiling before',
      [session(), session({ daysAgo: 2, readings: steady(109, 12) })],
      'earlier-trouble',
    ],
  ])('%s: hold', (_what, sessions, code) => {
    expect(propose(sessions)).toMatchObject({ action: 'hold', codes: [code] });
  });

  it('is none before the first session', () => {
    expect(propose([])).toMatchObject({
      action: 'hold',
      codes: ['no-session'],
      from: null,
      to: null,
    });
  });

  it.each<[string, Partial<SessionFacts>, string]>([
    [
      'a rate over the ceiling',
      { readings: [reading(), reading({ heartRate: bpm(109) })] },
      'over-ceiling',
    ],
    [
      'a rate over the ceiling in recovery',
      { readings: [reading(), reading(), reading({ phase: 'recovery', heartRate: bpm(112) })] },
      'over-ceiling',
    ],
    [
      'chest discomfort',
      { readings: [reading(), reading({ symptoms: ['chest-discomfort'] })] },
      'symptom',
    ],
    [
      'a symptom in words',
      { readings: [reading(), reading({ symptoms: ['felt odd'] })] },
      'symptom',
    ],
  ])('after %s is a review, easier until then', (_what, changes, code) => {
    const it = propose([session(changes)]);
    expect(it).toMatchObject({ action: 'review', codes: [code] });
    expect(it.to?.mets ?? Infinity).toBeLessThan(it.from?.mets ?? 0);
  });

  it('reads the other ceilings too', () => {
    const pressure: Change[] = [(i) => (i.conditions.dissection = true)];
    const high = session({
      readings: [reading(), reading({ systolic: mmHg(151), diastolic: mmHg(80) })],
    });
    expect(propose([high], pressure).codes).toEqual(['over-pressure']);
    const oxygen: Change[] = [(i) => (i.conditions.pulmonaryHypertension = true)];
    const low = session({ readings: [reading(), reading({ oxygenSaturation: 87 })] });
    expect(propose([low], oxygen).codes).toEqual(['under-oxygen']);
    const fast = session({ readings: [reading(), reading({ heartRate: bpm(130) })] });
    expect(propose([fast], [withoutThresholds]).codes).toEqual(['over-ask-line']);
  });

  it('is easier after a rate or effort above', () => {
    const open: Change[] = [withoutThresholds];
    // Without the threshold the range is 91–119 and effort 11–16.
    const fast = propose([session({ readings: steady(121, 13) })], open);
    expect(fast).toMatchObject({ action: 'easier', codes: ['rate-above'] });
    expect(fast.to?.setting).toEqual(walkAt(2.1, 0));
    expect(propose([session({ readings: steady(99, 15) })])).toMatchObject({
      action: 'easier',
      codes: ['effort-above'],
    });
    expect(
      propose([session({ setting: walkAt(2.8, 3), readings: steady(99, 15) })]).to?.setting,
    ).toEqual(walkAt(2.8, 1.5));
  });

  it('is a review when the same trouble comes again', () => {
    const open: Change[] = [withoutThresholds];
    expect(propose(twice({ readings: steady(121, 13) }), open)).toMatchObject({
      action: 'review',
      codes: ['rate-above', 'one-rate-above', 'repeated-trouble'],
    });
    const legs = twice({ readings: [reading(), reading({ symptoms: ['leg-pain'] })] });
    expect(propose(legs.slice(0, 1))).toMatchObject({ action: 'hold', codes: ['minor-symptom'] });
    expect(propose(legs)).toMatchObject({ action: 'review' });
  });

  it('is easier when the work itself is too much', () => {
    const it = propose([session({ setting: walkAt(3, 5) })]);
    expect(it).toMatchObject({ action: 'easier', codes: ['over-work-ceiling'] });
    expect(it.to?.mets ?? Infinity).toBeLessThanOrEqual(4.45);
    const narrow: Change[] = [withoutThresholds, (i) => (i.intensity = { lower: 0.4, upper: 0.5 })];
    expect(
      propose([session({ setting: walkAt(3, 5), readings: steady(95, 12) })], narrow).codes,
    ).toEqual(['over-work-target']);
  });

  it('is a review where no easier setting is left', () => {
    const slow = session({ setting: walkAt(1.9, 0), readings: steady(99, 15) });
    expect(propose([slow])).toMatchObject({
      action: 'review',
      codes: ['effort-above', 'lowest-setting'],
      to: null,
    });
  });

  it('is set by effort where the equation does not reach', () => {
    const slow = session({ setting: walkAt(1.5, 0), readings: steady(99, 15) });
    expect(propose([slow])).toMatchObject({ action: 'easier', to: null });
  });

  it('waits for a new range, and for what stops', () => {
    expect(propose(twice(), [], { withdrawn: true })).toMatchObject({
      action: 'review',
      codes: ['withdrawn'],
    });
    expect(propose(twice(), [(i) => (i.conditions.outflowObstruction = true)])).toMatchObject({
      action: 'review',
      codes: ['stop-caution'],
    });
    const unknown: Change[] = [withoutTest];
    expect(propose(twice(), unknown)).toMatchObject({
      action: 'hold',
      codes: ['work-ceiling-unknown'],
    });
  });

  it('goes by effort alone where effort leads and no limit is known', () => {
    const effort: Change[] = [withoutTest, withoutThresholds];
    expect(propose(twice({ readings: [reading({ heartRate: null })] }), effort)).toMatchObject({
      action: 'harder',
      codes: ['easy-in-range'],
    });
  });

  it('holds where the weight that the work rests on is not known', () => {
    const cycle = twice({ setting: { modality: 'cycle', powerWatts: watts(60) } });
    expect(propose(cycle, [], { weight: null })).toMatchObject({
      action: 'hold',
      codes: ['equation-range'],
    });
    expect(propose(cycle).action).toBe('harder');
  });

  it('reads the arms against a range and a limit of their own', () => {
    const open: Change[] = [withoutThresholds, (i) => (i.test = { ...i.test!, peakVo2: 30 })];
    const arms = (heartRate: number, power: number) =>
      twice({
        setting: { modality: 'arm', powerWatts: watts(power) },
        readings: steady(heartRate, 12),
      });
    // The legs' range is 91–119, the arms' 81–109.
    expect(propose(arms(112, 40).slice(0, 1), open).codes).toEqual(['rate-above']);
    expect(propose(arms(95, 40), open)).toMatchObject({ action: 'harder' });
  });
});

it('lies within its bounds by default, each number with a source', () => {
  expect(policyFaults(progressionNumbers, defaultProgressionPolicy)).toEqual([]);
  for (const { source } of Object.values(progressionNumbers)) expect(source).not.toBe('');
});
