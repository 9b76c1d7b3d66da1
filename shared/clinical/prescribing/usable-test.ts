import type { ExerciseTest, TestEnding } from './request';
import type { PrescriptionPolicy } from './policy';

/** How a test may end so that its peak is a cardiac one. */
const cardiacEndings: ReadonlySet<TestEnding> = new Set<TestEnding>([
  'fatigue',
  'dyspnea',
  'angina',
  'st-change',
  'arrhythmia',
  'blood-pressure',
]);

const endingWords: Readonly<Record<TestEnding, string>> = {
  fatigue: 'fatigue',
  dyspnea: 'dyspnea',
  angina: 'angina',
  'st-change': 'ST change',
  arrhythmia: 'arrhythmia',
  'blood-pressure': 'blood pressure',
  claudication: 'claudication',
  orthopedic: 'an orthopedic complaint',
  'protocol-end': 'the end of the protocol',
  'target-rate': 'a target rate',
  other: 'another cause',
};

/**
 * Why a test's peak is no cardiac peak of today's heart, whatever the drugs: its end, an event since, or its
 * age; null when it is one. Work may rest on such a test; heart rates ask for more.
 */
export function whyPeakNotAccepted(test: ExerciseTest, policy: PrescriptionPolicy): string | null {
  if (!cardiacEndings.has(test.endedBy)) {
    return `The test was ended by ${endingWords[test.endedBy]}, not by cardiac effort or a cardiac sign.`;
  }
  if (test.eventSince) return 'A cardiac event or procedure has happened since the test.';
  if (test.daysAgo > policy.test.validDays) {
    return `The test is older than ${policy.test.validDays} days.`;
  }
  return null;
}

/** A test whose heart rates are those of today's heart, or why there is none. */
export type TestFinding =
  | { readonly usable: true; readonly test: ExerciseTest }
  | { readonly usable: false; readonly why: string };

function whyNotUsable(test: ExerciseTest, policy: PrescriptionPolicy): string | null {
  if (!test.sameRateActingDrugs)
    return 'A rate-acting drug or its dose has changed since the test.';
  if (!test.sameRhythmAndDevice) {
    return 'The rhythm or the device settings have changed since the test.';
  }
  return whyPeakNotAccepted(test, policy);
}

export function findTest(test: ExerciseTest | null, policy: PrescriptionPolicy): TestFinding {
  if (test === null) return { usable: false, why: 'There is no exercise test.' };
  const why = whyNotUsable(test, policy);
  return why === null ? { usable: true, test } : { usable: false, why };
}
