import * as z from 'zod';
import type { PrescriptionRequest } from '../clinical/prescribing';
import {
  heartFailures,
  icdStatuses,
  icdZoneKinds,
  maximumMethods,
  methods,
  rateActingDrugs,
  requestBounds,
  requestLengths,
  rhythms,
  riskLevels,
  sexes,
  testEndings,
  testModes,
  thresholdKinds,
  transplants,
  vo2Sources,
} from '../clinical/prescribing';
import type { Bpm, Centimeters, Kilograms, Meters, Mets, Vo2 } from '../units';
import { listOf, oneOf, rangeWithin, strict, within, yesOrNo } from './quantities';

const at = requestBounds;

const patient = strict('Patient', {
  ageYears: within('Age', at.ageYears, 'years'),
  sexAtBirth: oneOf('Sex at birth', sexes),
  heightCm: within<Centimeters>('Height', at.heightCm, 'cm').nullable(),
  weightKg: within<Kilograms>('Weight', at.weightKg, 'kg').nullable(),
});

const resting = strict('Resting rates', {
  seated: within<Bpm>('Seated resting rate', at.seatedRate, 'bpm'),
  standing: within<Bpm>('Standing resting rate', at.otherRestingRate, 'bpm').nullable(),
  spread: within<Bpm>('Spread of the resting rate', at.restingSpread, 'bpm').nullable(),
});

const conditions = strict('Conditions', {
  coronaryDisease: yesOrNo('Coronary disease'),
  heartFailure: oneOf('Heart failure', heartFailures),
  transplant: oneOf('Transplant', transplants),
  ventricularAssistDevice: yesOrNo('Ventricular assist device'),
  chronotropicIncompetence: yesOrNo('Chronotropic incompetence'),
  autonomicNeuropathy: yesOrNo('Autonomic neuropathy'),
  pulmonaryHypertension: yesOrNo('Pulmonary hypertension'),
  dissection: yesOrNo('Dissection'),
  peripheralArteryDisease: yesOrNo('Peripheral artery disease'),
  outflowObstruction: yesOrNo('Outflow obstruction'),
});

const icdZone = strict('ICD zone', {
  rate: within<Bpm>('ICD zone rate', at.icdRate, 'bpm'),
  kind: oneOf('ICD zone kind', icdZoneKinds),
});

const icd = strict('ICD', {
  status: oneOf('ICD status', icdStatuses),
  zones: listOf('ICD zones', icdZone, requestLengths.icdZones),
}).refine(({ status, zones }) => status === 'present' || zones.length === 0, {
  path: ['zones'],
  message: 'ICD zones may be given only when an ICD is present.',
});

const devices = strict('Devices', {
  icd,
  upperTrackingRate: within<Bpm>('Upper tracking rate', at.trackingRate, 'bpm').nullable(),
});

const test = strict('Exercise test', {
  mode: oneOf('Test mode', testModes),
  daysAgo: within('Days since the test', at.testDaysAgo),
  endedBy: oneOf('What ended the test', testEndings),
  sameRateActingDrugs: yesOrNo('Same rate-acting drugs'),
  sameRhythmAndDevice: yesOrNo('Same rhythm and device settings'),
  eventSince: yesOrNo('Event since'),
  restingHeartRate: within<Bpm>(
    'Resting rate before the test',
    at.otherRestingRate,
    'bpm',
  ).nullable(),
  peakHeartRate: within<Bpm>('Peak heart rate', at.peakRate, 'bpm'),
  peakVo2: within<Vo2>('Peak VO2', at.vo2, 'mL/kg/min').nullable(),
  peakMets: within<Mets>('Peak METs', at.mets, 'METs').nullable(),
  vo2Source: oneOf('Source of the VO2', vo2Sources),
}).refine(
  ({ restingHeartRate, peakHeartRate }) =>
    restingHeartRate === null || restingHeartRate < peakHeartRate,
  {
    path: ['restingHeartRate'],
    message: 'Resting rate before the test must be below the peak heart rate.',
  },
);

const threshold = strict('Threshold', {
  kind: oneOf('Threshold kind', thresholdKinds),
  heartRate: within<Bpm>('Threshold heart rate', at.thresholdRate, 'bpm'),
  clearMets: within<Mets>('Highest clear work', at.mets, 'METs').nullable(),
});

const observedWork = strict('Observed work', {
  medianHeartRate: within<Bpm>('Median heart rate', at.observedRate, 'bpm'),
  sessions: within('Sessions', at.observedSessions),
  perceivedExertion: rangeWithin('Perceived exertion', at.exertion),
});

const walkTest = strict('Six-minute walk', {
  distanceMeters: within<Meters>('Distance walked', at.walkMeters, 'm'),
});

const choice = strict('Choice', {
  method: oneOf('Chosen method', methods).nullable(),
  maximum: oneOf('Chosen maximum', maximumMethods).nullable(),
});

const request = strict('Prescription request', {
  patient,
  resting,
  risk: oneOf('Risk', riskLevels),
  programWeek: within('Program week', at.programWeek),
  rhythm: oneOf('Rhythm', rhythms),
  rateActingDrugs: listOf(
    'Rate-acting drugs',
    oneOf('Rate-acting drug', rateActingDrugs),
    requestLengths.rateActingDrugs,
  ).nullable(),
  conditions,
  devices,
  test: test.nullable(),
  thresholds: listOf('Thresholds', threshold, requestLengths.thresholds),
  observedWork: observedWork.nullable(),
  walkTest: walkTest.nullable(),
  intensity: rangeWithin('Intensity', at.fraction).nullable(),
  percentOfPeak: rangeWithin('Percent of peak', at.fraction).nullable(),
  choice,
});

const ratesSchema = z.object({
  resting: z.object({ seated: z.number() }),
  test: z.object({ peakHeartRate: z.number() }),
});

/** Whether both rates are there to be compared, whatever else is at fault. */
const hasRates = ({ value }: { value: unknown }): boolean => ratesSchema.safeParse(value).success;

const checkedRequest = request.refine(
  (value) => value.test === null || value.test.peakHeartRate > value.resting.seated,
  {
    path: ['test', 'peakHeartRate'],
    message: 'Peak heart rate must be above the seated resting rate.',
    when: hasRates,
  },
);

/** `POST /api/prescriptions/evaluate`: every key is required, null where a value may be unknown. */
export const prescriptionRequestSchema: z.ZodType<PrescriptionRequest, PrescriptionRequestInput> =
  checkedRequest;

/** The request as JSON or a form holds it, before its numbers know their units. */
export type PrescriptionRequestInput = z.input<typeof checkedRequest>;
