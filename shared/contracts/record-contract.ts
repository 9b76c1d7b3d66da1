import * as z from 'zod';
import { rhythms } from '../clinical/prescribing/request';
import { requestBounds } from '../clinical/prescribing/request-bounds';
import { clinicalEventKinds, conditionAnswers, conditionKinds } from './record-lists';
import { localDateField, noteField, numberField, textField } from './fields';
import { diagnosisKindSchema } from './patients-contract';
import { questionnaire, riskStratification } from './record-assessments-contract';
import { chairStand, exerciseTest, restingEcg, threshold, walkTest } from './record-tests-contract';
import { device, medication, restriction } from './record-treatment-contract';

// The clinical record: dated entries of seventeen kinds. What a request may hold is what the database's checks allow.

const optional = <T extends z.ZodType>(field: T) => field.nullable().default(null);
const { seatedRate, heightCm, weightKg } = requestBounds;

const diagnosis = z.strictObject({
  kind: diagnosisKindSchema,
  description: textField(200, 'Describe the diagnosis'),
  onsetOn: optional(localDateField),
});

const condition = z
  .strictObject({
    kind: z.enum(conditionKinds, 'Choose a condition'),
    value: z.string(),
    /** Since when: of a transplant or an assist device, the date of the operation. */
    since: optional(localDateField),
    /** What shows it, as how a transplanted heart’s rate was seen to respond again. */
    evidence: optional(textField(300, 'Say what shows it')),
  })
  .refine(({ kind, value }) => conditionAnswers[kind].includes(value), {
    path: ['value'],
    error: 'Choose one of the answers to this condition',
  })
  .refine(
    ({ kind, value, evidence }) =>
      kind !== 'transplant' || value !== 'recovered' || evidence !== null,
    { path: ['evidence'], error: 'Say what showed that the heart rate responds again' },
  );

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
  'resting-ecgs': restingEcg,
  'chair-stands': chairStand,
  restrictions: restriction,
  questionnaires: questionnaire,
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
    /** Why and when a threshold stopped to bind, a restriction was lifted, a questionnaire's follow-up was closed; else null. */
    ended: z
      .object({
        status: z.enum(['superseded', 'retired', 'lifted', 'closed']),
        at: z.iso.datetime({ offset: true }),
        by: person,
        reason: z.string(),
      })
      .nullable(),
  });

/** An entry as it is read: what was entered before a rule was made is read all the same. */
const readEntry = <S extends z.ZodRawShape>({ shape }: { readonly shape: S }) =>
  entryOf(z.object(shape));

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
  diagnoses: z.array(readEntry(diagnosis)),
  conditions: z.array(readEntry(condition)),
  'clinical-events': z.array(readEntry(clinicalEvent)),
  'body-measurements': z.array(readEntry(bodyMeasurement)),
  rhythms: z.array(readEntry(rhythmEntry)),
  'resting-rates': z.array(readEntry(restingRate)),
  medications: z.array(readEntry(medication)),
  'medication-reviews': z.array(readEntry(recordValues['medication-reviews'])),
  devices: z.array(readEntry(device)),
  'exercise-tests': z.array(readEntry(exerciseTest)),
  thresholds: z.array(readEntry(threshold)),
  'walk-tests': z.array(readEntry(walkTest)),
  'risk-stratifications': z.array(readEntry(riskStratification)),
  'resting-ecgs': z.array(readEntry(restingEcg)),
  'chair-stands': z.array(readEntry(chairStand)),
  restrictions: z.array(readEntry(restriction)),
  questionnaires: z.array(readEntry(questionnaire)),
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
        entryRequest('resting-ecgs'),
        entryRequest('chair-stands'),
        entryRequest('restrictions'),
        entryRequest('questionnaires'),
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

/** `POST …/record/thresholds/:entryId/supersede`: a later clean test, confirmed by a person, takes its place. */
export const supersedeThresholdRequestSchema = z.strictObject({
  exerciseTestId: z.uuid(),
});

/** `POST …/record/restrictions/:entryId/lift`. */
export const liftRestrictionRequestSchema = z.strictObject({
  reason: textField(300, 'Say who lifted it and why'),
});

/** `POST …/record/questionnaires/:entryId/close-follow-up`, by who spoke with the patient. */
export const closeFollowUpRequestSchema = z.strictObject({
  done: textField(500, 'Say what was done'),
});

/** `POST …/record/thresholds/:entryId/retire`, by a physician. */
export const retireThresholdRequestSchema = z.strictObject({
  reason: textField(300, 'Say why it no longer binds'),
});
