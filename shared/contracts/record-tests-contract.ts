import * as z from 'zod';
import { testEfforts, recoveryPostures } from '../clinical/exercise-test/heart-rate-recovery';
import { testProtocols } from '../clinical/exercise-test/protocols';
import { standEndings } from '../clinical/five-times-sit-to-stand';
import {
  testEndings,
  testModes,
  thresholdKinds,
  vo2Sources,
} from '../clinical/prescribing/request';
import { requestBounds } from '../clinical/prescribing/request-bounds';
import { ecgHindrances } from '../clinical/thresholds/ecg-readable';
import { localDateField, noteField, numberField, textField, wholeNumberField } from './fields';

// What was tested: entries of the record whose values limit or lead a prescription.

const note = noteField(1000).nullable().default(null);
const optional = <T extends z.ZodType>(field: T) => field.nullable().default(null);
const { thresholdRate, mets, vo2, peakRate, seatedRate } = requestBounds;

/** What the test's own numbers may be; the database's checks say the same. */
const testBounds = {
  minutes: { lowest: 0.1, highest: 60 },
  speedMph: { lowest: 0, highest: 15 },
  gradePercent: { lowest: 0, highest: 40 },
  powerWatts: { lowest: 0, highest: 600 },
  rate: { lowest: 30, highest: 230 },
  systolic: { lowest: 50, highest: 300 },
  diastolic: { lowest: 20, highest: 200 },
  exertion: { lowest: 6, highest: 20 },
  hoursSinceDose: { lowest: 0, highest: 720 },
} as const;

const rate = numberField(testBounds.rate, 'bpm');
const systolic = wholeNumberField(testBounds.systolic, 'mmHg');
const diastolic = wholeNumberField(testBounds.diastolic, 'mmHg');
const exertion = numberField(testBounds.exertion, 'on the Borg scale');

interface Pressures {
  readonly systolic: number | null;
  readonly diastolic: number | null;
}

/** A diastolic pressure stands below a systolic one, and never alone. */
const pressuresAgree = ({ systolic: above, diastolic: below }: Pressures): boolean =>
  below === null || (above !== null && below < above);

const stage = z
  .strictObject({
    label: textField(20, 'Name the stage'),
    minutes: numberField(testBounds.minutes, 'min'),
    speedMph: optional(numberField(testBounds.speedMph, 'mph')),
    gradePercent: optional(numberField(testBounds.gradePercent, '%')),
    powerWatts: optional(numberField(testBounds.powerWatts, 'W')),
    heartRate: optional(rate),
    systolic: optional(systolic),
    diastolic: optional(diastolic),
    exertion: optional(exertion),
  })
  .refine(pressuresAgree, { path: ['diastolic'], error: 'Diastolic must be below systolic' });

const testSigns = ['st-change', 'angina', 'arrhythmia'] as const;

const sign = z.strictObject({
  kind: z.enum(testSigns, 'Choose what was seen'),
  /** The rate at which it began. */
  heartRate: numberField(thresholdRate, 'bpm'),
  /** The highest work done before it began. */
  clearMets: optional(numberField(mets, 'METs')),
  detail: optional(textField(120, 'Say what was seen')),
});

const dose = z.strictObject({
  name: textField(120, 'Enter the name of the drug'),
  hoursSinceDose: optional(numberField(testBounds.hoursSinceDose, 'hours')),
});

export const exerciseTest = z
  .strictObject({
    mode: z.enum(testModes, 'Choose the mode'),
    /** As written on the report. */
    protocol: textField(80, 'Enter the protocol'),
    /** The protocol whose equations hold; `other` for none of these. */
    protocolKind: z.enum(testProtocols).default('other'),
    performedOn: localDateField,
    endedBy: z.enum(testEndings, 'Say why the test ended'),
    restingHeartRate: optional(numberField(seatedRate, 'bpm')),
    peakHeartRate: numberField(peakRate, 'bpm'),
    peakSystolic: optional(systolic),
    peakDiastolic: optional(diastolic),
    peakExertion: optional(exertion),
    /** Time of exercise, min. */
    exerciseMinutes: optional(numberField(testBounds.minutes, 'min')),
    stages: z.array(stage).max(40, 'Enter at most 40 stages').default([]),
    gait: optional(z.enum(['walk', 'run'])),
    handrail: optional(z.boolean()),
    /** Limited by symptoms (maximal), or stopped before. */
    effort: optional(z.enum(testEfforts)),
    /** The rate one and two minutes after the end. */
    recoveryOne: optional(rate),
    recoveryTwo: optional(rate),
    recoveryPosture: optional(z.enum(recoveryPostures)),
    signs: z.array(sign).max(10, 'Enter at most 10').default([]),
    /** Null: not asked; [] when none was taken. */
    drugsTaken: optional(z.array(dose).max(30, 'Enter at most 30')),
    peakVo2: optional(numberField(vo2, 'mL/kg/min')),
    peakMets: optional(numberField(mets, 'METs')),
    vo2Source: optional(z.enum(vo2Sources)),
    note,
  })
  .refine((test) => test.restingHeartRate === null || test.peakHeartRate > test.restingHeartRate, {
    path: ['peakHeartRate'],
    error: 'The peak is above the resting rate',
  })
  .refine((test) => test.vo2Source !== null || (test.peakVo2 === null && test.peakMets === null), {
    path: ['vo2Source'],
    error: 'Say whether it was measured or estimated',
  })
  .refine(
    (test) => pressuresAgree({ systolic: test.peakSystolic, diastolic: test.peakDiastolic }),
    { path: ['peakDiastolic'], error: 'Diastolic must be below systolic' },
  )
  .refine(({ signs, peakHeartRate }) => signs.every((seen) => seen.heartRate <= peakHeartRate), {
    path: ['signs'],
    error: 'A sign begins at or below the peak rate',
  })
  .refine(
    ({ gait, handrail, mode }) => mode === 'treadmill' || (gait === null && handrail === null),
    { path: ['gait'], error: 'Gait and handrail belong to a treadmill' },
  );

export const threshold = z.strictObject({
  kind: z.enum(thresholdKinds, 'Choose what was found'),
  heartRate: numberField(thresholdRate, 'bpm'),
  /** The highest work tolerated before onset. */
  clearMets: optional(numberField(mets, 'METs')),
  exerciseTestId: optional(z.uuid()),
  foundOn: localDateField,
  note,
  /** The active threshold of the same kind that this one takes the place of. */
  supersedes: optional(z.uuid()),
});

/** The resting ECG, as far as it says whether ischemia can be seen in exercise; none listed: it can. */
export const restingEcg = z.strictObject({
  hindrances: z
    .array(z.enum(ecgHindrances))
    .refine((given) => new Set(given).size === given.length, 'Name each once'),
  observedOn: localDateField,
  note,
});

export const walkTest = z.strictObject({
  distanceMeters: numberField({ lowest: 10, highest: 1200 }, 'm'),
  performedOn: localDateField,
});

/** Five times sit-to-stand; no time: it could not be done. */
export const chairStand = z.strictObject({
  seconds: optional(numberField({ lowest: 3, highest: 300 }, 's')),
  ending: z.enum(standEndings, 'Say when the clock was stopped'),
  performedOn: localDateField,
});
