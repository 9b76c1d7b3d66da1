import {
  heartRateRecovery,
  isRecoveryAbnormal,
  recoveryCriteria,
} from '@shared/clinical/exercise-test/heart-rate-recovery';
import { treadmillTimeEstimates } from '@shared/clinical/exercise-test/time-estimates';
import { scorePhq9 } from '@shared/clinical/questionnaires/phq-9';
import { defaultStaffing, staffNeeded } from '@shared/clinical/risk/staffing';
import { judgeWalkChange } from '@shared/clinical/six-minute-walk-change';
import type { BeforeWalk, WalkStandard } from '@shared/clinical/walk-test-screening';
import { screenWalk } from '@shared/clinical/walk-test-screening';
import * as equations from '@shared/clinical/metabolic-equations';
import {
  bpm,
  mmHg,
  meters,
  mets,
  metersPerMinute,
  minutes,
  mphOf,
  vo2,
  vo2Of,
} from '@shared/units';
import { expect } from 'vitest';
import { riskOfNothingKnown } from './risk-facts';
import { input } from './vectors';
import type { Vector } from './vectors';

const printedSpeed = (vector: Vector) => metersPerMinute(26.8 * input(vector, 'speed'));

/** The teaching form with 26.8 m/min an mph and 0.4824 and 0.2412 cut to two digits: it prints other third digits than ours. */
const walkedByMph = (mph: number, percent: number) => 3.5 + 2.68 * mph + 0.48 * mph * percent;
const runByMph = (mph: number, percent: number) => 3.5 + 5.36 * mph + 0.24 * mph * percent;

/**
 * A printed result that comes from the cut form: that form gives it, the exact equation differs by no more than the cutting,
 * 0.5 % of the grade's part.
 */
const cutForm =
  (
    byMph: (mph: number, percent: number) => number,
    exact: typeof equations.walkingVo2,
    gradeFactor: number,
  ) =>
  (vector: Vector) => {
    const [mph, percent] = [input(vector, 'speed'), input(vector, 'grade')];
    expect(byMph(mph, percent)).toBeCloseTo(Number(vector.expected), 2);
    const ours = exact(printedSpeed(vector), percent / 100);
    expect(ours - byMph(mph, percent)).toBeGreaterThan(0);
    expect(ours - byMph(mph, percent)).toBeLessThanOrEqual(gradeFactor * mph * percent + 1e-9);
  };

const walkedCut = cutForm(walkedByMph, equations.walkingVo2, 0.0024);
const runCut = cutForm(runByMph, equations.runningVo2, 0.0012);

const recovery = (vector: Vector) =>
  heartRateRecovery(bpm(input(vector, 'peak')), bpm(input(vector, 'oneMin')));

const gain = (vector: Vector, condition: 'coronary-disease' | 'heart-failure') =>
  judgeWalkChange(meters(400), meters(400 + input(vector, 'change')), condition).important;

const readyToWalk: BeforeWalk = {
  heartRate: bpm(70),
  pressure: { systolic: mmHg(130), diastolic: mmHg(80) },
  oxygenSaturation: 97,
  recentEvent: false,
};

/** Vectors that state what a test, walk or questionnaire must come to, and examples that do not reproduce as printed. */
export const statedRules: Readonly<Record<string, (vector: Vector) => void>> = {
  'MET-WWU1': walkedCut,
  'MET-WWU2': walkedCut,
  'MET-WWU3': walkedCut,
  'MET-WWU4': walkedCut,
  'MET-WWU11': runCut,
  'MET-WWU12': runCut,
  'MET-WWU6': (vector) => {
    // Printed 20 %; the exact equation gives 19.8 %.
    const grade = equations.walkingGrade(vo2Of(mets(input(vector, 'mets'))), printedSpeed(vector));
    expect(100 * grade).toBeCloseTo(19.84, 2);
    expect(walkedByMph(2, 19.94)).toBeCloseTo(28, 1);
    expect(Math.round(100 * grade)).toBe(vector.expected);
  },
  'MET-WWU10': (vector) => {
    // Printed 4.028 mph; by the exact equation the same uptake is reached at 4.015 mph.
    const uptake = (0.75 * input(vector, 'vo2max') * 1000) / input(vector, 'mass');
    expect(walkedByMph(Number(vector.expected), input(vector, 'grade'))).toBeCloseTo(uptake, 1);
    const speed = metersPerMinute(26.8 * 4.0147);
    expect(equations.walkingVo2(speed, 0.12)).toBeCloseTo(uptake, 2);
    expect(mphOf(speed)).toBeLessThan(Number(vector.expected));
    expect(equations.walkingSpeedInRange(speed)).toBe(false);
  },
  'PHQ9-I9': (vector) => {
    const score = scorePhq9([3, 2, 0, 0, 0, 0, 0, 0, 1]);
    expect(input(vector, 'item9')).toBe(1);
    expect(score).toMatchObject({
      total: input(vector, 'total'),
      band: 'mild',
      selfHarm: 'follow-up-today',
    });
  },
  'RISK-8': () => {
    const { riskClass, treatAs, missing, criteria } = riskOfNothingKnown();
    expect(riskClass).toBe('undetermined');
    expect(treatAs).toBe('high');
    expect(missing).toHaveLength(criteria.length);
  },
  'STAFF-2': (vector) => {
    const risks = Array<'low'>(input(vector, 'patients')).fill('low');
    expect(staffNeeded(risks, defaultStaffing)).toBe(vector.expected);
  },
  'WALK-SPO2': (vector) => {
    const before = { ...readyToWalk, oxygenSaturation: input(vector, 'spo2') };
    expect(screenWalk(before, 'ers-ats-2014').verdict).toBe(vector.expected);
  },
  'WALK-BP': (vector) => {
    const pressure = {
      systolic: mmHg(input(vector, 'sbp')),
      diastolic: mmHg(input(vector, 'dbp')),
    };
    const verdictBy = (standard: WalkStandard) =>
      screenWalk({ ...readyToWalk, pressure }, standard).verdict;
    expect([verdictBy('ers-ats-2014'), verdictBy('ats-2002')]).toEqual(['proceed', 'relative']);
  },
  'HRREC-1': (vector) => {
    expect(recovery(vector)).toBe(12);
    expect(isRecoveryAbnormal(recovery(vector), recoveryCriteria['upright-one-minute'])).toBe(true);
  },
  'HRREC-2': (vector) => {
    const fall = recovery(vector);
    expect(fall).toBe(13);
    expect(isRecoveryAbnormal(fall, recoveryCriteria['upright-one-minute'])).toBe(false);
    expect(isRecoveryAbnormal(fall, recoveryCriteria['supine-one-minute'])).toBe(true);
  },
  'HRREC-3': (vector) => {
    const fall = bpm(input(vector, 'drop'));
    expect(isRecoveryAbnormal(fall, recoveryCriteria['submaximal-two-minutes'])).toBe(true);
  },
  'HRREC-4': (vector) => {
    const criterion = recoveryCriteria['maximal-two-minutes'];
    expect(isRecoveryAbnormal(bpm(input(vector, 'drop')), criterion)).toBe(true);
    expect(isRecoveryAbnormal(bpm(input(vector, 'drop') + 1), criterion)).toBe(false);
  },
  '6MW-MCID1': (vector) => {
    expect(gain(vector, 'coronary-disease')).toBe('none');
  },
  '6MW-MCID2': (vector) => {
    expect(gain(vector, 'coronary-disease')).toBe('gain');
    expect(gain(vector, 'heart-failure')).toBe('none');
  },
};

/** Examples that stand in print, do not reproduce, and are no numbered check value. */
export const misprints: readonly (readonly [string, () => void])[] = [
  [
    'a running grade of 2.5 % (SIU Edwardsville practice key): the walking factor 1.8 was used; 4.9 % by 0.9',
    () => {
      const speed = metersPerMinute(187.6);
      const uptake = vo2(49.3);
      expect(100 * equations.runningGrade(uptake, speed)).toBeCloseTo(4.904, 3);
      expect((100 * (uptake - 3.5 - 0.2 * speed)) / (1.8 * speed)).toBeCloseTo(2.452, 3);
    },
  ],
  [
    'an uptake at no time at all: the cubic gives 14.8 at 0 min, and the product gives none',
    () => {
      const [estimate] = treadmillTimeEstimates({
        protocol: 'bruce',
        sexAtBirth: 'male',
        time: minutes(0),
        handrail: false,
      });
      expect(estimate).toMatchObject({ vo2: null, mets: null });
    },
  ],
];
