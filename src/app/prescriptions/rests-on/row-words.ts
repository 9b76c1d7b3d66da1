import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import { conditionKinds } from '@shared/contracts/record-lists';
import {
  conditionAnswerWords,
  conditionWords,
  icdWords,
  rateActingWords,
  rhythmWords,
  riskWords,
  sexWords,
  testEndWords,
  thresholdWords,
  zoneWords,
} from '../../ui/words/clinical-words';
import { percentRange, rangeText } from '../../ui/words/prescription-words';
import type { RowId } from './rows';

/** A fact in words: its heavy value, a small unit, and lines below. */
export interface RowWords {
  readonly value: string;
  readonly unit?: string;
  readonly lines?: readonly string[];
  readonly tone?: 'over';
}

type Of<K extends RowId> = (
  inputs: PrescriptionRequest,
  answer: PrescriptionAnswer | null,
) => RowWords & { readonly of?: K };

const dash = '–';
const shown = (value: number | string | null | undefined): string =>
  value === null || value === undefined || value === '' ? dash : String(value);
const wordOf = (words: Readonly<Record<string, string>>, key: string | null): string =>
  words[key ?? ''] ?? dash;

const none: RowWords = { value: 'none' };

const resting: Of<'resting'> = ({ resting: { seated, standing, spread } }) => ({
  value: shown(seated),
  unit: 'bpm',
  lines: [
    ...(standing === null ? [] : [`Standing ${shown(standing)} bpm`]),
    ...(spread === null ? [] : [`Varies by ${shown(spread)} bpm`]),
  ],
});

const test: Of<'test'> = ({ test: given }) => {
  if (given === null) return none;
  const { peakHeartRate, peakVo2, peakMets, vo2Source, daysAgo, endedBy } = given;
  const work =
    peakVo2 !== null
      ? `${shown(peakVo2)} mL/kg/min ${shown(vo2Source)}`
      : peakMets !== null && `${shown(peakMets)} METs ${shown(vo2Source)}`;
  return {
    value: shown(peakHeartRate),
    unit: 'bpm peak',
    lines: [
      `${shown(daysAgo)} days ago, ended by ${wordOf(testEndWords, endedBy).toLowerCase()}${work ? ` · ${work}` : ''}`,
      ...(given.sameRateActingDrugs ? [] : ['Not on today’s drugs and doses']),
      ...(given.sameRhythmAndDevice ? [] : ['Rhythm or device changed since']),
      ...(given.eventSince ? ['An event or procedure since'] : []),
    ],
  };
};

const thresholds: Of<'thresholds'> = ({ thresholds: found }) => {
  const [first] = found;
  if (!first) return { value: 'none known' };
  return {
    value: found.map(({ heartRate }) => shown(heartRate)).join(', '),
    unit: 'bpm',
    tone: 'over',
    lines: found.map(({ kind, heartRate, clearMets }) => {
      const clear = clearMets === null ? '' : `, clear to ${shown(clearMets)} METs`;
      return `${wordOf(thresholdWords, kind)} from ${shown(heartRate)}${clear}`;
    }),
  };
};

const rateActing: Of<'rateActingDrugs'> = ({ rateActingDrugs: drugs }) => {
  if (drugs === null) return { value: 'not known', lines: ['Counts as taking one'] };
  if (drugs.length === 0) return none;
  return { value: drugs.map((drug) => rateActingWords[drug]).join(', ') };
};

const devices: Of<'devices'> = ({ devices: { icd, upperTrackingRate } }) => ({
  value: wordOf(icdWords, icd.status),
  lines: [
    ...icd.zones.map(({ rate, kind }) => `${wordOf(zoneWords, kind)} from ${shown(rate)} bpm`),
    ...(icd.status === 'present' && icd.zones.length === 0 ? ['Detection rates not known'] : []),
    ...(upperTrackingRate === null ? [] : [`Upper tracking rate ${shown(upperTrackingRate)} bpm`]),
  ],
});

const conditions: Of<'conditions'> = ({ conditions: given }) => {
  const held = conditionKinds.flatMap((kind) => {
    const answer = given[kind] as string | boolean | null;
    if (answer === true) return [conditionWords[kind]];
    if (answer === false || answer === 'none') return [];
    if (answer === null) return [`${conditionWords[kind]}: not answered`];
    return [`${conditionWords[kind]}: ${wordOf(conditionAnswerWords(kind), answer).toLowerCase()}`];
  });
  return held.length === 0 ? none : { value: String(held.length), lines: held };
};

const poundsPerKilogram = 2.20462262;

const body: Of<'patient'> = ({ patient: { ageYears, sexAtBirth, heightCm, weightKg } }) => ({
  value: shown(ageYears),
  unit: 'years',
  lines: [
    [
      wordOf(sexWords, sexAtBirth),
      heightCm === null ? 'height not known' : `${shown(heightCm)} cm`,
      typeof weightKg === 'number'
        ? `${weightKg} kg (${Math.round(weightKg * poundsPerKilogram)} lb)`
        : 'weight not known',
    ].join(' · '),
  ],
});

const observed: Of<'observedWork'> = ({ observedWork: work }) =>
  work === null
    ? none
    : {
        value: shown(work.medianHeartRate),
        unit: 'bpm',
        lines: [`${shown(work.sessions)} sessions, effort ${rangeText(work.perceivedExertion)}`],
      };

const ofPolicy = (answer: PrescriptionAnswer | null): string[] =>
  answer ? [`Policy ${answer.policyVersion}`] : [];

const words: { readonly [K in RowId]: Of<K> } = {
  resting,
  test,
  thresholds,
  rateActingDrugs: rateActing,
  rhythm: ({ rhythm }) => ({ value: wordOf(rhythmWords, rhythm) }),
  devices,
  risk: ({ risk, programWeek }) => ({
    value: wordOf(riskWords, risk),
    lines: [`Week ${shown(programWeek)} of the program`],
  }),
  conditions,
  patient: body,
  observedWork: observed,
  walkTest: ({ walkTest: walk }) =>
    walk === null ? none : { value: shown(walk.distanceMeters), unit: 'm' },
  intensity: ({ intensity }, answer) =>
    intensity === null
      ? {
          value: answer ? percentRange(answer.intensity) : 'policy',
          lines: ['of heart-rate reserve', ...ofPolicy(answer)],
        }
      : { value: percentRange(intensity), lines: ['of heart-rate reserve, set here'] },
  percentOfPeak: ({ percentOfPeak }, answer) =>
    percentOfPeak === null
      ? { value: 'policy', lines: ['Used by its own method alone', ...ofPolicy(answer)] }
      : { value: percentRange(percentOfPeak), lines: ['of the measured peak, set here'] },
};

/**
 * What a row says of the inputs.
 * @param inputs in the shape of a request, whole or with fields that hold nothing, or no number, yet
 */
export const rowWords = (id: RowId, inputs: unknown, answer: PrescriptionAnswer | null): RowWords =>
  words[id](inputs as PrescriptionRequest, answer);
