import type { PrescriptionFact } from '@shared/clinical/prescribing/effect-of-fact';

const words: Partial<Readonly<Record<PrescriptionFact, string>>> = {
  'rhythm-changed': 'Your heart rhythm has changed',
  'device-changed': 'Your heart device was set anew',
  'threshold-added': 'We found a new limit for you',
  'cardiac-event': 'Something has happened with your heart',
  procedure: 'You had a procedure',
  syncope: 'You fainted',
};

/** What has changed, in words for the patient; whatever concerns a drug is "a heart medicine". */
export const changeWords = (fact: PrescriptionFact): string =>
  words[fact] ?? 'A heart medicine was changed';
