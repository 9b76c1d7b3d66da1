import type { PolicyNumbers, PolicyValues } from '../policy-numbers';
import { defaultsOf } from '../policy-numbers';

/** What a program sets for intervals, apart from its continuous range. */
export const intervalNumbers = {
  shortBoutMinutes: {
    label: 'Bouts shorter than this go by work and effort, not by heart rate',
    unit: 'min',
    lowest: 2,
    highest: 4,
    default: 2,
    source: 'Heart rate follows work only after one to two minutes; common practice',
  },
  physicianAbove: {
    label: 'A physician signs work bouts above this fraction of reserve',
    unit: '',
    lowest: 0.5,
    highest: 0.8,
    default: 0.8,
    source: 'Upper end of the ACSM range for cardiac patients',
  },
  highestFraction: {
    label: 'No work bout above this fraction of reserve',
    unit: '',
    lowest: 0.6,
    highest: 0.95,
    default: 0.9,
    source: 'Four-minute intervals at 85–95 % of peak rate in trials; review PMC11655092, Table 3',
  },
  recoveryHighest: {
    label: 'Recovery bouts at most at this fraction of reserve',
    unit: '',
    lowest: 0.2,
    highest: 0.6,
    default: 0.4,
    source: 'Active recovery at light work; common practice',
  },
  longestWorkMinutes: {
    label: 'Longest work bout',
    unit: 'min',
    lowest: 1,
    highest: 5,
    default: 4,
    source: 'Four-minute intervals in trials; review PMC11655092, Table 3',
  },
  highestEffort: {
    label: 'Highest effort in a work bout, Borg 6–20',
    unit: '',
    lowest: 13,
    highest: 17,
    default: 17,
    source: 'ACSM vigorous band, 14–17 (Garber 2011)',
  },
  firstProgramWeek: {
    label: 'First program week with intervals',
    unit: '',
    lowest: 1,
    highest: 12,
    default: 3,
    source: 'After the first two weeks at the narrow intensity; common practice',
  },
  warmUpMinutes: {
    label: 'Warm-up before the first work bout',
    unit: 'min',
    lowest: 5,
    highest: 15,
    default: 10,
    source: 'Common practice',
  },
} as const satisfies PolicyNumbers;

export type IntervalPolicy = PolicyValues<typeof intervalNumbers>;
export const defaultIntervalPolicy: IntervalPolicy = defaultsOf(intervalNumbers);
