import { describe, expect, it } from 'vitest';
import {
  answerTo,
  withTest,
  withoutTest,
  withoutThresholds,
} from '../../../../test/builders/prescription-request';
import type { Change } from '../../../../test/builders/prescription-request';
import { meters } from '../../../units';
import type { Modality, Workload, WorkloadPoint } from '../answer';
import { defaultPolicy } from '../policy';

/** A work target of exactly these METs: half and all of the reserve of a peak that gives them. */
const workOf = (start: number, limit: number): Change[] => [
  withoutThresholds,
  withTest({ peakVo2: null, peakMets: 10 }),
  (i) => (i.intensity = { lower: (start - 1) / 9, upper: (limit - 1) / 9 }),
];

function rowOf<M extends Modality>(
  modality: M,
  point: WorkloadPoint,
  changes: Change[],
): Extract<Workload, { modality: M }> {
  const row = answerTo(changes).workloads.find(
    (each): each is Extract<Workload, { modality: M }> =>
      each.modality === modality && each.point === point,
  );
  if (row === undefined) throw new Error(`no ${modality} row`);
  return row;
}

describe('workloads', () => {
  it('stand in one order, start before limit', () => {
    expect(answerTo().workloads.map(({ modality, point }) => [modality, point])).toEqual(
      ['treadmill-walk', 'cycle', 'arm', 'step', 'stepper'].flatMap((modality) => [
        [modality, 'start'],
        [modality, 'limit'],
      ]),
    );
  });

  it.each<[number, number | null, number | null]>([
    [2.45, null, null],
    [2.46, 1.9, 0],
    [3.2, 2.8, 0],
    [3.299, 2.9, 0],
    [3.2991, 3, 0],
    [3.4, 3, 0],
    [4.45, 3, 2.5],
    [7.43, 3, 9.5],
    [7.44, 3, 10],
    [7.64, 3, 10],
    [7.65, null, null],
  ])('treadmill at %d METs', (work, speedMph, gradePercent) => {
    const row = rowOf('treadmill-walk', 'limit', workOf(1.3, work));
    expect(row).toMatchObject({ speedMph, gradePercent, withinEquationRange: speedMph !== null });
    expect(row.why === null).toBe(speedMph !== null);
    if (row.mets !== null) expect(row.mets).toBeLessThanOrEqual(work + 1e-9);
    expect(row.mets === null).toBe(speedMph === null);
  });

  it.each<[number, number | null]>([
    [3.83, null],
    [3.84, 50],
    [4.4, 65],
    [9.53, 200],
    [9.54, null],
  ])('cycle at %d METs and 84 kg', (work, powerWatts) => {
    const row = rowOf('cycle', 'limit', workOf(2, work));
    expect(row).toMatchObject({ powerWatts, withinEquationRange: powerWatts !== null });
  });

  it('cycle beyond the equation, for a heavier patient', () => {
    const heavy: Change = (i) => (i.patient.weightKg = 150);
    const row = rowOf('cycle', 'limit', [...workOf(2, 9.5), heavy]);
    expect(row).toMatchObject({ powerWatts: null, mets: null, withinEquationRange: false });
    // The arms do 0.45 of the 364.6 W that the legs would, which is out of range too.
    const arm = rowOf('arm', 'limit', [...workOf(2, 9.5), heavy]);
    expect(arm).toMatchObject({ powerWatts: null, withinEquationRange: false });
  });

  it('arms do a fraction of the unsnapped cycle work, at a lower rate', () => {
    // (3.5 × 4.4 − 7) × 84 / 10.8 = 65.33 W on the legs, × 0.45 = 29.4 W.
    const row = rowOf('arm', 'limit', workOf(2, 4.4));
    const { target } = answerTo(workOf(2, 4.4));
    expect(row.powerWatts).toBe(25);
    expect(row.mets).toBeCloseTo((3.5 + (18 * 25) / 84) / 3.5, 9);
    expect(row.target).toEqual({
      lower: (target?.lower ?? 0) - 10,
      upper: (target?.upper ?? 0) - 10,
    });
  });

  it('an arm test gives arm work and its own range', () => {
    const changes = [...workOf(2, 4), withTest({ peakVo2: null, peakMets: 10, mode: 'arm' })];
    const row = rowOf('arm', 'limit', changes);
    // (14 − 3.5) × 84 / 18 = 49 W.
    expect(row).toMatchObject({ powerWatts: 45, target: answerTo(changes).target });
  });

  it('arms without a leading heart rate have work and no range', () => {
    const row = rowOf('arm', 'limit', [...workOf(2, 4.4), (i) => (i.rhythm = 'fixed-paced')]);
    expect(row).toMatchObject({ powerWatts: 25, target: null });
  });

  it.each<[number, number | null]>([
    [2.91, null],
    [2.92, 12],
    [4.45, 21],
    [5.79, 29],
    [5.8, 30],
    [5.95, 30],
    [5.96, null],
  ])('step at %d METs', (work, stepsPerMinute) => {
    const row = rowOf('step', 'limit', workOf(2, work));
    const stepHeightMeters = stepsPerMinute === null ? null : 0.15;
    expect(row).toMatchObject({ stepsPerMinute, stepHeightMeters });
  });

  it('takes the nearest step that the program has', () => {
    const step = { lowest: meters(0.2), highest: meters(0.3), by: meters(0.05) };
    const policy = { ...defaultPolicy, equipment: { ...defaultPolicy.equipment, step } };
    const row = answerTo(workOf(2, 4.45), policy).workloads.find(
      ({ modality, point }) => modality === 'step' && point === 'limit',
    );
    expect(row).toMatchObject({ stepHeightMeters: 0.2 });
  });

  it('stepper shows the point itself', () => {
    const row = rowOf('stepper', 'limit', workOf(2, 4.5));
    expect(row.mets).toBeCloseTo(4.5, 9);
  });

  it('without a weight leaves cycle and arm empty with the reason', () => {
    const answer = answerTo((i) => (i.patient.weightKg = null));
    const empty = answer.workloads.filter(({ modality }) => ['cycle', 'arm'].includes(modality));
    expect(empty).toHaveLength(4);
    for (const row of empty) {
      expect(row).toMatchObject({ powerWatts: null, mets: null, withinEquationRange: false });
      expect(row.why).toMatch(/weight/);
    }
  });

  it('are none without a work target', () => {
    expect(answerTo(withTest({ peakVo2: null })).workloads).toEqual([]);
  });
});

describe('the start from the six-minute walk', () => {
  const walked =
    (distanceMeters: number): Change =>
    (i) =>
      (i.walkTest = { distanceMeters });

  it('is 0.7 of the walking speed, flat', () => {
    // 480 m in 6 min are 80 m/min; 0.7 of it 56 m/min = 2.088 mph.
    const { workloads } = answerTo([withoutTest, withoutThresholds, walked(480)]);
    expect(workloads).toEqual([
      {
        modality: 'treadmill-walk',
        point: 'start',
        speedMph: 2,
        speedMetersPerMinute: expect.closeTo(53.6448, 9),
        gradePercent: 0,
        mets: expect.closeTo(2.5327, 4),
        withinEquationRange: true,
        why: 'six-minute walk',
      },
    ]);
  });

  it('keeps its speed below the range of the equation', () => {
    const answer = answerTo([withoutTest, withoutThresholds, walked(300)]);
    expect(answer.workloads).toMatchObject([
      { speedMph: 1.3, mets: null, withinEquationRange: false, why: 'six-minute walk' },
    ]);
    expect(answer.cautions.map(({ code }) => code)).toContain('equation-out-of-range');
  });

  it('is empty above it', () => {
    const { workloads } = answerTo([withoutTest, withoutThresholds, walked(1000)]);
    expect(workloads).toMatchObject([{ speedMph: null, mets: null, withinEquationRange: false }]);
  });

  it('is there also where the test gives no peak that work may rest on', () => {
    const change = withTest({ endedBy: 'claudication' });
    expect(answerTo([change, withoutThresholds, walked(480)]).workloads).toHaveLength(1);
  });

  it.each<[string, Change[]]>([
    ['a peak', [withoutThresholds]],
    ['an active threshold', [withoutTest]],
    [
      'an ICD of unknown rate',
      [withoutTest, withoutThresholds, (i) => (i.devices.icd.status = 'unknown')],
    ],
    [
      'a physician who sets all',
      [withoutTest, withoutThresholds, (i) => (i.conditions.outflowObstruction = true)],
    ],
    [
      'no valid range',
      [
        withoutTest,
        withoutThresholds,
        (i) => (i.choice.maximum = 'brawner'),
        (i) => (i.devices.upperTrackingRate = 80),
      ],
    ],
  ])('is not there with %s', (_case, changes) => {
    const rows = answerTo([...changes, walked(480)]).workloads;
    expect(rows.filter(({ why }) => why === 'six-minute walk')).toEqual([]);
  });
});
