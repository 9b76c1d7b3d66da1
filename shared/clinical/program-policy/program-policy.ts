import type { PrescriptionPolicy } from '../prescribing/policy';
import { defaultPolicy } from '../prescribing/policy';
import type { PolicyKey } from '../prescribing/policy-keys';
import { policyKeys, policyValue } from '../prescribing/policy-keys';
import { policyKeysOf } from '../policy-numbers';
import {
  type TrainingPolicy,
  type TrainingSubject,
  defaultTrainingPolicy,
  trainingNumbers,
  trainingPolicyOf,
  trainingSubjects,
} from './training-policy';

/** Everything that a program sets: what the engine of ranges works by, and the rest by subject. */
export interface ProgramPolicy {
  readonly prescribing: PrescriptionPolicy;
  readonly training: TrainingPolicy;
}

export const defaultProgramPolicy: ProgramPolicy = {
  prescribing: defaultPolicy,
  training: defaultTrainingPolicy,
};

/** Each number of a policy by its key. */
export type PolicyValuesByKey = Readonly<Record<string, number>>;

export type PolicySubject = 'prescribing' | TrainingSubject;

/** A subject as people read it. */
export interface PolicyChapter {
  readonly subject: PolicySubject;
  readonly title: string;
  readonly keys: readonly PolicyKey[];
}

const trainingTitles: Readonly<Record<TrainingSubject, string>> = {
  sessionShape: 'Sessions: frequency, duration, warm-up',
  intermittent: 'Intermittent bouts for low capacity',
  intervals: 'Intervals',
  resistance: 'Resistance exercise',
  progression: 'The next step after a session',
  staffing: 'Staff for a class',
};

/** Every number that a program sets, by subject and in the order of reading. */
export const policyChapters: readonly PolicyChapter[] = [
  { subject: 'prescribing', title: 'Heart-rate ranges', keys: policyKeys },
  ...trainingSubjects.map((subject) => ({
    subject,
    title: trainingTitles[subject],
    keys: policyKeysOf(subject, trainingNumbers[subject]),
  })),
];

/** The same in one list. */
export const programPolicyKeys: readonly PolicyKey[] = policyChapters.flatMap(({ keys }) => keys);

const engineKeys = new Set(policyKeys.map(({ key }) => key));

/** Whether a number decides ranges; the others change no range that stands. */
export const decidesRanges = (key: string): boolean => engineKeys.has(key);

/** Each number of the policy by its key. */
export function valuesOf({ prescribing, training }: ProgramPolicy): PolicyValuesByKey {
  const engine = policyKeys.map(({ key }) => [key, policyValue(prescribing, key)] as const);
  const rest = Object.entries(training).flatMap(([subject, numbers]) =>
    Object.entries(numbers).map(([key, value]) => [`${subject}.${key}`, value] as const),
  );
  return Object.fromEntries([...engine, ...rest]);
}

type Tree = { [name: string]: number | Tree };

function put(tree: Tree, [name = '', ...below]: readonly string[], value: number): void {
  if (below.length === 0) {
    tree[name] = value;
    return;
  }
  const branch = tree[name];
  const next = typeof branch === 'object' ? branch : {};
  tree[name] = next;
  put(next, below, value);
}

function treeOf(values: PolicyValuesByKey, keys: readonly PolicyKey[]): Tree {
  const tree: Tree = {};
  for (const { key } of keys) {
    const value = values[key];
    if (value === undefined) throw new RangeError(key);
    put(tree, key.split('.'), value);
  }
  return tree;
}

/**
 * The policy of a version.
 * @param values a number at every key; whether they are within bounds is not looked at
 * @throws RangeError with the key when one is missing
 */
export function policyOf(values: PolicyValuesByKey, version: number): ProgramPolicy {
  const prescribing = { version, ...treeOf(values, policyKeys) };
  const rest = policyChapters.slice(1).flatMap(({ keys }) => keys);
  return {
    prescribing: prescribing as unknown as PrescriptionPolicy,
    training: trainingPolicyOf(treeOf(values, rest) as Record<string, Record<string, number>>),
  };
}
