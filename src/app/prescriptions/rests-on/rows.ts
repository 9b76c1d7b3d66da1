import type { OptionalPart } from '../worksheet/worksheet-form';
import {
  bodyFields,
  conditionFields,
  deviceFields,
  type FieldSpec,
  intensityFields,
  observedFields,
  percentOfPeakFields,
  restingFields,
  rhythmFields,
  riskFields,
  testFields,
  walkFields,
} from './field-specs';

export type RowId =
  | 'resting'
  | 'test'
  | 'thresholds'
  | 'rateActingDrugs'
  | 'rhythm'
  | 'devices'
  | 'risk'
  | 'conditions'
  | 'patient'
  | 'observedWork'
  | 'walkTest'
  | 'intensity'
  | 'percentOfPeak';

/** A fact that a range rests on, and the fields that make it. */
export interface Row {
  readonly id: RowId;
  readonly label: string;
  /** The parts of the request that it shows. */
  readonly paths: readonly string[];
  /** Where the record says where it comes from. */
  readonly origins: readonly string[];
  readonly fields: readonly FieldSpec[];
  /** A part that may be missing as a whole, with the words for its presence and what it begins with. */
  readonly part?: {
    readonly name: OptionalPart;
    readonly words: string;
    readonly initial?: object;
  };
}

export const rows: readonly Row[] = [
  {
    id: 'resting',
    label: 'Resting rate',
    paths: ['resting'],
    origins: ['resting'],
    fields: restingFields,
  },
  {
    id: 'test',
    label: 'Exercise test',
    paths: ['test'],
    origins: ['test'],
    fields: testFields,
    part: {
      name: 'test',
      words: 'There is an exercise test',
      initial: { mode: 'treadmill', endedBy: 'fatigue', vo2Source: 'estimated' },
    },
  },
  {
    id: 'thresholds',
    label: 'Thresholds',
    paths: ['thresholds'],
    origins: ['thresholds.0'],
    fields: [],
  },
  {
    id: 'rateActingDrugs',
    label: 'Rate-acting drugs',
    paths: ['rateActingDrugs'],
    origins: ['rateActingDrugs'],
    fields: [],
  },
  { id: 'rhythm', label: 'Rhythm', paths: ['rhythm'], origins: ['rhythm'], fields: rhythmFields },
  {
    id: 'devices',
    label: 'Devices',
    paths: ['devices'],
    origins: ['devices'],
    fields: deviceFields,
  },
  {
    id: 'risk',
    label: 'Risk and week',
    paths: ['risk', 'programWeek'],
    origins: ['risk', 'programWeek'],
    fields: riskFields,
  },
  {
    id: 'conditions',
    label: 'Conditions',
    paths: ['conditions'],
    origins: [],
    fields: conditionFields,
  },
  {
    id: 'patient',
    label: 'Age and body',
    paths: ['patient'],
    origins: ['patient.weightKg'],
    fields: bodyFields,
  },
  {
    id: 'observedWork',
    label: 'Observed work',
    paths: ['observedWork'],
    origins: ['observedWork'],
    fields: observedFields,
    part: { name: 'observedWork', words: 'Steady work was observed' },
  },
  {
    id: 'walkTest',
    label: '6-minute walk',
    paths: ['walkTest'],
    origins: ['walkTest'],
    fields: walkFields,
    part: { name: 'walkTest', words: 'There is a 6-minute walk' },
  },
  {
    id: 'intensity',
    label: 'Intensity',
    paths: ['intensity'],
    origins: [],
    fields: intensityFields,
    part: {
      name: 'intensity',
      words: 'Another than the policy’s',
      initial: { lower: 0.4, upper: 0.8 },
    },
  },
  {
    id: 'percentOfPeak',
    label: 'Percent of peak',
    paths: ['percentOfPeak'],
    origins: [],
    fields: percentOfPeakFields,
    part: {
      name: 'percentOfPeak',
      words: 'Another than the policy’s',
      initial: { lower: 0.65, upper: 0.8 },
    },
  },
];

/** What stands at a path of JSON. */
export const valueAt = (value: unknown, path: string): unknown =>
  path
    .split('.')
    .reduce<unknown>(
      (found, key) => (found as Record<string, unknown> | null | undefined)?.[key],
      value,
    );

const ordered = (value: unknown): unknown => {
  if (Array.isArray(value)) return value.map(ordered);
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1));
  return Object.fromEntries(entries.map(([key, each]) => [key, ordered(each)]));
};

/** Whether two inputs say the same of a row, whatever the order of keys. */
export const isSameAt = ({ paths }: Row, one: unknown, other: unknown): boolean =>
  paths.every(
    (path) =>
      JSON.stringify(ordered(valueAt(one, path))) === JSON.stringify(ordered(valueAt(other, path))),
  );
