import * as z from 'zod';
import {
  heartFailures,
  icdStatuses,
  icdZoneKinds,
  rateActingDrugs,
  rhythms,
  riskLevels,
  sexes,
  testEndings,
  testModes,
  thresholdKinds,
  transplants,
  vo2Sources,
} from '../clinical/prescribing';

// What a prescription would rest on, as the record has it today: the evaluate request, where null also stands for what
// nobody has entered yet, and for each input where it comes from.

const yesNo = z.boolean().nullable();
const number = z.number().nullable();

/** Says of an input what entry it comes from. `old`: time to measure or ask again. */
export const inputOriginSchema = z.object({
  text: z.string(),
  date: z.string().nullable(),
  old: z.boolean(),
  /** The entry of the record, null when the input is computed or nothing was entered. */
  entryId: z.string().nullable(),
});
export type InputOrigin = z.infer<typeof inputOriginSchema>;

export const prefilledInputsSchema = z.object({
  patient: z.object({
    ageYears: z.number(),
    sexAtBirth: z.enum(sexes),
    heightCm: number,
    weightKg: number,
  }),
  resting: z.object({ seated: number, standing: number, spread: number }),
  risk: z.enum(riskLevels),
  programWeek: z.number(),
  rhythm: z.enum(rhythms).nullable(),
  rateActingDrugs: z.array(z.enum(rateActingDrugs)).nullable(),
  conditions: z.object({
    coronaryDisease: yesNo,
    heartFailure: z.enum(heartFailures),
    transplant: z.enum(transplants).nullable(),
    ventricularAssistDevice: yesNo,
    chronotropicIncompetence: yesNo,
    autonomicNeuropathy: yesNo,
    pulmonaryHypertension: yesNo,
    dissection: yesNo,
    peripheralArteryDisease: yesNo,
    outflowObstruction: yesNo,
  }),
  devices: z.object({
    icd: z.object({
      status: z.enum(icdStatuses),
      zones: z.array(z.object({ rate: z.number(), kind: z.enum(icdZoneKinds) })),
    }),
    upperTrackingRate: number,
  }),
  test: z
    .object({
      mode: z.enum(testModes),
      daysAgo: z.number(),
      endedBy: z.enum(testEndings),
      sameRateActingDrugs: z.boolean(),
      sameRhythmAndDevice: z.boolean(),
      eventSince: z.boolean(),
      restingHeartRate: number,
      peakHeartRate: z.number(),
      peakVo2: number,
      peakMets: number,
      vo2Source: z.enum(vo2Sources),
    })
    .nullable(),
  thresholds: z.array(
    z.object({ kind: z.enum(thresholdKinds), heartRate: z.number(), clearMets: number }),
  ),
  observedWork: z
    .object({
      medianHeartRate: z.number(),
      sessions: z.number(),
      perceivedExertion: z.object({ lower: z.number(), upper: z.number() }),
    })
    .nullable(),
  walkTest: z.object({ distanceMeters: z.number() }).nullable(),
  intensity: z.null(),
  percentOfPeak: z.null(),
  choice: z.object({ method: z.null(), maximum: z.null() }),
});
export type PrefilledInputs = z.infer<typeof prefilledInputsSchema>;

export const prescribingInputsSchema = z.object({
  inputs: prefilledInputsSchema,
  /** Paths that the evaluate request needs and nobody has entered, as `resting.seated`; [] means ready to evaluate. */
  missing: z.array(z.string()),
  /** By path of the input: `rhythm`, `test`, `test.eventSince`, `conditions.heartFailure`, `thresholds.0` … */
  origins: z.record(z.string(), inputOriginSchema),
});
export type PrescribingInputs = z.infer<typeof prescribingInputsSchema>;
