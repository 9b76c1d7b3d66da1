import type { PolicyNumbers, PolicyValues } from '../policy-numbers';
import { defaultsOf } from '../policy-numbers';

const aha = 'AHA statement on resistance exercise (Williams 2007); from memory';
const dach = 'German–Austrian–Swiss 2021, PMC8306118, Table 4';
const sternum = 'Sternal precautions; practice varies from 6 to 12 weeks, from memory';
const device = 'ACSM: 4–6 weeks after implantation, read in a secondary copy';

const weeks = (label: string, bounds: readonly [number, number, number], source: string) => ({
  label,
  unit: 'weeks',
  lowest: bounds[0],
  highest: bounds[1],
  default: bounds[2],
  source,
});

/** What a program sets for resistance exercise. A surgeon's or physician's order wins. */
export const resistanceNumbers = {
  afterSternotomy: weeks('Any resistance, after sternotomy', [3, 8, 5], aha),
  upperAfterSternotomy: weeks('Full arm and chest loads, after sternotomy', [8, 16, 12], sternum),
  afterInfarction: weeks('Any resistance, after infarction', [3, 8, 5], aha),
  afterStent: weeks('Any resistance, after a stent', [2, 6, 3], aha),
  afterDevice: weeks('Loads on the device arm, after implantation', [4, 8, 6], device),
  supervisedFirst: weeks('Supervised endurance training before', [1, 6, 2], aha),
  lightLoad: {
    label: 'Light load while a sternum heals',
    unit: 'kg',
    lowest: 0.5,
    highest: 4.5,
    default: 3.6,
    source: `${sternum}: 5–8 lb`,
  },
  deviceLoad: {
    label: 'Light load on a new device’s side, below the shoulder',
    unit: 'kg',
    lowest: 0.5,
    highest: 4.5,
    default: 4.5,
    source: 'Under 10 lb on the device side; common practice',
  },
  upperStart: {
    label: 'First arm load, of the one-repetition maximum',
    unit: '',
    lowest: 0.2,
    highest: 0.5,
    default: 0.3,
    source: `${dach}: 30–50 %; AHA 30–40 % for the arms, from memory`,
  },
  lowerStart: {
    label: 'First leg load, of the one-repetition maximum',
    unit: '',
    lowest: 0.3,
    highest: 0.6,
    default: 0.5,
    source: `${dach}: 30–50 %; AHA 50–60 % for the legs, from memory`,
  },
  leastRepetitions: {
    label: 'Repetitions, from',
    unit: '',
    lowest: 5,
    highest: 12,
    default: 10,
    source: dach,
  },
  mostRepetitions: {
    label: 'Repetitions, to',
    unit: '',
    lowest: 8,
    highest: 20,
    default: 15,
    source: dach,
  },
  mostSets: { label: 'Sets, up to', unit: '', lowest: 1, highest: 4, default: 3, source: dach },
  highestEffort: {
    label: 'Highest effort, Borg 6–20',
    unit: '',
    lowest: 11,
    highest: 15,
    default: 13,
    source: `${dach}: 12–13 in the first stage`,
  },
  loadStep: {
    label: 'A load is raised by',
    unit: '',
    lowest: 0.02,
    highest: 0.1,
    default: 0.05,
    source: '5–10 % in a trial after sternotomy (protocol, Trials 2020, s13063-020-04558-x)',
  },
} as const satisfies PolicyNumbers;

export type ResistancePolicy = PolicyValues<typeof resistanceNumbers>;
export const defaultResistancePolicy: ResistancePolicy = defaultsOf(resistanceNumbers);
