import * as z from 'zod';
import type { PrescriptionAnswer } from '../clinical/prescribing';
import {
  cautionSeverity,
  leads,
  limitKinds,
  maximumMethods,
  methods,
  reasonCodes,
  severities,
  workloadPoints,
} from '../clinical/prescribing';
import type { CautionCode } from '../clinical/prescribing';
import type { Bpm, Meters, MetersPerMinute, Mets, MmHg, Vo2, Watts } from '../units';
import { computed } from './quantities';

export const rangeOf = <Q extends number = number>() =>
  z.object({ lower: computed<Q>(), upper: computed<Q>() });

export const ratesSchema = rangeOf<Bpm>().nullable();
const maximumMethod = z.enum(maximumMethods);

export const ceilingSchema = z
  .object({ value: computed<Bpm>(), bindingLimits: z.array(z.enum(limitKinds)) })
  .nullable();

export const exertionSchema = z.object({
  scale: z.literal('borg-6-20'),
  lower: z.number(),
  upper: z.number(),
});

export const pressureSchema = z
  .object({ systolic: computed<MmHg>(), diastolic: computed<MmHg>() })
  .nullable();

export const limitSchema = z.object({
  kind: z.enum(limitKinds),
  threshold: computed<Bpm>(),
  margin: computed<Bpm>(),
  value: computed<Bpm>(),
  rule: z.string(),
  source: z.string(),
});

const candidate = z.object({
  method: z.enum(methods),
  maximum: maximumMethod.nullable(),
  maximumValue: computed<Bpm>().nullable(),
  standardError: computed<Bpm>().nullable(),
  lower: computed<Bpm>().nullable(),
  upper: computed<Bpm>().nullable(),
  applicable: z.boolean(),
  why: z.string(),
});

const cautionCodes = Object.keys(cautionSeverity) as [CautionCode, ...CautionCode[]];

export const cautionSchema = z.object({
  code: z.enum(cautionCodes),
  severity: z.enum(severities),
  message: z.string(),
});

const workloadRow = {
  point: z.enum(workloadPoints),
  mets: computed<Mets>().nullable(),
  withinEquationRange: z.boolean(),
  why: z.string().nullable(),
};

const workload = z.discriminatedUnion('modality', [
  z.object({
    modality: z.literal('treadmill-walk'),
    ...workloadRow,
    speedMetersPerMinute: computed<MetersPerMinute>().nullable(),
    speedMph: z.number().nullable(),
    gradePercent: z.number().nullable(),
  }),
  z.object({
    modality: z.literal('cycle'),
    ...workloadRow,
    powerWatts: computed<Watts>().nullable(),
  }),
  z.object({
    modality: z.literal('arm'),
    ...workloadRow,
    powerWatts: computed<Watts>().nullable(),
    target: ratesSchema,
  }),
  z.object({
    modality: z.literal('step'),
    ...workloadRow,
    stepHeightMeters: computed<Meters>().nullable(),
    stepsPerMinute: z.number().nullable(),
  }),
  z.object({ modality: z.literal('stepper'), ...workloadRow }),
]);

/** The answer of `POST /api/prescriptions/evaluate`: every key is there, null when it has no value. */
export const prescriptionAnswerSchema: z.ZodType<PrescriptionAnswer> = z.object({
  leadBy: z.enum(leads),
  method: z.enum(methods),
  maximum: z
    .object({
      method: maximumMethod,
      value: computed<Bpm>(),
      standardError: computed<Bpm>().nullable(),
    })
    .nullable(),
  target: ratesSchema,
  guide: ratesSchema,
  ceiling: ceilingSchema,
  outerLimit: computed<Bpm>().nullable(),
  askLine: computed<Bpm>().nullable(),
  limits: z.array(limitSchema),
  intensity: rangeOf(),
  intensityAtCeiling: z.number().nullable(),
  perceivedExertion: exertionSchema,
  patientTarget: ratesSchema,
  tenSecondCount: rangeOf().nullable(),
  workCeilingMets: computed<Mets>().nullable(),
  targetVo2: rangeOf<Vo2>().nullable(),
  targetMets: rangeOf<Mets>().nullable(),
  workloads: z.array(workload),
  pressureCeiling: pressureSchema,
  oxygenFloor: z.number().nullable(),
  candidates: z.array(candidate),
  reasons: z.array(z.enum(reasonCodes)),
  cautions: z.array(cautionSchema),
  policyVersion: z.int(),
  engineVersion: z.string(),
});
