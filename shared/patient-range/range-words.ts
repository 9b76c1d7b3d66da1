import type { CautionCode } from '../clinical/prescribing/answer';
import type { PrescriptionFact } from '../clinical/prescribing/effect-of-fact';

// What patients are told of the own range, on the page and on paper: short sentences, words of every day.

interface Ends {
  readonly lower: number;
  readonly upper: number;
}

/** "16 or 17", "16 to 18", or one number. */
export function countWords({ lower, upper }: Ends): string {
  if (lower === upper) return `${lower}`;
  return upper - lower === 1 ? `${lower} or ${upper}` : `${lower} to ${upper}`;
}

const changes: Partial<Readonly<Record<PrescriptionFact, string>>> = {
  'rhythm-changed': 'The beat of your heart has changed.',
  'device-changed': 'Your heart device was set anew.',
  'threshold-added': 'We learned something new about your heart when you exercise.',
  'cardiac-event': 'Something has changed with your heart.',
  procedure: 'You had a new treatment.',
  syncope: 'You fainted.',
  'plan-signature-overdue': 'Your doctor still has to sign your plan.',
  'dose-missed-today': 'You missed today’s dose.',
};

/** Why a range is being set anew, each sentence once; whatever concerns a drug is "a heart medicine". */
export const changeWords = (facts: readonly PrescriptionFact[]): string[] => [
  ...new Set(facts.map((fact) => changes[fact] ?? 'A heart medicine was changed.')),
];

/** What a missed dose means, to follow its sentence. */
export const todayWords = 'Today, go by how it feels. Your range counts again tomorrow.';

/** What follows from it, so that nobody is left to guess. */
export const reviewWords =
  'So your old range may not fit you now. This is usual. You can go on with exercise: go by how it feels until your team sets a new range with you.';

const cautions: Partial<Readonly<Record<CautionCode, string>>> = {
  'icd-rate-unknown': 'Bring the card of your heart device. We need its settings.',
  'physician-sets': 'Your doctor says how hard you may work. Do no more than that.',
  'no-valid-range': 'Keep the work easy. Your team will ask your doctor what is next.',
  'estimated-maximum': 'Your range is a good guess. If it feels too hard, slow down.',
  'icd-present': 'Your heart device may act if your heart beats too fast. Stay under your number.',
  'tracking-limit': 'If your pulse drops or you feel weak all at once, slow down and tell us.',
  'heart-rate-unreliable': 'Your pulse does not show how hard you work. Go by how it feels.',
  'silent-ischemia-possible':
    'You may not feel chest pain. If you are short of breath, sick or very tired, stop.',
  'claudication-leads': 'If your legs hurt, rest until it stops. Then go on.',
  'pressure-ceiling': 'Do not hold your breath, push hard or lift heavy things.',
  'oxygen-floor': 'If you are short of breath, slow down. We watch your oxygen.',
  'low-capacity': 'Work for a short time, rest, then go on.',
};

/** The cautions that concern what a patient does, in the order given. */
export const cautionWords = (codes: readonly CautionCode[]): string[] =>
  codes.flatMap((code) => cautions[code] ?? []);

/** How to count the pulse. */
export const pulseSteps: readonly string[] = [
  'Slow down, but keep your feet moving.',
  'Put two fingers on your wrist, below the thumb. Do not use your thumb.',
  'Count each beat for 10 seconds.',
];

export interface HomePlan {
  /** Sessions a week on days without a class; 0: none. */
  readonly perWeek: number;
  readonly warmUpMinutes: number;
  readonly coolDownMinutes: number;
}

/** What to do on days without a class. */
export function homeWords({ perWeek, warmUpMinutes, coolDownMinutes }: HomePlan): string[] {
  if (perWeek === 0) return ['Ask your team before you exercise at home.'];
  const days = perWeek === 1 ? '1 day' : `${perWeek} days`;
  return [
    `Ask your team first. Then aim for ${days} a week with no class.`,
    `Start slow for ${warmUpMinutes} minutes. Do your work as above. End slow for ${coolDownMinutes} minutes.`,
    'Do not go out if you feel ill, or if it is very hot or cold.',
  ];
}

/** What stops the work at once, and needs help. */
export const emergencyWords = (hasDefibrillator: boolean): string =>
  `Chest pain, fainting, trouble breathing${hasDefibrillator ? ', a shock from your device' : ''}`;
