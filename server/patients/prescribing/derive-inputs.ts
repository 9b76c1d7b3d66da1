import type {
  InputOrigin,
  PrefilledInputs,
  PrescribingInputs,
} from '@shared/contracts/prescribing-inputs-contract';
import type { RateActingDrug } from '@shared/clinical/prescribing';
import { daysBetween } from '@shared/scheduling/wall-time';
import { ageOn } from '@shared/scheduling/age';
import { latestChanges } from './derive-changes';
import { conditionsOf } from './derive-conditions';
import { observedWorkOf, restingOf } from './derive-rates';
import { testOf } from './derive-test';
import {
  isOld,
  nothingEntered,
  oldAfterDays,
  type Derived,
  type RecordFacts,
} from './record-facts';

/** The origin of an entry that is taken as it is. */
function originOf(
  text: string,
  entry: { id: string },
  date: string,
  today: string,
  oldAfter: number,
): InputOrigin {
  return { text, date, old: isOld(date, today, oldAfter), entryId: entry.id };
}

function bodyOf(
  facts: RecordFacts,
  field: 'heightCm' | 'weightKg',
  today: string,
): Derived<number | null> {
  const entry = facts.record['body-measurements'].find(({ values }) => values[field] !== null);
  if (!entry) return { value: null, origin: nothingEntered('Not measured yet') };
  const { measuredOn, [field]: value } = entry.values;
  const oldAfter = field === 'heightCm' ? oldAfterDays.height : oldAfterDays.weight;
  return { value, origin: originOf('Measured', entry, measuredOn, today, oldAfter) };
}

function rhythmOf({ record }: RecordFacts, today: string): Derived<PrefilledInputs['rhythm']> {
  const [entry] = record.rhythms;
  if (!entry) return { value: null, origin: nothingEntered('No rhythm entered') };
  const { rhythm, observedOn } = entry.values;
  return {
    value: rhythm,
    origin: originOf('Observed', entry, observedOn, today, oldAfterDays.rhythm),
  };
}

function riskOf({ record }: RecordFacts, today: string): Derived<PrefilledInputs['risk']> {
  const [entry] = record['risk-stratifications'];
  if (!entry) return { value: 'unknown', origin: nothingEntered('Not stratified yet') };
  const { level, assessedOn } = entry.values;
  return {
    value: level,
    origin: originOf('Stratified', entry, assessedOn, today, oldAfterDays.risk),
  };
}

/** Null until the list was gone through once with the patient. */
function drugsOf({ record }: RecordFacts, today: string): Derived<RateActingDrug[] | null> {
  const [review] = record['medication-reviews'];
  if (!review) return { value: null, origin: nothingEntered('The list was never verified') };
  const taken = record.medications.filter(
    ({ values }) =>
      values.startedOn <= today && (values.stoppedOn === null || values.stoppedOn > today),
  );
  const acting = taken.filter(({ values }) => values.rateActing !== null);
  const classes = new Set(acting.flatMap(({ values }) => values.rateActing ?? []));
  const names = acting.map(({ values: drug }) => `${drug.name} ${drug.dose}, ${drug.schedule}`);
  const verifiedOn = review.recordedAt.slice(0, 10);
  const text = names.length > 0 ? names.join('; ') : 'No drug that acts on the heart rate';
  return {
    value: [...classes],
    origin: originOf(
      `${text}. List verified`,
      review,
      verifiedOn,
      today,
      oldAfterDays.medicationReview,
    ),
  };
}

function devicesOf({ record }: RecordFacts, today: string): Derived<PrefilledInputs['devices']> {
  const [entry] = record.devices;
  if (!entry) {
    const value = { icd: { status: 'unknown' as const, zones: [] }, upperTrackingRate: null };
    return {
      value,
      origin: nothingEntered('No device check entered: a defibrillator is not ruled out'),
    };
  }
  const { icdStatus, icdZones, upperTrackingRate, checkedOn } = entry.values;
  return {
    value: { icd: { status: icdStatus, zones: icdZones }, upperTrackingRate },
    origin: originOf('Device check', entry, checkedOn, today, oldAfterDays.devices),
  };
}

function walkOf({ record }: RecordFacts, today: string): Derived<PrefilledInputs['walkTest']> {
  const [entry] = record['walk-tests'];
  if (!entry) return { value: null, origin: nothingEntered('No 6-minute walk entered') };
  const { distanceMeters, performedOn } = entry.values;
  return {
    value: { distanceMeters },
    origin: originOf('6-minute walk', entry, performedOn, today, oldAfterDays.walkTest),
  };
}

function programWeekOf({ course }: RecordFacts, today: string): Derived<number> {
  const first = course?.firstSessionOn ?? null;
  if (first === null) return { value: 1, origin: nothingEntered('No session yet: week 1') };
  const week = Math.floor(Math.max(0, daysBetween(first, today)) / 7) + 1;
  return {
    value: week,
    origin: { text: 'Weeks from the first session', date: first, old: false, entryId: null },
  };
}

function thresholdsOf({ record }: RecordFacts) {
  const active = record.thresholds.filter(({ ended }) => ended === null);
  const value = active.map(({ values: { kind, heartRate, clearMets } }) => ({
    kind,
    heartRate,
    clearMets,
  }));
  const origins = active.map(({ id, values }, index): [string, InputOrigin] => [
    `thresholds.${index}`,
    {
      text: values.exerciseTestId === null ? 'Found on the floor' : 'Found in a test',
      date: values.foundOn,
      old: false,
      entryId: id,
    },
  ]);
  return { value, origins: Object.fromEntries(origins) };
}

/**
 * The evaluate request as the record has it on a local date, nothing chosen: the latest entry of each kind, and what
 * follows from the entries since. What is unknown stays unknown; what nobody answered is listed as missing.
 */
export function deriveInputs(facts: RecordFacts, today: string): PrescribingInputs {
  const changes = latestChanges(facts);
  const resting = restingOf(facts, changes, today);
  const height = bodyOf(facts, 'heightCm', today);
  const weight = bodyOf(facts, 'weightKg', today);
  const risk = riskOf(facts, today);
  const programWeek = programWeekOf(facts, today);
  const rhythm = rhythmOf(facts, today);
  const drugs = drugsOf(facts, today);
  const conditions = conditionsOf(facts);
  const devices = devicesOf(facts, today);
  const test = testOf(facts, changes, today);
  const thresholds = thresholdsOf(facts);
  const observedWork = observedWorkOf(facts, changes, today);
  const walkTest = walkOf(facts, today);
  const { birthDate, sexAtBirth } = facts.patient;
  return {
    inputs: {
      patient: {
        ageYears: ageOn(birthDate, today),
        sexAtBirth,
        heightCm: height.value,
        weightKg: weight.value,
      },
      resting: resting.value,
      risk: risk.value,
      programWeek: programWeek.value,
      rhythm: rhythm.value,
      rateActingDrugs: drugs.value,
      conditions: conditions.value,
      devices: devices.value,
      test: test.value,
      thresholds: thresholds.value,
      observedWork: observedWork.value,
      walkTest: walkTest.value,
      intensity: null,
      percentOfPeak: null,
      choice: { method: null, maximum: null },
    },
    missing: [
      ...(resting.value.seated === null ? ['resting.seated'] : []),
      ...(rhythm.value === null ? ['rhythm'] : []),
      ...conditions.missing,
    ],
    origins: {
      'patient.heightCm': height.origin,
      'patient.weightKg': weight.origin,
      resting: resting.origin,
      risk: risk.origin,
      programWeek: programWeek.origin,
      rhythm: rhythm.origin,
      rateActingDrugs: drugs.origin,
      ...conditions.origins,
      devices: devices.origin,
      ...test.origins,
      ...thresholds.origins,
      observedWork: observedWork.origin,
      walkTest: walkTest.origin,
    },
  };
}
