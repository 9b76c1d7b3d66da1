import { describe, expect, it } from 'vitest';
import {
  cautionSeverity,
  defaultPolicy,
  evaluatePrescription,
  heartFailures,
  icdStatuses,
  icdZoneKinds,
  leads,
  limitKinds,
  maximumMethods,
  methods,
  rateActingDrugs,
  reasonCodes,
  rhythms,
  riskLevels,
  sexes,
  testEndings,
  testModes,
  thresholdKinds,
  transplants,
  vo2Sources,
} from '@shared/clinical/prescribing';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import { prescriptionRequestSchema } from '@shared/contracts/prescriptions-contract';
import { anchorAt, clockAt } from './clock';
import { tellStory } from './story';

const firstDay = new Date('2026-12-01T15:10:00Z');
const { prescriptions } = tellStory(clockAt(anchorAt(firstDay), firstDay));
const requests = prescriptions.map(({ inputs }) => inputs as PrescriptionRequest);
const answers = prescriptions.map(({ result }) => result as PrescriptionAnswer);
const distinct = <T>(values: Iterable<T>) => [...new Set(values)].sort();
const sorted = <T>(values: readonly T[]) => [...values].sort();

describe('the situations', () => {
  const given: [string, readonly unknown[], readonly unknown[]][] = [
    ['rhythms', rhythms, requests.map(({ rhythm }) => rhythm)],
    ['sexes', sexes, requests.map(({ patient }) => patient.sexAtBirth)],
    ['risks', riskLevels, requests.map(({ risk }) => risk)],
    ['rate-acting drugs', rateActingDrugs, requests.flatMap((each) => each.rateActingDrugs ?? [])],
    ['heart failures', heartFailures, requests.map(({ conditions }) => conditions.heartFailure)],
    ['transplants', transplants, requests.map(({ conditions }) => conditions.transplant)],
    ['ICD statuses', icdStatuses, requests.map(({ devices }) => devices.icd.status)],
    [
      'ICD zones',
      icdZoneKinds,
      requests.flatMap(({ devices }) => devices.icd.zones.map(({ kind }) => kind)),
    ],
    ['test modes', testModes, requests.flatMap(({ test }) => test?.mode ?? [])],
    ['test endings', testEndings, requests.flatMap(({ test }) => test?.endedBy ?? [])],
    ['VO2 sources', vo2Sources, requests.flatMap(({ test }) => test?.vo2Source ?? [])],
    [
      'thresholds',
      thresholdKinds,
      requests.flatMap(({ thresholds }) => thresholds.map(({ kind }) => kind)),
    ],
    ['leads', leads, answers.map(({ leadBy }) => leadBy)],
    ['methods', methods, answers.map(({ method }) => method)],
    ['maxima', maximumMethods, answers.flatMap(({ maximum }) => maximum?.method ?? [])],
    ['limits', limitKinds, answers.flatMap(({ limits }) => limits.map(({ kind }) => kind))],
    ['reasons', reasonCodes, answers.flatMap(({ reasons }) => reasons)],
    [
      'cautions',
      Object.keys(cautionSeverity),
      answers.flatMap(({ cautions }) => cautions.map(({ code }) => code)),
    ],
  ];

  it.each(given)('have all %s', (_, all, seen) => {
    expect(distinct(seen)).toEqual(sorted(all));
  });

  type Telling = [string, (request: PrescriptionRequest) => boolean];
  const told: Telling[] = [
    ['unknown drugs', (each) => each.rateActingDrugs === null],
    ['no drugs', (each) => each.rateActingDrugs?.length === 0],
    [
      'an ICD without known zones',
      ({ devices: { icd } }) => icd.status === 'present' && icd.zones.length === 0,
    ],
    ['a tracking rate', ({ devices }) => devices.upperTrackingRate !== null],
    ['drugs changed since the test', ({ test }) => test?.sameRateActingDrugs === false],
    ['a device changed since the test', ({ test }) => test?.sameRhythmAndDevice === false],
    ['an event since the test', ({ test }) => test?.eventSince === true],
    ['an old test', ({ test }) => (test?.daysAgo ?? 0) > 180],
    ['a walk and no test', ({ test, walkTest }) => test === null && walkTest !== null],
    ['observed work', ({ observedWork }) => observedWork !== null],
    [
      'clear work beside a threshold',
      ({ thresholds }) => thresholds.some(({ clearMets }) => clearMets !== null),
    ],
    [
      'no clear work beside a threshold',
      ({ thresholds }) => thresholds.some(({ clearMets }) => clearMets === null),
    ],
    ['height and weight unknown', ({ patient }) => patient.heightCm === null],
    ['a resting rate read once', ({ resting }) => resting.spread === null],
    ...(
      [
        'ventricularAssistDevice',
        'chronotropicIncompetence',
        'autonomicNeuropathy',
        'pulmonaryHypertension',
        'dissection',
        'peripheralArteryDisease',
        'outflowObstruction',
      ] as const
    ).map((kind): Telling => [kind, ({ conditions }) => conditions[kind]]),
  ];

  it.each(told)('have %s', (_, is) => {
    expect(requests.some(is)).toBe(true);
  });

  it('are stored with exactly the answer of the engine', () => {
    for (const { inputs, result } of prescriptions) {
      const evaluation = evaluatePrescription(
        prescriptionRequestSchema.parse(inputs),
        defaultPolicy,
      );
      expect(evaluation).toEqual({ ok: true, answer: result });
    }
  });
});
