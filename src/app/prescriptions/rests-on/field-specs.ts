import {
  heartFailures,
  icdStatuses,
  icdZoneKinds,
  requestBounds,
  rhythms,
  riskLevels,
  sexes,
  testEndings,
  testModes,
  thresholdKinds,
  transplants,
  vo2Sources,
} from '@shared/clinical/prescribing';
import { conditionKinds, type ConditionKind } from '@shared/contracts/record-lists';
import {
  conditionAnswerWords,
  conditionWords,
  icdWords,
  rhythmWords,
  riskWords,
  sexWords,
  testEndWords,
  testModeWords,
  thresholdWords,
  vo2SourceWords,
  zoneWords,
} from '../../ui/words/clinical-words';

interface Named {
  /** Of the control, from the form or from its group. */
  readonly path: string;
  readonly label: string;
}

/** A field of the request, as its editor shows it. */
export type FieldSpec =
  | (Named & {
      readonly kind: 'number';
      readonly unit: string;
      /** How often the shown unit goes into the kept one. */
      readonly factor?: number;
      readonly hint?: string;
    })
  | (Named & {
      readonly kind: 'choice';
      readonly options: readonly { readonly value: string; readonly label: string }[];
    })
  | (Named & { readonly kind: 'yes-no' });

const number = (
  path: string,
  label: string,
  unit: string,
  more: { factor?: number; hint?: string } = {},
): FieldSpec => ({ kind: 'number', path, label, unit, ...more });

const choice = <V extends string>(
  path: string,
  label: string,
  values: readonly V[],
  words: Readonly<Record<V, string>>,
): FieldSpec => ({
  kind: 'choice',
  path,
  label,
  options: values.map((value) => ({ value, label: words[value] })),
});

const yesNo = (path: string, label: string): FieldSpec => ({ kind: 'yes-no', path, label });

const percent = { factor: 100 };
const { fraction } = requestBounds;
const fractionHint = `${fraction.lowest * 100} to ${fraction.highest * 100} %`;

function condition(kind: ConditionKind): FieldSpec {
  const path = `conditions.${kind}`;
  const label = conditionWords[kind];
  const words = conditionAnswerWords(kind);
  if (kind === 'heartFailure') return choice(path, label, heartFailures, words);
  if (kind === 'transplant') return choice(path, label, transplants, words);
  return yesNo(path, label);
}

export const restingFields = [
  number('resting.seated', 'Seated', 'bpm'),
  number('resting.standing', 'Standing, if measured', 'bpm'),
  number('resting.spread', 'Highest less lowest of the last days', 'bpm', {
    hint: 'Empty: not measured',
  }),
];

export const testFields = [
  choice('test.mode', 'Mode', testModes, testModeWords),
  number('test.daysAgo', 'Days ago', 'days'),
  choice('test.endedBy', 'Ended by', testEndings, testEndWords),
  number('test.restingHeartRate', 'Resting rate before it', 'bpm', { hint: 'Empty: not known' }),
  number('test.peakHeartRate', 'Peak heart rate', 'bpm'),
  number('test.peakVo2', 'Peak VO2', 'mL/kg/min', { hint: 'Counts before METs' }),
  number('test.peakMets', 'Peak METs', 'METs'),
  choice('test.vo2Source', 'VO2 or METs were', vo2Sources, vo2SourceWords),
  yesNo('test.sameRateActingDrugs', 'On today’s rate-acting drugs and doses'),
  yesNo('test.sameRhythmAndDevice', 'Same rhythm and device settings as today'),
  yesNo('test.eventSince', 'Cardiac event or procedure since'),
];

export const thresholdFields = [
  choice('kind', 'Found', thresholdKinds, thresholdWords),
  number('heartRate', 'From a rate of', 'bpm'),
  number('clearMets', 'Highest work before it', 'METs', { hint: 'Empty: not known' }),
];

export const rhythmFields = [choice('rhythm', 'Rhythm', rhythms, rhythmWords)];

export const deviceFields = [
  choice('devices.icd.status', 'Defibrillator', icdStatuses, icdWords),
  number('devices.upperTrackingRate', 'Upper tracking rate of a pacemaker', 'bpm', {
    hint: 'Empty: none',
  }),
];

export const zoneFields = [
  number('rate', 'Zone from', 'bpm'),
  choice('kind', 'What it does', icdZoneKinds, zoneWords),
];

export const riskFields = [
  choice('risk', 'Risk', riskLevels, riskWords),
  number('programWeek', 'Week of the program', ''),
];

export const conditionFields = conditionKinds.map(condition);

export const bodyFields = [
  number('patient.ageYears', 'Age', 'years'),
  choice('patient.sexAtBirth', 'Sex at birth', sexes, sexWords),
  number('patient.heightCm', 'Height', 'cm', { hint: 'Empty: not known' }),
  number('patient.weightKg', 'Weight', 'kg', { hint: 'Empty: not known' }),
];

export const observedFields = [
  number('observedWork.medianHeartRate', 'Median rate', 'bpm'),
  number('observedWork.sessions', 'Sessions', ''),
  number('observedWork.perceivedExertion.lower', 'Effort from', 'RPE'),
  number('observedWork.perceivedExertion.upper', 'Effort to', 'RPE'),
];

export const walkFields = [number('walkTest.distanceMeters', 'Distance', 'm')];

export const intensityFields = [
  number('intensity.lower', 'From', '%', { ...percent, hint: fractionHint }),
  number('intensity.upper', 'To', '%', percent),
];

export const percentOfPeakFields = [
  number('percentOfPeak.lower', 'From', '%', { ...percent, hint: fractionHint }),
  number('percentOfPeak.upper', 'To', '%', percent),
];
