import * as z from 'zod';
import {
  icdStatuses,
  icdZoneKinds,
  rateActingDrugs,
  rhythms,
  riskLevels,
  testEndings,
  testModes,
  thresholdKinds,
  vo2Sources,
} from '../clinical/prescribing/request';
import { requestBounds } from '../clinical/prescribing/request-bounds';
import { clinicalEventKinds, conditionAnswers, conditionKinds } from './record-lists';
import { localDateField, noteField, numberField, textField } from './fields';
import { diagnosisKindSchema } from './patients-contract';

// The clinical record: dated entries of thirteen kinds. What a request may hold is what the database's checks allow.

const note = noteField(1000).nullable().default(null);
const optional = <T extends z.ZodType>(field: T) => field.nullable().default(null);
const { thresholdRate, mets, vo2, peakRate, seatedRate, heightCm, weightKg } = requestBounds;

const diagnosis = z.strictObject({
  kind: diagnosisKindSchema,
  description: textField(200, 'Describe the diagnosis'),
  onsetOn: optional(localDateField),
});

const condition = z
  .strictObject({ kind: z.enum(conditionKinds, 'Choose a condition'), value: z.string() })
  .refine(({ kind, value }) => conditionAnswers[kind].includes(value), {
    path: ['value'],
    error: 'Choose one of the answers to this condition',
  });

const clinicalEvent = z.strictObject({
  kind: z.enum(clinicalEventKinds, 'Choose what happened'),
  description: noteField(500),
  occurredOn: localDateField,
});

const bodyMeasurement = z
  .strictObject({
    heightCm: optional(numberField(heightCm, 'cm')),
    weightKg: optional(numberField(weightKg, 'kg')),
    measuredOn: localDateField,
  })
  .refine((body) => body.heightCm !== null || body.weightKg !== null, {
    path: ['weightKg'],
    error: 'Enter a weight or a height',
  });

const rhythmEntry = z.strictObject({
  rhythm: z.enum(rhythms, 'Choose the rhythm'),
  observedOn: localDateField,
});

const restingRate = z.strictObject({
  seated: numberField(seatedRate, 'bpm'),
  standing: optional(numberField({ lowest: 30, highest: 160 }, 'bpm')),
  measuredOn: localDateField,
});

const medication = z
  .strictObject({
    name: textField(120, 'Enter the name of the drug'),
    /** Null for a drug that does not act on the heart rate. */
    rateActing: optional(z.enum(rateActingDrugs)),
    dose: textField(80, 'Enter the dose with its unit'),
    schedule: textField(80, 'Enter how often it is taken'),
    startedOn: localDateField,
    stoppedOn: optional(localDateField),
    /** The entry that this one takes the place of: it stops on the day this one starts. */
    replaces: optional(z.uuid()),
  })
  .refine((drug) => drug.stoppedOn === null || drug.stoppedOn >= drug.startedOn, {
    path: ['stoppedOn'],
    error: 'It cannot stop before it started',
  });

const device = z
  .strictObject({
    icdStatus: z.enum(icdStatuses, 'Say whether there is a defibrillator'),
    icdZones: z
      .array(
        z.strictObject({
          rate: numberField(requestBounds.icdRate, 'bpm'),
          kind: z.enum(icdZoneKinds, 'Choose what the zone does'),
        }),
      )
      .max(20, 'Enter at most 20 zones')
      .default([]),
    pacemaker: z.boolean().default(false),
    upperTrackingRate: optional(numberField(requestBounds.trackingRate, 'bpm')),
    checkedOn: localDateField,
  })
  .refine((entry) => entry.icdStatus === 'present' || entry.icdZones.length === 0, {
    path: ['icdZones'],
    error: 'Only a defibrillator that is present has zones',
  })
  .refine((entry) => entry.pacemaker || entry.upperTrackingRate === null, {
    path: ['upperTrackingRate'],
    error: 'Only a device that paces has a tracking rate',
  });

const exerciseTest = z
  .strictObject({
    mode: z.enum(testModes, 'Choose the mode'),
    protocol: textField(80, 'Enter the protocol'),
    performedOn: localDateField,
    endedBy: z.enum(testEndings, 'Say why the test ended'),
    restingHeartRate: optional(numberField(seatedRate, 'bpm')),
    peakHeartRate: numberField(peakRate, 'bpm'),
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
  });

const threshold = z.strictObject({
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

const walkTest = z.strictObject({
  distanceMeters: numberField({ lowest: 10, highest: 1200 }, 'm'),
  performedOn: localDateField,
});

const riskStratification = z.strictObject({
  level: z.enum(riskLevels, 'Choose the risk'),
  assessedOn: localDateField,
  note,
});

/** What an entry of each kind holds; the kinds stand in addresses. */
export const recordValues = {
  diagnoses: diagnosis,
  conditions: condition,
  'clinical-events': clinicalEvent,
  'body-measurements': bodyMeasurement,
  rhythms: rhythmEntry,
  'resting-rates': restingRate,
  medications: medication,
  'medication-reviews': z.strictObject({}),
  devices: device,
  'exercise-tests': exerciseTest,
  thresholds: threshold,
  'walk-tests': walkTest,
  'risk-stratifications': riskStratification,
} as const;

export type RecordKind = keyof typeof recordValues;
export const recordKinds = Object.keys(recordValues) as [RecordKind, ...RecordKind[]];
export type RecordValues<K extends RecordKind> = z.output<(typeof recordValues)[K]>;
export type RecordInput<K extends RecordKind> = z.input<(typeof recordValues)[K]>;

const person = z.object({ id: z.uuid(), displayName: z.string() });

const entryOf = <V extends z.ZodType>(values: V) =>
  z.object({
    id: z.uuid(),
    values,
    recordedAt: z.iso.datetime({ offset: true }),
    recordedBy: person,
    enteredInErrorAt: z.iso.datetime({ offset: true }).nullable(),
    enteredInErrorBy: person.nullable(),
    /** Why and when a threshold stopped to bind; null while it does, and for other kinds. */
    ended: z
      .object({
        status: z.enum(['superseded', 'retired']),
        at: z.iso.datetime({ offset: true }),
        by: person,
        reason: z.string(),
      })
      .nullable(),
  });

/** An entry as it stands in the record. */
export const recordEntrySchema = entryOf(z.record(z.string(), z.unknown()));
export interface RecordEntry<K extends RecordKind = RecordKind> extends Omit<
  z.infer<typeof recordEntrySchema>,
  'values'
> {
  values: RecordValues<K>;
}

/** `GET /api/patients/:id/record`: every entry of every kind, the newest of its date first, those in error too. */
export const recordResponseSchema = z.object({
  diagnoses: z.array(entryOf(diagnosis)),
  conditions: z.array(entryOf(condition)),
  'clinical-events': z.array(entryOf(clinicalEvent)),
  'body-measurements': z.array(entryOf(bodyMeasurement)),
  rhythms: z.array(entryOf(rhythmEntry)),
  'resting-rates': z.array(entryOf(restingRate)),
  medications: z.array(entryOf(medication)),
  'medication-reviews': z.array(entryOf(recordValues['medication-reviews'])),
  devices: z.array(entryOf(device)),
  'exercise-tests': z.array(entryOf(exerciseTest)),
  thresholds: z.array(entryOf(threshold)),
  'walk-tests': z.array(entryOf(walkTest)),
  'risk-stratifications': z.array(entryOf(riskStratification)),
});
export type PatientRecord = z.infer<typeof recordResponseSchema>;

const entryRequest = <K extends RecordKind>(kind: K) =>
  z.strictObject({ kind: z.literal(kind), id: z.uuid().optional(), values: recordValues[kind] });

/**
 * `POST /api/patients/:id/record`: several entries at once, all or none; a later one may name an earlier by its
 * client-made id. Sent again with the same ids and values it answers the same.
 */
export const recordBatchRequestSchema = z.strictObject({
  entries: z
    .array(
      z.discriminatedUnion('kind', [
        entryRequest('diagnoses'),
        entryRequest('conditions'),
        entryRequest('clinical-events'),
        entryRequest('body-measurements'),
        entryRequest('rhythms'),
        entryRequest('resting-rates'),
        entryRequest('medications'),
        entryRequest('medication-reviews'),
        entryRequest('devices'),
        entryRequest('exercise-tests'),
        entryRequest('thresholds'),
        entryRequest('walk-tests'),
        entryRequest('risk-stratifications'),
      ]),
    )
    .min(1, 'Enter at least one')
    .max(30, 'Enter at most 30 at once'),
});
export type RecordBatchRequest = z.input<typeof recordBatchRequestSchema>;
export type NewRecordEntry = z.output<typeof recordBatchRequestSchema>['entries'][number];
export type NewRecordEntryInput = RecordBatchRequest['entries'][number];

export const recordBatchResponseSchema = z.object({ entries: z.array(recordEntrySchema) });

/** `POST …/record/medications/:entryId/stop`; null takes a stop back. */
export const stopMedicationRequestSchema = z.strictObject({
  stoppedOn: localDateField.nullable(),
});

/** `POST …/record/thresholds/:entryId/retire`, by a physician. */
export const retireThresholdRequestSchema = z.strictObject({
  reason: textField(300, 'Say why it no longer binds'),
});
