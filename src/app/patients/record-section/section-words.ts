import type { RecordKind } from '@shared/contracts/record-contract';
import type { EntryForm } from '../entry-editor/entry-form';
import { questionnaires } from '@shared/clinical/questionnaires/questionnaires';
import { ecgReadableSource } from '@shared/clinical/thresholds/ecg-readable';
import { instruments } from '@shared/contracts/record-assessments-contract';
import { questionnaireForm, riskForm } from '../entry-editor/assessment-forms';
import {
  bodyForm,
  diagnosisForm,
  eventForm,
  restingRateForm,
  rhythmForm,
} from '../entry-editor/entry-forms';
import { chairForm, ecgForm, testForm, thresholdForm, walkForm } from '../entry-editor/test-forms';
import { deviceForm, medicationForm, restrictionForm } from '../entry-editor/treatment-forms';
import type { Line } from '../entry-editor/entry-form';
import { questionnaireLines, riskLines } from '../lines/assessment-lines';
import { type LineContext, stands } from '../lines/line-context';
import { testLines } from '../lines/test-lines';
import { chairLines, walkLines } from '../lines/walk-lines';

/** The kinds whose entries are shown as a list of their own. */
export type ListedKind = Exclude<RecordKind, 'conditions' | 'medication-reviews'>;

interface Adding {
  readonly add: string;
  readonly form: (context: LineContext) => EntryForm;
}

export interface SectionWords extends Adding {
  readonly heading: string;
  readonly empty: string;
  /** More that may be added here. */
  readonly others?: readonly Adding[];
  /** What is computed from an entry. */
  readonly lines?: (values: RecordValues, context: LineContext) => readonly Line[];
}

type RecordValues = Readonly<Record<string, unknown>>;

const asking = instruments.map((instrument) => ({
  add: questionnaires[instrument].name,
  form: (context: LineContext) => questionnaireForm(instrument, context),
}));
const [firstAsked, ...othersAsked] = asking as [Adding, ...Adding[]];

export const sectionWords: Readonly<Record<ListedKind, SectionWords>> = {
  diagnoses: {
    heading: 'Diagnoses',
    add: 'Add a diagnosis',
    empty: 'No diagnosis entered.',
    form: diagnosisForm,
  },
  'clinical-events': {
    heading: 'Events and procedures',
    add: 'Add an event',
    empty: 'None entered. An event or procedure means that an earlier test no longer stands.',
    form: eventForm,
  },
  'body-measurements': {
    heading: 'Weight and height',
    add: 'Add weight or height',
    empty: 'Not measured yet. Workloads need a weight.',
    form: bodyForm,
  },
  rhythms: {
    heading: 'Rhythm',
    add: 'Add a rhythm',
    empty: 'No rhythm entered. A range needs one.',
    form: rhythmForm,
  },
  'resting-rates': {
    heading: 'Resting rate',
    add: 'Add a resting rate',
    empty: 'No resting rate entered. A range needs one.',
    form: restingRateForm,
  },
  medications: {
    heading: 'Drugs',
    add: 'Add a drug',
    empty: 'No drugs entered.',
    form: medicationForm,
  },
  devices: {
    heading: 'Defibrillator and pacemaker',
    add: 'Add a device check',
    empty: 'No check entered. Until then a defibrillator is not ruled out, and effort leads.',
    form: ({ record }) => deviceForm(record.devices.find(stands)),
  },
  'exercise-tests': {
    heading: 'Exercise tests',
    add: 'Add an exercise test',
    empty: 'No exercise test entered.',
    form: testForm,
    lines: testLines,
  },
  thresholds: {
    heading: 'Limits found',
    add: 'Add a limit found on the floor',
    empty:
      'None entered. Enter the rate at which ischemia, angina, arrhythmia, a pressure response or a symptom began.',
    form: thresholdForm,
  },
  'walk-tests': {
    heading: '6-minute walk',
    add: 'Add a walk test',
    empty: 'No walk test entered.',
    form: walkForm,
    lines: walkLines,
  },
  'risk-stratifications': {
    heading: 'Risk',
    add: 'Stratify the risk',
    empty: 'Not stratified yet: counts as not known.',
    form: riskForm,
    lines: riskLines,
  },
  'resting-ecgs': {
    heading: 'Resting ECG',
    add: 'Add a resting ECG',
    empty: 'None entered: it is not known whether the ECG can show ischemia.',
    form: ecgForm,
    lines: ({ hindrances }) => [
      {
        label: 'Ischemia in exercise',
        value: (hindrances as string[]).length > 0 ? 'cannot be seen' : 'can be seen',
        source: ecgReadableSource,
        why: 'Digoxin and ventricular pacing entered elsewhere count too.',
      },
    ],
  },
  'chair-stands': {
    heading: 'Five stands from a chair',
    add: 'Add five stands',
    empty: 'Not done yet.',
    form: chairForm,
    lines: chairLines,
  },
  restrictions: {
    heading: 'Restrictions',
    add: 'Add an order',
    empty: 'No order entered.',
    form: restrictionForm,
  },
  questionnaires: {
    heading: 'Questionnaires',
    ...firstAsked,
    others: othersAsked,
    empty: 'None answered yet.',
    lines: questionnaireLines,
  },
};
