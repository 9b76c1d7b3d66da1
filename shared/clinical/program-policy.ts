import type { PolicyNumbers, PolicyValues } from './policy-numbers';
import { defaultsOf, policyFaults, policyKeysOf } from './policy-numbers';
import type { PolicyKey } from './prescribing';
import { progressionNumbers } from './progression/progression-policy';
import { staffingNumbers } from './risk/staffing';
import { intermittentNumbers } from './training/intermittent';
import { intervalNumbers } from './training/interval-policy';
import { resistanceNumbers } from './training/resistance-policy';
import { sessionShapeNumbers } from './training/session-shape';

/** Every number, beside the prescription's own policy, that a program may set, by subject. */
export const programNumbers = {
  progression: progressionNumbers,
  session: sessionShapeNumbers,
  intermittent: intermittentNumbers,
  intervals: intervalNumbers,
  resistance: resistanceNumbers,
  staffing: staffingNumbers,
} as const satisfies Readonly<Record<string, PolicyNumbers>>;
export type ProgramSubject = keyof typeof programNumbers;

/** A program's numbers by subject; a version, once used, never changes. */
export type ProgramPolicy = {
  readonly [Subject in ProgramSubject]: PolicyValues<(typeof programNumbers)[Subject]>;
};

export const programSubjects = Object.keys(programNumbers) as ProgramSubject[];

/** The published defaults. */
export const defaultProgramPolicy: ProgramPolicy = {
  progression: defaultsOf(programNumbers.progression),
  session: defaultsOf(programNumbers.session),
  intermittent: defaultsOf(programNumbers.intermittent),
  intervals: defaultsOf(programNumbers.intervals),
  resistance: defaultsOf(programNumbers.resistance),
  staffing: defaultsOf(programNumbers.staffing),
};

/** Every number as `subject.key` with label, unit, bounds, default and source, in the order of reading. */
export const programKeys: readonly PolicyKey[] = programSubjects.flatMap((subject) =>
  policyKeysOf(subject, programNumbers[subject]),
);

export interface ProgramFault {
  readonly key: string;
  readonly message: string;
}

/** Pairs that must not cross: the first at most the second. */
const pairs: readonly (readonly [
  low: (policy: ProgramPolicy) => number,
  high: (policy: ProgramPolicy) => number,
  key: string,
  message: string,
])[] = [
  [
    ({ resistance }) => resistance.leastRepetitions,
    ({ resistance }) => resistance.mostRepetitions,
    'resistance.mostRepetitions',
    'The most repetitions must not be fewer than the least.',
  ],
  [
    ({ resistance }) => resistance.afterSternotomy,
    ({ resistance }) => resistance.upperAfterSternotomy,
    'resistance.upperAfterSternotomy',
    'Full arm loads must not begin before any resistance.',
  ],
  [
    ({ intervals }) => intervals.physicianAbove,
    ({ intervals }) => intervals.highestFraction,
    'intervals.highestFraction',
    'The highest fraction must not lie below the one that a physician signs.',
  ],
  [
    ({ intervals }) => intervals.shortBoutMinutes,
    ({ intervals }) => intervals.longestWorkMinutes,
    'intervals.longestWorkMinutes',
    'The longest work bout must not be shorter than a short one.',
  ],
  [
    ({ intermittent }) => intermittent.totalMinutes,
    ({ intermittent }) => intermittent.mostMinutes,
    'intermittent.mostMinutes',
    'The most sum of the bouts must not be below the first.',
  ],
  [
    ({ session }) => session.conditioningMinutes,
    ({ progression }) => progression.goalMinutes,
    'progression.goalMinutes',
    'The duration to reach must not be below the one to begin with.',
  ],
  [
    ({ staffing }) => staffing.highRiskEach,
    ({ staffing }) => staffing.patientsEach,
    'staffing.patientsEach',
    'Patients at high risk need no fewer staff than others.',
  ],
];

/** What stands against a policy: numbers outside their bounds, then pairs that cross; [] when it may be published. */
export function programFaults(policy: ProgramPolicy): ProgramFault[] {
  const outside = programSubjects.flatMap((subject) =>
    policyFaults(programNumbers[subject], policy[subject]).map((key) => ({
      key: `${subject}.${key}`,
      message: 'This lies outside the bounds.',
    })),
  );
  const crossed = pairs.flatMap(([low, high, key, message]) =>
    low(policy) > high(policy) ? [{ key, message }] : [],
  );
  return [...outside, ...crossed];
}
