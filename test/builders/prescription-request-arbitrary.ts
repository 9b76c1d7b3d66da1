import fc from 'fast-check';
import {
  heartFailures,
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
} from '@shared/clinical/prescribing';
import type { PrescriptionRequestInput } from '@shared/contracts/prescriptions-contract';

/** Whole and fractional values alike, since both may come. */
const between = (min: number, max: number) =>
  fc.oneof(
    fc.integer({ min, max }),
    fc.double({ min, max, noNaN: true, noDefaultInfinity: true }),
    fc.integer({ min: min * 10, max: max * 10 }).map((tenths) => tenths / 10),
  );

const orNull = <T>(arbitrary: fc.Arbitrary<T>) => fc.option(arbitrary, { nil: null, freq: 2 });

/** Mostly the first value, so that heart rate leads often enough to be tested. */
const mostly = <T>(usual: T, any: fc.Arbitrary<T>) =>
  fc.oneof({ weight: 12, arbitrary: fc.constant(usual) }, any);

const seldom = mostly(false, fc.boolean());

const fractions = fc
  .tuple(fc.integer({ min: 10, max: 90 }), fc.integer({ min: 1, max: 60 }))
  .map(([lower, width]) => ({
    lower: lower / 100,
    upper: Math.min(1, (lower + width) / 100),
  }));

const conditions = fc.record({
  coronaryDisease: fc.boolean(),
  heartFailure: mostly<(typeof heartFailures)[number]>('none', fc.constantFrom(...heartFailures)),
  transplant: mostly<(typeof transplants)[number]>('none', fc.constantFrom(...transplants)),
  ventricularAssistDevice: seldom,
  chronotropicIncompetence: seldom,
  autonomicNeuropathy: seldom,
  pulmonaryHypertension: seldom,
  dissection: seldom,
  peripheralArteryDisease: seldom,
  outflowObstruction: seldom,
});

type IcdInput = PrescriptionRequestInput['devices']['icd'];

const zones = fc.array(
  fc.record({ rate: between(80, 300), kind: fc.constantFrom(...icdZoneKinds) }),
  { maxLength: 3 },
);

const withoutIcd = (status: 'none' | 'unknown') =>
  fc.record({ status: fc.constant(status), zones: fc.constant([] as IcdInput['zones']) });

const icd: fc.Arbitrary<IcdInput> = fc.oneof(
  { weight: 8, arbitrary: withoutIcd('none') },
  withoutIcd('unknown'),
  fc.record({ status: fc.constant('present' as const), zones }),
);

const testAbove = (seated: number) =>
  fc.record({
    mode: fc.constantFrom(...testModes),
    daysAgo: mostly(13, between(0, 400)),
    endedBy: mostly<(typeof testEndings)[number]>('fatigue', fc.constantFrom(...testEndings)),
    sameRateActingDrugs: mostly(true, fc.boolean()),
    sameRhythmAndDevice: mostly(true, fc.boolean()),
    eventSince: seldom,
    restingHeartRate: orNull(between(30, Math.min(59, Math.floor(seated)))),
    peakHeartRate: between(Math.max(60, Math.floor(seated) + 1), 230),
    peakVo2: orNull(between(4, 80)),
    peakMets: orNull(between(1, 25)),
    vo2Source: fc.constantFrom(...vo2Sources),
  });

const observedWork = fc.record({
  medianHeartRate: between(40, 200),
  sessions: fc.integer({ min: 0, max: 6 }),
  perceivedExertion: fc
    .tuple(fc.integer({ min: 6, max: 14 }), fc.integer({ min: 1, max: 4 }))
    .map(([lower, width]) => ({ lower, upper: lower + width })),
});

const requestAbove = (seated: number): fc.Arbitrary<PrescriptionRequestInput> =>
  fc.record({
    patient: fc.record({
      ageYears: between(18, 110),
      sexAtBirth: fc.constantFrom(...sexes),
      heightCm: orNull(between(100, 250)),
      weightKg: orNull(between(25, 350)),
    }),
    resting: fc.record({
      seated: fc.constant(seated),
      standing: orNull(between(30, 150)),
      spread: orNull(mostly(6, between(0, 14))),
    }),
    risk: fc.constantFrom(...riskLevels),
    programWeek: fc.integer({ min: 1, max: 40 }),
    rhythm: mostly<(typeof rhythms)[number]>('sinus', fc.constantFrom(...rhythms)),
    rateActingDrugs: orNull(fc.subarray([...rateActingDrugs])),
    conditions,
    devices: fc.record({ icd, upperTrackingRate: mostly<number | null>(null, between(50, 220)) }),
    test: fc.option(testAbove(seated), { nil: null, freq: 3 }),
    thresholds: fc.array(
      fc.record({
        kind: fc.constantFrom(...thresholdKinds),
        heartRate: fc.oneof({ weight: 6, arbitrary: between(110, 230) }, between(40, 230)),
        clearMets: orNull(between(1, 25)),
      }),
      { maxLength: 2 },
    ),
    observedWork: orNull(observedWork),
    walkTest: orNull(fc.record({ distanceMeters: between(1, 1200) })),
    intensity: orNull(fractions),
    percentOfPeak: orNull(fractions),
    choice: fc.constant({ method: null, maximum: null }),
  });

/** Seated rates of adults at rest, the rare ones too. */
const anySeatedRate = fc.oneof({ weight: 4, arbitrary: between(45, 95) }, between(30, 130));

/** Any request that the contract takes, with the choice left to the rules. */
export const anyPrescriptionInput: fc.Arbitrary<PrescriptionRequestInput> =
  anySeatedRate.chain(requestAbove);
