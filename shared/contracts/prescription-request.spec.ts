import { describe, expect, it } from 'vitest';
import * as z from 'zod';
import { answerTo, prescriptionInput } from '../../test/builders/prescription-request';
import type { Change } from '../../test/builders/prescription-request';
import { defaultPolicy } from '../clinical/prescribing';
import { fieldErrors } from './field-errors';
import { prescriptionPolicySchema } from './policy-contract';
import { prescriptionAnswerSchema, prescriptionRequestSchema } from './prescriptions-contract';

type Path = readonly (string | number)[];

/** The request with one value put at a path, whatever its type. */
function withValue(path: Path, value: unknown): unknown {
  const input: unknown = prescriptionInput();
  let at = input as Record<string | number, unknown>;
  for (const key of path.slice(0, -1)) at = at[key] as Record<string | number, unknown>;
  const last = path.at(-1) ?? '';
  if (value === undefined) delete at[last];
  else at[last] = value;
  return input;
}

function pathsRefused(input: unknown): string[] {
  const parsed = prescriptionRequestSchema.safeParse(input);
  return parsed.success ? [] : fieldErrors(parsed.error).map(({ path }) => path);
}

describe('a prescription request', () => {
  it('is taken as it is, every key with its value', () => {
    const input = prescriptionInput();
    expect(prescriptionRequestSchema.parse(input)).toEqual(input);
  });

  it.each<[string, Path, number, number]>([
    ['age', ['patient', 'ageYears'], 18, 110],
    ['height', ['patient', 'heightCm'], 100, 250],
    ['weight', ['patient', 'weightKg'], 25, 350],
    ['seated rate', ['resting', 'seated'], 30, 130],
    ['peak VO2', ['test', 'peakVo2'], 4, 80],
    ['peak METs', ['test', 'peakMets'], 1, 25],
    ['threshold', ['thresholds', 0, 'heartRate'], 40, 230],
    ['clear work', ['thresholds', 0, 'clearMets'], 1, 25],
    ['tracking rate', ['devices', 'upperTrackingRate'], 50, 220],
  ])('takes %s at %j from %d to %d', (_case, path, lowest, highest) => {
    const dotted = path.join('.');
    expect(pathsRefused(withValue(path, lowest))).toEqual([]);
    // A seated rate at its upper bound comes near the peak, which is another rule.
    expect(pathsRefused(withValue(path, highest))).toEqual([]);
    expect(pathsRefused(withValue(path, lowest - 0.1))).toEqual([dotted]);
    expect(pathsRefused(withValue(path, highest + 0.1))).toEqual([dotted]);
  });

  it('takes a peak from 60 to 230, above the seated rate', () => {
    const at = (seated: number, peakHeartRate: number) => {
      const input = prescriptionInput((i) => (i.resting.seated = seated));
      if (input.test) input.test.peakHeartRate = peakHeartRate;
      return pathsRefused(input);
    };
    expect(at(50, 60)).toEqual([]);
    expect(at(50, 230)).toEqual([]);
    expect(at(50, 59.9)).toEqual(['test.peakHeartRate']);
    expect(at(50, 230.1)).toEqual(['test.peakHeartRate']);
    expect(at(62, 62)).toEqual(['test.peakHeartRate']);
    expect(at(62, 62.1)).toEqual([]);
  });

  it.each<[string, Change, string]>([
    [
      'a resting rate of the test at its peak',
      (i) => (i.test!.restingHeartRate = 134),
      'test.restingHeartRate',
    ],
    [
      'an intensity upside down',
      (i) => (i.intensity = { lower: 0.8, upper: 0.4 }),
      'intensity.upper',
    ],
    [
      'an intensity of no width',
      (i) => (i.intensity = { lower: 0.6, upper: 0.6 }),
      'intensity.upper',
    ],
    [
      'a percent of peak upside down',
      (i) => (i.percentOfPeak = { lower: 0.8, upper: 0.7 }),
      'percentOfPeak.upper',
    ],
    [
      'an observed effort upside down',
      (i) =>
        (i.observedWork = {
          medianHeartRate: 90,
          sessions: 2,
          perceivedExertion: { lower: 13, upper: 11 },
        }),
      'observedWork.perceivedExertion.upper',
    ],
    [
      'ICD zones without an ICD',
      (i) => (i.devices.icd = { status: 'none', zones: [{ rate: 170, kind: 'shock' }] }),
      'devices.icd.zones',
    ],
    [
      'ICD zones of an ICD that nobody knows of',
      (i) => (i.devices.icd = { status: 'unknown', zones: [{ rate: 170, kind: 'shock' }] }),
      'devices.icd.zones',
    ],
    [
      'an ICD rate out of bounds',
      (i) => (i.devices.icd = { status: 'present', zones: [{ rate: 79, kind: 'monitor' }] }),
      'devices.icd.zones.0.rate',
    ],
    ['no walk at all', (i) => (i.walkTest = { distanceMeters: 0 }), 'walkTest.distanceMeters'],
  ])('refuses %s', (_case, change, path) => {
    expect(pathsRefused(prescriptionInput(change))).toEqual([path]);
  });

  it.each<[string, Path, unknown, string]>([
    ['a number as text', ['resting', 'seated'], '62', 'resting.seated'],
    ['null where a value is needed', ['programWeek'], null, 'programWeek'],
    ['a missing key', ['walkTest'], undefined, 'walkTest'],
    ['a missing key within', ['test', 'peakMets'], undefined, 'test.peakMets'],
    ['an unknown key', ['mood'], 'fine', 'mood'],
    ['an unknown key within', ['test', 'watts'], 100, 'test.watts'],
    ['an unknown word', ['rhythm'], 'bigeminy', 'rhythm'],
    ['an unknown drug', ['rateActingDrugs'], ['aspirin'], 'rateActingDrugs.0'],
    ['a list for an object', ['conditions'], [], 'conditions'],
    ['a threshold of unknown kind', ['thresholds', 0, 'kind'], 'pain', 'thresholds.0.kind'],
    ['Infinity', ['resting', 'spread'], Infinity, 'resting.spread'],
  ])('refuses %s', (_case, path, value, expected) => {
    const refused = pathsRefused(withValue(path, value));
    expect(refused.length).toBeGreaterThan(0);
    expect(refused.every((each) => each === expected || each.startsWith(`${expected}.`))).toBe(
      true,
    );
  });

  it('tells one fault a field, in a sentence, also across fields', () => {
    const input = withValue(['patient', 'ageYears'], 17) as { resting: { seated: number } };
    input.resting.seated = 129;
    Object.assign(input, { test: { ...prescriptionInput().test, peakHeartRate: 120 } });
    const parsed = prescriptionRequestSchema.safeParse(input);
    expect(parsed.error && fieldErrors(parsed.error)).toEqual([
      {
        path: 'patient.ageYears',
        code: 'too_small',
        message: 'Age must be a number from 18 to 110 years.',
      },
      {
        path: 'test.peakHeartRate',
        code: 'custom',
        message: 'Peak heart rate must be above the seated resting rate.',
      },
    ]);
  });

  it('refuses what is no object', () => {
    for (const input of [null, [], 'x', 7]) expect(pathsRefused(input)).toEqual(['']);
  });
});

describe('the contracts', () => {
  it('hold the whole answer, every key of it', () => {
    const answers = [
      answerTo(),
      answerTo((i) => (i.rhythm = 'atrial-fibrillation')),
      answerTo((i) =>
        Object.assign(i, { test: null, thresholds: [], walkTest: { distanceMeters: 420 } }),
      ),
    ];
    for (const answer of answers) expect(prescriptionAnswerSchema.parse(answer)).toEqual(answer);
  });

  it('can be told as JSON Schema', () => {
    for (const schema of [prescriptionRequestSchema, prescriptionAnswerSchema]) {
      expect(z.toJSONSchema(schema)).toMatchObject({ type: 'object' });
    }
    expect(z.toJSONSchema(prescriptionRequestSchema)).toMatchObject({
      additionalProperties: false,
      properties: { resting: { properties: { seated: { minimum: 30, maximum: 130 } } } },
    });
  });

  it('take the default policy and refuse one beyond its bounds', () => {
    expect(prescriptionPolicySchema.parse(defaultPolicy)).toEqual(defaultPolicy);
    const narrowMargin = { ...defaultPolicy, margin: { ...defaultPolicy.margin, ischemia: 9 } };
    const parsed = prescriptionPolicySchema.safeParse(narrowMargin);
    expect(parsed.error && fieldErrors(parsed.error)).toMatchObject([{ path: 'margin.ischemia' }]);
    expect(prescriptionPolicySchema.safeParse({ ...defaultPolicy, version: 1.5 }).success).toBe(
      false,
    );
  });
});
