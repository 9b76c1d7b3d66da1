import type { DiagnosisKind } from '@shared/contracts/patients-contract';
import { diagnosisKinds } from '@shared/contracts/patients-contract';
import {
  type NewRecordEntryInput,
  type PatientRecord,
  recordValues,
} from '@shared/contracts/record-contract';
import {
  clinicalEventKinds,
  conditionAnswers,
  conditionKinds,
  type ConditionKind,
} from '@shared/contracts/record-lists';
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
} from '@shared/clinical/prescribing/request';
import {
  conditionAnswerWords,
  conditionWords,
  diagnosisWords,
  eventWords,
  icdWords,
  rateActingWords,
  rhythmWords,
  riskWords,
  testEndWords,
  testModeWords,
  thresholdWords,
  vo2SourceWords,
  zoneWords,
} from '../../ui/words/clinical-words';
import { type EntryField, type EntryForm, type Option, type Values, formOf } from './entry-form';
import { bpm, centimeter, cycleLength, footAndInch, inUnit, kilogram, pound } from './units';

type Entry<K extends keyof PatientRecord> = PatientRecord[K][number];

function options<T extends string>(
  values: readonly T[],
  words: Readonly<Record<string, string>>,
): Option[] {
  return values.map((value) => ({ value, label: words[value] ?? value }));
}

const date = (key: string, label: string): EntryField => ({ key, label, type: 'date' });
const rate = (key: string, label: string): EntryField => ({
  key,
  label,
  type: 'number',
  units: [bpm],
});
const note: EntryField = { key: 'note', label: 'Note', type: 'note' };
const mets = (key: string, label: string, hint?: string): EntryField => ({
  key,
  label,
  type: 'number',
  units: [inUnit('METs')],
  ...(hint && { hint }),
});

export const restingRateForm = (): EntryForm =>
  formOf('resting-rates', { heading: 'Add a resting rate', saved: 'Resting rate saved.' }, [
    { ...rate('seated', 'Seated'), hint: 'After five minutes at rest' },
    rate('standing', 'Standing'),
    date('measuredOn', 'Measured on'),
  ]);

export const rhythmForm = (): EntryForm =>
  formOf('rhythms', { heading: 'Add a rhythm', saved: 'Rhythm saved.' }, [
    { key: 'rhythm', label: 'Rhythm', type: 'choice', options: options(rhythms, rhythmWords) },
    date('observedOn', 'Seen on'),
  ]);

export const bodyForm = (): EntryForm =>
  formOf('body-measurements', { heading: 'Add weight or height', saved: 'Measurement saved.' }, [
    { key: 'weightKg', label: 'Weight', type: 'number', units: [pound, kilogram] },
    { key: 'heightCm', label: 'Height', type: 'number', units: [footAndInch, centimeter] },
    date('measuredOn', 'Measured on'),
  ]);

const medicationFields: readonly EntryField[] = [
  { key: 'name', label: 'Drug', type: 'text' },
  {
    key: 'rateActing',
    label: 'Acts on the heart rate',
    type: 'choice',
    none: 'No',
    options: options(rateActingDrugs, rateActingWords),
  },
  { key: 'dose', label: 'Dose', type: 'text', hint: 'With its unit, as 50 mg' },
  { key: 'schedule', label: 'How often', type: 'text', hint: 'As twice a day' },
  date('startedOn', 'Taken since'),
];

export const medicationForm = (): EntryForm =>
  formOf('medications', { heading: 'Add a drug', saved: 'Drug saved.' }, medicationFields);

/** A change of dose or schedule: the entry stops on the day the new one starts. */
export function changedMedicationForm({ id, values }: Entry<'medications'>): EntryForm {
  const { name, rateActing, dose, schedule } = values;
  return formOf(
    'medications',
    { heading: `Change ${name}`, saved: `${name} changed.`, save: 'Save the change' },
    medicationFields.map((field) =>
      field.key === 'startedOn' ? { ...field, label: 'Changed on' } : field,
    ),
    { name, rateActing, dose, schedule },
    { replaces: id },
  );
}

/** @param last the latest check, whose settings stand in the fields */
export const deviceForm = (last: Entry<'devices'> | undefined): EntryForm =>
  formOf(
    'devices',
    { heading: 'Add a device check', saved: 'Device check saved.' },
    [
      {
        key: 'icdStatus',
        label: 'Defibrillator (ICD)',
        type: 'choice',
        options: options(icdStatuses, {
          ...icdWords,
          none: 'None',
          present: 'Present',
          unknown: 'Not known',
        }),
      },
      date('checkedOn', 'Checked on'),
      {
        key: 'icdZones',
        label: 'Zones of the defibrillator',
        type: 'rows',
        add: 'Add a zone',
        hint: 'Where each zone begins, as a rate or a cycle length. Present without zones counts as not known.',
        rules: recordValues.devices.shape.icdZones.unwrap().element.shape,
        fields: [
          { key: 'rate', label: 'Begins at', type: 'number', units: [bpm, cycleLength] },
          {
            key: 'kind',
            label: 'It does',
            type: 'choice',
            options: options(icdZoneKinds, zoneWords),
          },
        ],
      },
      {
        key: 'pacemaker',
        label: 'The device paces (pacemaker, or ICD with pacing)',
        type: 'check',
      },
      { ...rate('upperTrackingRate', 'Upper tracking rate'), hint: 'Only with pacing' },
    ],
    last && { ...last.values, checkedOn: undefined },
  );

const thresholdFields: readonly EntryField[] = [
  {
    key: 'kind',
    label: 'What began',
    type: 'choice',
    options: options(thresholdKinds, thresholdWords),
  },
  rate('heartRate', 'At a heart rate of'),
  mets('clearMets', 'Highest work before it', 'Tolerated before onset'),
];

/** A test with what was found in it, entered together or not at all. */
export function testForm(): EntryForm {
  const found: EntryField = {
    key: 'found',
    label: 'Limits found in this test',
    type: 'rows',
    add: 'Add what was found',
    hint: 'The rate at which ischemia, angina, arrhythmia, a pressure response or a symptom began.',
    rules: recordValues.thresholds.shape,
    fields: thresholdFields,
  };
  return {
    heading: 'Add an exercise test',
    save: 'Save the test',
    saved: 'Exercise test saved.',
    rules: recordValues['exercise-tests'].shape,
    fields: [
      { key: 'mode', label: 'Mode', type: 'choice', options: options(testModes, testModeWords) },
      { key: 'protocol', label: 'Protocol', type: 'text', hint: 'As Bruce' },
      date('performedOn', 'Performed on'),
      {
        key: 'endedBy',
        label: 'Ended by',
        type: 'choice',
        options: options(testEndings, testEndWords),
      },
      rate('peakHeartRate', 'Peak heart rate'),
      rate('restingHeartRate', 'Resting rate before it'),
      { key: 'peakVo2', label: 'Peak VO2', type: 'number', units: [inUnit('mL/kg/min')] },
      mets('peakMets', 'Peak METs'),
      {
        key: 'vo2Source',
        label: 'VO2 or METs are',
        type: 'choice',
        none: 'Not given',
        options: options(vo2Sources, vo2SourceWords),
      },
      note,
      found,
    ],
    toEntries: ({ found: rows, ...test }, idOf) => {
      const foundOn = test['performedOn'];
      const limits = (rows as Values[]).map((row, index) => ({
        kind: 'thresholds',
        id: idOf(index + 1),
        values: { ...row, foundOn, exerciseTestId: idOf(0) },
      }));
      return [
        { kind: 'exercise-tests', id: idOf(0), values: test },
        ...limits,
      ] as NewRecordEntryInput[];
    },
    pathOf: (index) => (index === 0 ? '' : `found.${index - 1}.`),
  };
}

const thresholdFormFields: readonly EntryField[] = [
  ...thresholdFields,
  date('foundOn', 'Found on'),
  note,
];

export const thresholdForm = (): EntryForm =>
  formOf(
    'thresholds',
    { heading: 'Add a limit found on the floor', saved: 'Limit saved. It binds from now on.' },
    thresholdFormFields,
  );

/** A newer finding of the same kind, which takes the place of the one given. */
export const supersedingForm = ({ id, values }: Entry<'thresholds'>): EntryForm =>
  formOf(
    'thresholds',
    {
      heading: `Replace ${thresholdWords[values.kind].toLowerCase()} at ${values.heartRate} bpm`,
      saved: 'The new limit binds from now on.',
      save: 'Save the new finding',
    },
    thresholdFormFields.filter(({ key }) => key !== 'kind'),
    {},
    { kind: values.kind, supersedes: id },
  );

export const walkForm = (): EntryForm =>
  formOf('walk-tests', { heading: 'Add a 6-minute walk', saved: 'Walk test saved.' }, [
    {
      key: 'distanceMeters',
      label: 'Distance',
      type: 'number',
      units: [inUnit('m')],
    },
    date('performedOn', 'Walked on'),
  ]);

export const riskForm = (): EntryForm =>
  formOf('risk-stratifications', { heading: 'Stratify the risk', saved: 'Risk saved.' }, [
    { key: 'level', label: 'Risk', type: 'choice', options: options(riskLevels, riskWords) },
    date('assessedOn', 'Assessed on'),
    note,
  ]);

export const diagnosisForm = (): EntryForm =>
  formOf(
    'diagnoses',
    { heading: 'Add a diagnosis', saved: 'Diagnosis saved.' },
    [
      {
        key: 'kind',
        label: 'Kind',
        type: 'choice',
        options: options<DiagnosisKind>(diagnosisKinds, diagnosisWords),
      },
      { key: 'description', label: 'Diagnosis', type: 'text' },
      date('onsetOn', 'Since'),
    ],
    { onsetOn: null },
  );

export const eventForm = (): EntryForm =>
  formOf('clinical-events', { heading: 'Add an event or procedure', saved: 'Event saved.' }, [
    {
      key: 'kind',
      label: 'What happened',
      type: 'choice',
      options: options(clinicalEventKinds, eventWords),
    },
    { key: 'description', label: 'In words', type: 'text', hint: 'Optional' },
    date('occurredOn', 'On'),
  ]);

/** The ten conditions at once; those left unanswered or answered as before make no entry. */
export function conditionsForm(
  current: Readonly<Partial<Record<ConditionKind, string>>>,
): EntryForm {
  const changed = (values: Values): ConditionKind[] =>
    conditionKinds.filter((kind) => values[kind] !== null && values[kind] !== current[kind]);
  return {
    heading: 'Conditions that decide the method',
    save: 'Save the answers',
    saved: 'Answers saved.',
    rules: {},
    fields: conditionKinds.map((kind) => ({
      key: kind,
      label: conditionWords[kind],
      type: 'choice' as const,
      none: 'Not answered',
      options: options(conditionAnswers[kind], conditionAnswerWords(kind)),
    })),
    initial: current,
    toEntries: (values, idOf) =>
      changed(values).map((kind) => ({
        kind: 'conditions' as const,
        id: idOf(conditionKinds.indexOf(kind)),
        values: { kind, value: String(values[kind]) },
      })),
    pathOf: () => '',
  };
}
