import type { PatientRecord, RecordKind } from '@shared/contracts/record-contract';
import type { EntryForm } from '../entry-editor/entry-form';
import {
  bodyForm,
  deviceForm,
  diagnosisForm,
  eventForm,
  medicationForm,
  restingRateForm,
  rhythmForm,
  riskForm,
  testForm,
  thresholdForm,
  walkForm,
} from '../entry-editor/entry-forms';

/** The kinds whose entries are shown as a list of their own. */
export type ListedKind = Exclude<RecordKind, 'conditions' | 'medication-reviews'>;

interface SectionWords {
  readonly heading: string;
  readonly add: string;
  readonly empty: string;
  readonly form: (record: PatientRecord) => EntryForm;
}

const stands = (entry: { enteredInErrorAt: string | null }): boolean =>
  entry.enteredInErrorAt === null;

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
    form: (record) => deviceForm(record.devices.find(stands)),
  },
  'exercise-tests': {
    heading: 'Exercise tests',
    add: 'Add an exercise test',
    empty: 'No exercise test entered.',
    form: testForm,
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
  },
  'risk-stratifications': {
    heading: 'Risk',
    add: 'Stratify the risk',
    empty: 'Not stratified yet: counts as not known.',
    form: riskForm,
  },
};
