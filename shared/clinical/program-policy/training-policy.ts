import type { PolicyNumbers, PolicyValues } from '../policy-numbers';
import { defaultsOf } from '../policy-numbers';
import { progressionNumbers } from '../progression/progression-policy';
import { staffingNumbers } from '../risk/staffing';
import { intermittentNumbers } from '../training/intermittent';
import { intervalNumbers } from '../training/interval-policy';
import { resistanceNumbers } from '../training/resistance-policy';
import { sessionShapeNumbers } from '../training/session-shape';

/** What a program sets beside the numbers of its ranges, by subject. */
export const trainingNumbers = {
  sessionShape: sessionShapeNumbers,
  intermittent: intermittentNumbers,
  intervals: intervalNumbers,
  resistance: resistanceNumbers,
  progression: progressionNumbers,
  staffing: staffingNumbers,
} as const satisfies Readonly<Record<string, PolicyNumbers>>;

export type TrainingSubject = keyof typeof trainingNumbers;

export type TrainingPolicy = {
  readonly [S in TrainingSubject]: PolicyValues<(typeof trainingNumbers)[S]>;
};

export const trainingSubjects = Object.keys(trainingNumbers) as TrainingSubject[];

/**
 * The numbers of a stored version.
 * @param stored by subject and key; what a version holds no number for, since it is older than that key, counts with
 * the published default
 */
export function trainingPolicyOf(
  stored: Readonly<Record<string, Readonly<Record<string, number>> | undefined>>,
): TrainingPolicy {
  const subjects = trainingSubjects.map((subject) => {
    const defaults: PolicyValues<PolicyNumbers> = defaultsOf(trainingNumbers[subject]);
    const own = stored[subject] ?? {};
    const values = Object.entries(defaults).map(
      ([key, usual]) => [key, own[key] ?? usual] as const,
    );
    return [subject, Object.fromEntries(values)] as const;
  });
  return Object.fromEntries(subjects) as TrainingPolicy;
}

export const defaultTrainingPolicy: TrainingPolicy = trainingPolicyOf({});
