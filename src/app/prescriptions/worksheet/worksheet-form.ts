import { FormArray, FormControl, FormGroup } from '@angular/forms';
import type { PrefilledInputs } from '@shared/contracts/prescribing-inputs-contract';
import type { PrescriptionRequest } from '@shared/clinical/prescribing';

/** What a form holds of a field: as the contract has it, or what was typed, or nothing yet. */
type Held<T> = FormControl<T | string | null>;

const held = <T>(): Held<T> => new FormControl<T | string | null>(null);

/** The parts of a request that may be missing as a whole. */
export const optionalParts = [
  'test',
  'observedWork',
  'walkTest',
  'intensity',
  'percentOfPeak',
] as const;
export type OptionalPart = (typeof optionalParts)[number];

const range = () => new FormGroup({ lower: held<number>(), upper: held<number>() });

const zone = () => new FormGroup({ rate: held<number>(), kind: held<string>() });

const threshold = () =>
  new FormGroup({
    kind: held<string>(),
    heartRate: held<number>(),
    clearMets: held<number>(),
  });

const test = () =>
  new FormGroup({
    mode: held<string>(),
    daysAgo: held<number>(),
    endedBy: held<string>(),
    sameRateActingDrugs: held<boolean>(),
    sameRhythmAndDevice: held<boolean>(),
    eventSince: held<boolean>(),
    restingHeartRate: held<number>(),
    peakHeartRate: held<number>(),
    peakVo2: held<number>(),
    peakMets: held<number>(),
    vo2Source: held<string>(),
  });

const conditions = () =>
  new FormGroup({
    coronaryDisease: held<boolean>(),
    heartFailure: held<string>(),
    transplant: held<string>(),
    ventricularAssistDevice: held<boolean>(),
    chronotropicIncompetence: held<boolean>(),
    autonomicNeuropathy: held<boolean>(),
    pulmonaryHypertension: held<boolean>(),
    dissection: held<boolean>(),
    peripheralArteryDisease: held<boolean>(),
    outflowObstruction: held<boolean>(),
  });

/** A form in the shape of the evaluate request, so that an error's path finds its control. */
export function worksheetForm() {
  return new FormGroup({
    patient: new FormGroup({
      ageYears: held<number>(),
      sexAtBirth: held<string>(),
      heightCm: held<number>(),
      weightKg: held<number>(),
    }),
    resting: new FormGroup({
      seated: held<number>(),
      standing: held<number>(),
      spread: held<number>(),
    }),
    risk: held<string>(),
    programWeek: held<number>(),
    rhythm: held<string>(),
    rateActingDrugs: new FormControl<readonly string[] | null>(null),
    conditions: conditions(),
    devices: new FormGroup({
      icd: new FormGroup({
        status: held<string>(),
        zones: new FormArray<ReturnType<typeof zone>>([]),
      }),
      upperTrackingRate: held<number>(),
    }),
    test: test(),
    thresholds: new FormArray<ReturnType<typeof threshold>>([]),
    observedWork: new FormGroup({
      medianHeartRate: held<number>(),
      sessions: held<number>(),
      perceivedExertion: range(),
    }),
    walkTest: new FormGroup({ distanceMeters: held<number>() }),
    intensity: range(),
    percentOfPeak: range(),
    choice: new FormGroup({ method: held<string>(), maximum: held<string>() }),
  });
}

export type WorksheetForm = ReturnType<typeof worksheetForm>;
export type Inputs = PrefilledInputs | PrescriptionRequest;

/** Adds and removes rows until there are so many. */
function resize<G extends FormGroup>(rows: FormArray<G>, length: number, make: () => G): void {
  while (rows.length > length) rows.removeAt(rows.length - 1, { emitEvent: false });
  while (rows.length < length) rows.push(make(), { emitEvent: false });
}

export const addThreshold = (form: WorksheetForm): void =>
  form.controls.thresholds.push(threshold());
export const addZone = (form: WorksheetForm): void =>
  form.controls.devices.controls.icd.controls.zones.push(zone());

/** Puts inputs into the form; a part that is missing as a whole is disabled. */
export function fill(form: WorksheetForm, inputs: Inputs): void {
  resize(form.controls.thresholds, inputs.thresholds.length, threshold);
  resize(form.controls.devices.controls.icd.controls.zones, inputs.devices.icd.zones.length, zone);
  form.reset(Object.fromEntries(Object.entries(inputs).filter(([, value]) => value !== null)), {
    emitEvent: false,
  });
  for (const part of optionalParts) {
    const options = { emitEvent: false };
    if (inputs[part] === null) form.controls[part].disable(options);
    else form.controls[part].enable(options);
  }
  form.updateValueAndValidity();
}

/** What the form holds as a request, not yet held against the contract; zones are of a defibrillator that is there. */
export function requestOf(form: WorksheetForm): Record<string, unknown> {
  const { devices, ...value } = form.getRawValue();
  const zones = devices.icd.status === 'present' ? devices.icd.zones : [];
  const missing = optionalParts.filter((part) => form.controls[part].disabled);
  return {
    ...value,
    devices: { ...devices, icd: { ...devices.icd, zones } },
    ...Object.fromEntries(missing.map((part) => [part, null])),
  };
}
