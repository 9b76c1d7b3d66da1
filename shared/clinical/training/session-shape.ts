import type { PolicyNumbers, PolicyValues } from '../policy-numbers';
import { defaultsOf } from '../policy-numbers';

/** Frequency, duration, warm-up and cool-down, as a plan begins with them. */
export const sessionShapeNumbers = {
  supervisedPerWeek: {
    label: 'Supervised sessions a week',
    unit: '',
    lowest: 1,
    highest: 5,
    default: 3,
    source: 'Three a week is usual; common practice',
  },
  homePerWeek: {
    label: 'Home sessions a week',
    unit: '',
    lowest: 0,
    highest: 6,
    default: 2,
    source: 'To reach most days of the week; common practice',
  },
  conditioningMinutes: {
    label: 'Conditioning, to begin with',
    unit: 'min',
    lowest: 10,
    highest: 60,
    default: 20,
    source: 'ACSM 20–60 min, from memory; 20–45 in Australian guidance (RACGP HANDI)',
  },
  warmUpMinutes: {
    label: 'Warm-up',
    unit: 'min',
    lowest: 5,
    highest: 20,
    default: 10,
    source: '5–10 min (RACGP HANDI); longer after transplant',
  },
  coolDownMinutes: {
    label: 'Cool-down',
    unit: 'min',
    lowest: 5,
    highest: 20,
    default: 10,
    source: '5–10 min (RACGP HANDI); longer after transplant',
  },
} as const satisfies PolicyNumbers;

export type SessionShapePolicy = PolicyValues<typeof sessionShapeNumbers>;
export const defaultSessionShape: SessionShapePolicy = defaultsOf(sessionShapeNumbers);
