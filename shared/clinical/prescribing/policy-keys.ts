import { type PrescriptionPolicy, defaultPolicy, policyBounds } from './policy';

/** One number of the policy, as people read it. */
export interface PolicyKey {
  /** Its place in the policy, joined with dots: `intensity.wide.lower`. */
  readonly key: string;
  readonly label: string;
  /** '' where the value is a plain fraction. */
  readonly unit: string;
  readonly lowest: number;
  readonly highest: number;
  readonly default: number;
  /** Where the default comes from; "from memory" and "common practice" are said as such. */
  readonly source: string;
}

type Bounds = { readonly lowest: number; readonly highest: number };
type Row = readonly [key: string, label: string, unit: string, bounds: Bounds];

const at = policyBounds;

/** The rows of one source. */
interface Group {
  readonly source: string;
  readonly rows: readonly Row[];
}

const ends = (key: string, label: string, bounds: Bounds): Row[] => [
  [`${key}.lower`, `${label}, lower end`, '', bounds],
  [`${key}.upper`, `${label}, upper end`, '', bounds],
];

const margin = (key: string, label: string): Row => [
  `margin.${key}`,
  `Ceiling below ${label}, by`,
  'bpm',
  at.margin,
];

const groups: readonly Group[] = [
  {
    source: 'ACSM range for cardiac patients, 40–80 % of reserve; UK practice 40–70 %',
    rows: [
      ...ends('intensity.wide', 'Intensity, wide, of heart-rate reserve', at.intensity),
      ...ends('intensity.narrow', 'Intensity, narrow, of heart-rate reserve', at.intensity),
      ...ends('intensity.lowCapacity', 'Intensity, low capacity, of reserve', at.intensity),
    ],
  },
  {
    source:
      'Between ACSM’s moderate band and the heart-failure range of the Canadian Cardiovascular Society, 2013',
    rows: ends('percentOfPeak', 'Fraction of the measured peak rate', at.percentOfPeak),
  },
  {
    source: 'Common practice',
    rows: [
      ['restingPlus.lower', 'Resting plus, lower end', 'bpm', at.restingPlus],
      ['restingPlus.upper', 'Resting plus, upper end', 'bpm', at.restingPlus],
      [
        'askLine.above',
        'Without a ceiling: the floor asks above the target by',
        'bpm',
        at.askLineAbove,
      ],
      ['test.validDays', 'An exercise test counts for', 'days', at.testValidDays],
    ],
  },
  {
    source: 'An inpatient convention, from memory',
    rows: [['restingPlus.cap', 'Resting plus, cap', 'bpm', at.restingPlusCap]],
  },
  {
    source: 'ACSM',
    rows: [
      margin('ischemia', 'ischemia'),
      margin('angina', 'angina'),
      margin('arrhythmia', 'arrhythmia'),
      margin('bloodPressure', 'a blood pressure response'),
      margin('symptom', 'symptoms'),
    ],
  },
  {
    source: 'U.S. texts 10–15 bpm; European position paper 20 bpm (Piepoli 2010)',
    rows: [margin('icd', 'an ICD’s lowest zone')],
  },
  { source: 'From memory', rows: [margin('tracking', 'a pacemaker’s upper tracking rate')] },
  {
    source: 'Plimsoll’s own, for legibility and reliability',
    rows: [
      ['range.minimumWidth', 'Smallest width of a range', 'bpm', at.minimumWidth],
      ['reserve.minimum', 'Smallest heart-rate reserve to prescribe by', 'bpm', at.reserveMinimum],
      ['resting.maximumSpread', 'Largest spread of resting rates', 'bpm', at.maximumSpread],
    ],
  },
  {
    source: 'Plan review, 42 CFR 410.49',
    rows: [['reviewDueDays', 'A range is reviewed within', 'days', at.reviewDueDays]],
  },
  {
    source: 'Reviews of upper-body training; the rate from memory',
    rows: [
      [
        'arm.rateBelowLegs',
        'Arm work: target below that of leg work by',
        'bpm',
        at.armRateBelowLegs,
      ],
      ['arm.workFraction', 'Arm work: fraction of the power of leg work', '', at.armWorkFraction],
    ],
  },
  {
    source: 'Practice varies; from memory',
    rows: [
      [
        'walk.startFraction',
        'Treadmill start: fraction of walk-test speed',
        '',
        at.walkStartFraction,
      ],
    ],
  },
  {
    source: 'Dissection review, PMC9741551',
    rows: [
      [
        'pressureCeiling.systolic',
        'After dissection: systolic ceiling',
        'mmHg',
        at.systolicCeiling,
      ],
      [
        'pressureCeiling.diastolic',
        'After dissection: diastolic ceiling',
        'mmHg',
        at.diastolicCeiling,
      ],
    ],
  },
  {
    source: 'Programs’ policies differ between 85 and 90 %',
    rows: [['oxygenFloor', 'Lowest oxygen saturation', '%', at.oxygenFloor]],
  },
  {
    source: 'The steps of common machines',
    rows: [
      ['equipment.treadmill.speedMph', 'Treadmill: step of speed', 'mph', at.treadmillSpeedStep],
      ['equipment.treadmill.gradePercent', 'Treadmill: step of grade', '%', at.treadmillGradeStep],
      ['equipment.cycle.power', 'Cycle: step of power', 'W', at.powerStep],
      ['equipment.arm.power', 'Arm ergometer: step of power', 'W', at.powerStep],
      ['equipment.step.lowest', 'Stepping: lowest step', 'm', at.stepHeight],
      ['equipment.step.highest', 'Stepping: highest step', 'm', at.stepHeight],
      ['equipment.step.by', 'Stepping: steps differ by', 'm', at.stepHeightStep],
    ],
  },
];

/**
 * The number at a key of the policy.
 * @throws RangeError when the policy has no number there
 */
export function policyValue(policy: PrescriptionPolicy, key: string): number {
  const value = key
    .split('.')
    .reduce<unknown>((part, name) => (part as Record<string, unknown> | undefined)?.[name], policy);
  if (typeof value !== 'number') throw new RangeError(key);
  return value;
}

/** Every number that a program may set, in the order of reading. */
export const policyKeys: readonly PolicyKey[] = groups.flatMap(({ source, rows }) =>
  rows.map(([key, label, unit, { lowest, highest }]) => ({
    key,
    label,
    unit,
    lowest,
    highest,
    default: policyValue(defaultPolicy, key),
    source,
  })),
);
