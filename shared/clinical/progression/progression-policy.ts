import type { PolicyNumbers, PolicyValues } from '../policy-numbers';
import { defaultsOf } from '../policy-numbers';

const statement =
  'AACVPR statement on progression, J Cardiopulm Rehabil Prev 2018;38:139–146: duration before intensity, one at a time; the number is common practice';

/** What a program sets for the next step after a session. */
export const progressionNumbers = {
  sessionsNeeded: {
    label: 'Sessions in a row at the same work before more',
    unit: '',
    lowest: 1,
    highest: 6,
    default: 2,
    source: statement,
  },
  leastReadings: {
    label: 'Heart rates at work that a session must hold',
    unit: '',
    lowest: 1,
    highest: 6,
    default: 2,
    source: 'Plimsoll’s own, for reliability',
  },
  goalMinutes: {
    label: 'Duration to reach before work is raised within the range',
    unit: 'min',
    lowest: 20,
    highest: 60,
    default: 30,
    source: 'ACSM 20–60 min, from memory; duration before intensity, AACVPR 2018',
  },
  minutesStep: {
    label: 'Duration is raised by',
    unit: 'min',
    lowest: 1,
    highest: 10,
    default: 5,
    source: 'ACSM: 5–10 min every one to two weeks, read in a secondary copy',
  },
  metsStep: {
    label: 'Work is raised by at most',
    unit: 'METs',
    lowest: 0.2,
    highest: 1,
    default: 0.5,
    source: 'Common practice, 0.5–1 MET',
  },
  mostIncrease: {
    label: 'Work is raised by at most this fraction of it',
    unit: '',
    lowest: 0.05,
    highest: 0.2,
    default: 0.1,
    source: 'Common practice, 5–10 %',
  },
  easierStep: {
    label: 'Work is lowered by',
    unit: 'METs',
    lowest: 0.2,
    highest: 1.5,
    default: 0.5,
    source: 'Common practice',
  },
  effortRoom: {
    label: 'Harder only with effort this far below its upper end',
    unit: '',
    lowest: 0,
    highest: 3,
    default: 1,
    source: 'Common practice',
  },
  rateRoom: {
    label: 'Harder only with every rate this far below the upper end and the ceiling',
    unit: 'bpm',
    lowest: 0,
    highest: 10,
    default: 3,
    source: 'Plimsoll’s own: the patient’s range ends 3 bpm below a ceiling that binds',
  },
  absenceDays: {
    label: 'After this long an absence the work is held',
    unit: 'days',
    lowest: 7,
    highest: 28,
    default: 14,
    source: 'Common practice',
  },
  repeatedSessions: {
    label: 'The same trouble in this many sessions is reviewed',
    unit: '',
    lowest: 2,
    highest: 5,
    default: 2,
    source: 'Common practice',
  },
} as const satisfies PolicyNumbers;

export type ProgressionPolicy = PolicyValues<typeof progressionNumbers>;
export const defaultProgressionPolicy: ProgressionPolicy = defaultsOf(progressionNumbers);
