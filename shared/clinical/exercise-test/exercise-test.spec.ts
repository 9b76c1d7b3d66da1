import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bpm, centimeters, kilograms, minutes, vo2, watts } from '../../units';
import { recoveryCriterionFor } from './heart-rate-recovery';
import type { RecoveryFacts } from './heart-rate-recovery';
import { friend2017Vo2, friend2018Vo2, percentOfPredicted } from './predicted-capacity';
import {
  lastFinishedStage,
  naughtonStages,
  protocolNames,
  protocolSources,
  stagesOf,
  testProtocols,
} from './protocols';
import type { TabledProtocol } from './protocols';
import { cycleRamp, rampMinutes, treadmillRamp } from './ramps';
import { cycleStageWork, fosterPeakVo2, treadmillStageWork } from './stage-uptake';
import { treadmillTimeEstimates } from './time-estimates';
import type { TimedTest } from './time-estimates';

const test = (changes: Partial<TimedTest> = {}): TimedTest => ({
  protocol: 'bruce',
  sexAtBirth: 'male',
  time: minutes(9),
  handrail: false,
  ...changes,
});

describe('the stages of a protocol', () => {
  it.each<[TabledProtocol, number, [string, number, number, number]]>([
    ['bruce', 1, ['1', 0, 1.7, 10]],
    ['bruce', 4, ['4', 9, 4.2, 16]],
    ['modified-bruce', 2, ['½', 3, 1.7, 5]],
    ['modified-bruce', 4, ['2', 9, 2.5, 12]],
    ['naughton', 3, ['3', 6, 2, 7]],
    ['balke-ware', 1, ['1', 0, 3.3, 0]],
    ['balke-ware', 2, ['2', 1, 3.3, 2]],
    ['balke-ware', 10, ['10', 9, 3.3, 10]],
  ])('%s, row %i', (protocol, row, expected) => {
    const stage = stagesOf(protocol)[row - 1];
    expect([stage?.label, stage?.startsAt, stage?.speedMph, stage?.gradePercent]).toEqual(expected);
  });

  it.each(['bruce', 'modified-bruce', 'naughton', 'balke-ware'] as const)(
    'of %s follow one another and never get easier',
    (protocol) => {
      const stages = stagesOf(protocol);
      for (const [index, stage] of stages.slice(1).entries()) {
        const before = stages[index];
        expect(stage.startsAt).toBe((before?.startsAt ?? NaN) + (before?.minutes ?? NaN));
        expect(treadmillStageWork(stage, 'walk').mets).toBeGreaterThan(
          before === undefined ? NaN : treadmillStageWork(before, 'walk').mets,
        );
      }
    },
  );

  it('have a name, and where they are printed, a source', () => {
    for (const protocol of testProtocols) expect(protocolNames[protocol]).not.toBe('');
    expect(Object.keys(protocolSources)).toHaveLength(testProtocols.length - 3);
    expect(rampMinutes.lowest).toBeLessThan(rampMinutes.highest);
  });

  it('of Naughton are as long as the laboratory has them, with or without a warm-up', () => {
    const stages = naughtonStages({ minutesPerStage: 2, warmUp: true });
    expect(stages[0]).toMatchObject({ label: '0', speedMph: 1, gradePercent: 0, minutes: 2 });
    expect(stages[1]).toMatchObject({ label: '1', startsAt: 2, speedMph: 2, gradePercent: 0 });
  });

  it.each<[number, string | null]>([
    [2.99, null],
    [3, '1'],
    [8.9, '2'],
    [9, '3'],
    [60, '10'],
  ])('after %d min the last finished is %s', (time, label) => {
    expect(lastFinishedStage(stagesOf('bruce'), minutes(time))?.label ?? null).toBe(label);
  });
});

describe('the work of a stage', () => {
  it('goes by the gait that was seen: stage 4 of Bruce is 13.5 METs walked, 12.1 run', () => {
    const stage = { speedMph: 4.2, gradePercent: 16 };
    expect(treadmillStageWork(stage, 'walk').mets).toBeCloseTo(13.5, 1);
    expect(treadmillStageWork(stage, 'run').mets).toBeCloseTo(12.1, 1);
  });

  it.each<[number, 'walk' | 'run', boolean]>([
    [1.7, 'walk', false],
    [1.9, 'walk', true],
    [3.7, 'walk', true],
    [4.2, 'walk', false],
    [2.9, 'run', false],
    [3, 'run', true],
  ])('at %d mph, %s: within the validated range is %s', (speedMph, gait, within) => {
    expect(treadmillStageWork({ speedMph, gradePercent: 5 }, gait).withinEquationRange).toBe(
      within,
    );
  });

  it('lies within what is printed, to half a MET, for the walked stages of Bruce', () => {
    for (const stage of stagesOf('bruce').slice(1, 4)) {
      const work = treadmillStageWork(stage, 'walk').mets;
      const [lower, upper] = stage.printedMets ?? [NaN, NaN];
      expect(work).toBeGreaterThan(lower - 0.6);
      expect(work).toBeLessThan(upper + 0.6);
    }
  });

  it('on a cycle needs the weight', () => {
    expect(cycleStageWork(watts(100), kilograms(80))).toMatchObject({
      vo2: 20.5,
      withinEquationRange: true,
    });
    expect(cycleStageWork(watts(25), kilograms(80)).withinEquationRange).toBe(false);
  });

  it('overstates the peak, with the rail held most of all', () => {
    expect(fosterPeakVo2(vo2(35), false)).toBeCloseTo(30.345, 6);
    expect(fosterPeakVo2(vo2(35), true)).toBeLessThan(fosterPeakVo2(vo2(35), false));
  });
});

describe('a ramp', () => {
  it('runs from its first setting to its last in minutes', () => {
    const ramp = treadmillRamp(
      { speedMph: 1.5, gradePercent: 0 },
      { speedMph: 3.5, gradePercent: 10 },
      11,
    );
    expect(ramp).toHaveLength(11);
    expect(ramp[5]).toMatchObject({ startsAt: 5, speedMph: 2.5, gradePercent: 5 });
    expect(ramp.at(-1)).toMatchObject({ speedMph: 3.5, gradePercent: 10 });
    expect(cycleRamp(watts(20), watts(15), 10).map(({ power }) => power)).toEqual([
      20, 35, 50, 65, 80, 95, 110, 125, 140, 155,
    ]);
  });

  it.each([0, 2.5, 31])('has no %d minutes', (count) => {
    expect(() => cycleRamp(watts(20), watts(10), count)).toThrow(RangeError);
  });
});

describe('uptake from time on the treadmill', () => {
  it('is by Foster for men, by Pollock for women, first', () => {
    expect(treadmillTimeEstimates(test())[0]).toMatchObject({ source: 'Foster 1984', why: null });
    expect(treadmillTimeEstimates(test({ sexAtBirth: 'female' }))[0]).toMatchObject({
      source: 'Pollock 1982',
    });
  });

  it('is none by an equation that asks for the sex when it is not known', () => {
    const sources = treadmillTimeEstimates(test({ sexAtBirth: 'unknown' })).map(
      ({ source }) => source,
    );
    expect(sources).toEqual(['Froelicher']);
  });

  it.each<[string, Partial<TimedTest>]>([
    ['short time', { time: minutes(2.9) }],
    ['long time', { time: minutes(21.1) }],
    ['a held rail', { handrail: true }],
  ])('is not given for %s', (_why, changes) => {
    for (const estimate of treadmillTimeEstimates(test(changes))) {
      expect(estimate).toMatchObject({ vo2: null, mets: null });
      expect(estimate.why).not.toBeNull();
    }
  });

  it('never lies at or below rest, and rises with time', () => {
    const time = fc.double({ min: 0, max: 30, noNaN: true });
    fc.assert(
      fc.property(time, fc.constantFrom('male' as const, 'female' as const), (at, sexAtBirth) => {
        const now = treadmillTimeEstimates(test({ time: minutes(at), sexAtBirth }));
        const later = treadmillTimeEstimates(test({ time: minutes(at + 0.5), sexAtBirth }));
        for (const [index, { vo2: uptake }] of now.entries()) {
          const next = later[index]?.vo2 ?? null;
          if (uptake !== null) expect(uptake).toBeGreaterThan(3.5);
          if (uptake !== null && next !== null) expect(next).toBeGreaterThan(uptake);
        }
      }),
    );
  });

  it('was published for no other protocol than Bruce and Balke', () => {
    expect(treadmillTimeEstimates(test({ protocol: 'naughton' }))).toEqual([]);
    expect(treadmillTimeEstimates(test({ protocol: 'balke-ware' }))).toHaveLength(1);
  });
});

describe('the predicted capacity', () => {
  it('is lower for women and on a cycle', () => {
    const facts = { ageYears: 60, sexAtBirth: 'male', weight: kilograms(80) } as const;
    expect(friend2017Vo2({ ...facts, sexAtBirth: 'female' })).toBeLessThan(friend2017Vo2(facts));
    const height = centimeters(178);
    expect(friend2018Vo2(facts, height, 'cycle')).toBeLessThan(
      friend2018Vo2(facts, height, 'treadmill'),
    );
  });

  it('gives no percentage where the equation has run out', () => {
    expect(percentOfPredicted(vo2(20), vo2(-1))).toBeNull();
  });
});

describe('the cut-off of heart-rate recovery', () => {
  it.each<[RecoveryFacts, number | null]>([
    [{ minute: 1, posture: 'upright', effort: 'maximal' }, 12],
    [{ minute: 1, posture: 'supine', effort: 'maximal' }, 18],
    [{ minute: 1, posture: 'seated', effort: 'maximal' }, null],
    [{ minute: 1, posture: null, effort: 'maximal' }, null],
    [{ minute: 1, posture: 'upright', effort: 'submaximal' }, null],
    [{ minute: 2, posture: null, effort: 'maximal' }, 22],
    [{ minute: 2, posture: 'seated', effort: 'submaximal' }, 42],
    [{ minute: 2, posture: 'supine', effort: null }, null],
  ])('%o', (facts, cutoff) => {
    expect(recoveryCriterionFor(facts)?.abnormalTo ?? null).toBe(
      cutoff === null ? null : bpm(cutoff),
    );
  });
});
