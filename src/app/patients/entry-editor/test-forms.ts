import {
  protocolNames,
  stagesOf,
  testProtocols,
  type TestProtocol,
} from '@shared/clinical/exercise-test/protocols';
import { standEndings } from '@shared/clinical/five-times-sit-to-stand';
import {
  testEndings,
  testModes,
  thresholdKinds,
  vo2Sources,
} from '@shared/clinical/prescribing/request';
import { ecgHindranceWords, ecgHindrances } from '@shared/clinical/thresholds/ecg-readable';
import {
  type NewRecordEntryInput,
  type PatientRecord,
  recordValues,
} from '@shared/contracts/record-contract';
import {
  testEndWords,
  testModeWords,
  thresholdWords,
  vo2SourceWords,
} from '../../ui/words/clinical-words';
import type { LineContext } from '../lines/line-context';
import { standing } from '../lines/line-context';
import { doneStages, testLines } from '../lines/test-lines';
import { chairLines, walkLines } from '../lines/walk-lines';
import { date, note, number, options, rate } from './common-fields';
import { type EntryField, type EntryForm, type Values, formOf } from './entry-form';

type Entry<K extends keyof PatientRecord> = PatientRecord[K][number];

const thresholdFields: readonly EntryField[] = [
  {
    key: 'kind',
    label: 'What began',
    type: 'choice',
    options: options(thresholdKinds, thresholdWords),
  },
  rate('heartRate', 'At a heart rate of'),
  { ...number('clearMets', 'Highest work before it', 'METs'), hint: 'Tolerated before onset' },
];

const found: EntryField = {
  key: 'found',
  label: 'ST change, angina, arrhythmia and other limits found',
  type: 'rows',
  add: 'Add what was found',
  hint: 'The rate at which each began. It binds from the moment it is saved.',
  rules: recordValues.thresholds.shape,
  fields: [...thresholdFields, note],
};

const stageShape = recordValues['exercise-tests'].shape.stages.unwrap().element.shape;

const stages: EntryField = {
  key: 'stages',
  label: 'Stages',
  type: 'rows',
  asGrid: true,
  add: 'Add a stage',
  hint: 'Filled from the protocol’s table. Stages after the last with a reading are not kept.',
  rules: stageShape,
  fields: [
    { key: 'label', label: 'Stage', type: 'text' },
    number('minutes', 'Length', 'min'),
    number('speedMph', 'Speed', 'mph'),
    number('gradePercent', 'Grade', '%'),
    number('powerWatts', 'Power', 'W'),
    rate('heartRate', 'Rate'),
    number('systolic', 'Systolic', 'mmHg'),
    number('diastolic', 'Diastolic', 'mmHg'),
    number('exertion', 'RPE', '6–20'),
  ],
};

const drugsTaken: EntryField = {
  key: 'drugsTaken',
  label: 'Drugs taken before the test',
  type: 'rows',
  asGrid: true,
  add: 'Add a drug',
  hint: 'Hours since the last dose; remove what was not taken.',
  rules: recordValues['exercise-tests'].shape.drugsTaken.unwrap().unwrap().element.shape,
  fields: [
    { key: 'name', label: 'Drug', type: 'text' },
    number('hoursSinceDose', 'Since the dose', 'hours'),
  ],
};

const testFields: readonly EntryField[] = [
  { key: 'mode', label: 'Mode', type: 'choice', options: options(testModes, testModeWords) },
  {
    key: 'protocolKind',
    label: 'Protocol',
    type: 'choice',
    options: options(testProtocols, protocolNames),
  },
  { key: 'protocol', label: 'As the report names it', type: 'text' },
  date('performedOn', 'Performed on'),
  {
    key: 'gait',
    label: 'Walked or ran at the end',
    type: 'choice',
    none: 'Not recorded',
    options: options(['walk', 'run'], { walk: 'Walked', run: 'Ran' }),
    hint: 'Treadmill only',
  },
  { key: 'handrail', label: 'Handrail held', type: 'yes-no', hint: 'Treadmill only' },
  stages,
  number('exerciseMinutes', 'Time of exercise', 'min'),
  rate('restingHeartRate', 'Resting rate before it'),
  rate('peakHeartRate', 'Peak heart rate'),
  number('peakSystolic', 'Peak systolic', 'mmHg'),
  number('peakDiastolic', 'Peak diastolic', 'mmHg'),
  number('peakExertion', 'Peak RPE', '6–20'),
  {
    key: 'endedBy',
    label: 'Ended by',
    type: 'choice',
    options: options(testEndings, testEndWords),
  },
  {
    key: 'effort',
    label: 'Limited by symptoms',
    type: 'choice',
    none: 'Not recorded',
    options: options(['maximal', 'submaximal'], {
      maximal: 'Yes, to the limit',
      submaximal: 'No, stopped before',
    }),
  },
  rate('recoveryOne', 'Rate after 1 min'),
  rate('recoveryTwo', 'Rate after 2 min'),
  {
    key: 'recoveryPosture',
    label: 'Recovered',
    type: 'choice',
    none: 'Not recorded',
    options: options(['upright', 'seated', 'supine'], {
      upright: 'Upright, walking',
      seated: 'Seated',
      supine: 'Supine at once',
    }),
  },
  found,
  drugsTaken,
  number('peakVo2', 'Peak VO2', 'mL/kg/min'),
  number('peakMets', 'Peak METs', 'METs'),
  {
    key: 'vo2Source',
    label: 'VO2 or METs are',
    type: 'choice',
    none: 'Not given',
    options: options(vo2Sources, vo2SourceWords),
  },
  note,
];

/** A ramp has no printed table: ten rows of a minute to be filled. */
const rampRows = Array.from({ length: 10 }, (_, index) => ({
  label: String(index + 1),
  minutes: 1,
}));

function stagesFor(kind: TestProtocol): Values[] {
  if (kind === 'other') return [];
  if (kind === 'ramp' || kind === 'cycle-ramp') return rampRows;
  return stagesOf(kind).map(({ label, minutes, speedMph, gradePercent }) => ({
    label,
    minutes,
    speedMph,
    gradePercent,
  }));
}

function fillProtocol({ protocolKind }: Values): Values {
  const kind = testProtocols.find((each) => each === protocolKind);
  if (kind === undefined) return {};
  return {
    stages: stagesFor(kind),
    ...(kind !== 'other' && { protocol: protocolNames[kind] }),
    ...(kind === 'cycle-ramp' && { mode: 'cycle' }),
    ...(!['other', 'cycle-ramp'].includes(kind) && { mode: 'treadmill' }),
  };
}

const signOf: Readonly<Record<string, string>> = {
  ischemia: 'st-change',
  angina: 'angina',
  arrhythmia: 'arrhythmia',
};

/** What was found, as the signs of the test itself. */
const signsOf = (rows: readonly Values[]) =>
  rows.flatMap(({ kind, heartRate, clearMets, note: detail }) => {
    const sign = signOf[String(kind)];
    return sign === undefined
      ? []
      : [{ kind: sign, heartRate, clearMets, detail: typeof detail === 'string' ? detail : null }];
  });

/** A test with what was found in it, entered together or not at all; rate-acting drugs that are taken stand in it to begin with. */
export function testForm(context: LineContext): EntryForm {
  const taken = standing(context.record, 'medications')
    .filter(({ values }) => values.rateActing !== null && values.stoppedOn === null)
    .map(({ values }) => ({ name: values.name }));
  return {
    heading: 'Add an exercise test',
    save: 'Save the test',
    saved: 'Exercise test saved.',
    rules: recordValues['exercise-tests'].shape,
    fields: testFields,
    initial: { drugsTaken: taken },
    fills: { protocolKind: fillProtocol },
    lines: (values) => testLines(values, context),
    toEntries: ({ found: rows, ...test }, idOf) => {
      const foundOn = test['performedOn'];
      const limits = (rows as Values[]).map((row, index) => ({
        kind: 'thresholds',
        id: idOf(index + 1),
        values: { ...row, foundOn, exerciseTestId: idOf(0) },
      }));
      const values = {
        ...test,
        protocolKind: test['protocolKind'] ?? 'other',
        stages: doneStages(test['stages'] as Values[]),
        signs: signsOf(rows as Values[]),
      };
      return [{ kind: 'exercise-tests', id: idOf(0), values }, ...limits] as NewRecordEntryInput[];
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

export const ecgForm = (): EntryForm =>
  formOf('resting-ecgs', { heading: 'Add a resting ECG', saved: 'ECG saved.' }, [
    date('observedOn', 'Recorded on'),
    {
      key: 'hindrances',
      label: 'What hides ischemia in exercise',
      type: 'marks',
      options: options(ecgHindrances, ecgHindranceWords),
      hint: 'None marked: the ECG can show ischemia.',
    },
    note,
  ]);

export const walkForm = (context: LineContext): EntryForm => ({
  ...formOf('walk-tests', { heading: 'Add a 6-minute walk', saved: 'Walk test saved.' }, [
    number('distanceMeters', 'Distance', 'm'),
    date('performedOn', 'Walked on'),
  ]),
  lines: (values) => walkLines(values, context),
});

export const chairForm = (context: LineContext): EntryForm => ({
  ...formOf('chair-stands', { heading: 'Add five stands from a chair', saved: 'Saved.' }, [
    { ...number('seconds', 'Time', 's'), hint: 'Empty: could not be done' },
    {
      key: 'ending',
      label: 'Clock stopped',
      type: 'choice',
      options: options(standEndings, {
        'standing-fifth-time': 'Standing the fifth time',
        'seated-fifth-time': 'Seated after the fifth',
      }),
    },
    date('performedOn', 'Done on'),
  ]),
  lines: (values) => chairLines(values, context),
});
