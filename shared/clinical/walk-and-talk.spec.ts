import { describe, expect, it } from 'vitest';
import { bpm, mmHg } from '../units';
import type { SpeechComfort } from './talk-test';
import { talkTestRange, talkTestSource } from './talk-test';
import type { BeforeWalk, WalkStandard } from './walk-test-screening';
import { screenWalk, walkStandardSources } from './walk-test-screening';

describe('the talk test', () => {
  const speech = (text: string): (SpeechComfort | null)[] =>
    [...text].map((sign) => {
      if (sign === '?') return null;
      return sign === '+' ? 'comfortable' : sign === '±' ? 'doubtful' : 'not-comfortable';
    });

  it.each<[string, { lower: number; upper: number } | null]>([
    ['++++±-', { lower: 1, upper: 2 }],
    ['++-', { lower: 0, upper: 0 }],
    ['+++-', { lower: 0, upper: 1 }],
    ['+-', null],
    ['-', null],
    ['++++', null],
    ['+++?-', null],
    ['', null],
  ])('%s: %o', (stages, range) => {
    expect(talkTestRange(speech(stages))).toEqual(range);
    expect(talkTestSource).toContain('Foster');
  });
});

describe('before a six-minute walk', () => {
  const before = (changes: Partial<BeforeWalk> = {}): BeforeWalk => ({
    heartRate: bpm(72),
    pressure: { systolic: mmHg(130), diastolic: mmHg(80) },
    oxygenSaturation: 97,
    recentEvent: false,
    ...changes,
  });
  const pressure = (systolic: number, diastolic: number) => ({
    systolic: mmHg(systolic),
    diastolic: mmHg(diastolic),
  });

  it.each<[Partial<BeforeWalk>, WalkStandard, string]>([
    [{}, 'ats-2002', 'proceed'],
    [{}, 'ers-ats-2014', 'proceed'],
    [{ pressure: pressure(190, 105) }, 'ats-2002', 'relative'],
    [{ pressure: pressure(190, 105) }, 'ers-ats-2014', 'proceed'],
    [{ pressure: pressure(200, 120) }, 'ers-ats-2014', 'proceed'],
    [{ pressure: pressure(201, 90) }, 'ers-ats-2014', 'relative'],
    [{ heartRate: bpm(121) }, 'ats-2002', 'relative'],
    [{ heartRate: bpm(120) }, 'ats-2002', 'proceed'],
    [{ oxygenSaturation: 85 }, 'ers-ats-2014', 'contraindicated'],
    [{ oxygenSaturation: 86 }, 'ers-ats-2014', 'proceed'],
    [{ recentEvent: true }, 'ats-2002', 'contraindicated'],
    [{ recentEvent: null }, 'ats-2002', 'ask'],
    [{ pressure: null }, 'ers-ats-2014', 'ask'],
    [{ heartRate: null }, 'ats-2002', 'ask'],
    [{ heartRate: null }, 'ers-ats-2014', 'proceed'],
    [{ oxygenSaturation: null }, 'ers-ats-2014', 'ask'],
    [{ oxygenSaturation: null }, 'ats-2002', 'proceed'],
  ])('%o by %s: %s', (changes, standard, verdict) => {
    const screening = screenWalk(before(changes), standard);
    expect(screening.verdict).toBe(verdict);
    expect(screening.why.length > 0).toBe(verdict !== 'proceed');
    expect(walkStandardSources[standard]).not.toBe('');
  });
});
