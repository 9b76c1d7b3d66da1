import type { PatientRecord, RecordKind } from '@shared/contracts/record-contract';
import {
  conditionAnswerWords,
  conditionWords,
  diagnosisWords,
  eventWords,
  icdWords,
  rateActingWords,
  rhythmWords,
  riskWords,
  testEndWords,
  testModeWords,
  thresholdWords,
  zoneWords,
} from '../../ui/words/clinical-words';
import { formatLocalDate } from '../../ui/words/dates';
import { footAndInch, pound } from '../entry-editor/units';

/** How an entry reads in a list. */
export interface EntryWords {
  readonly title: string;
  readonly detail: string;
  /** Of when it is, YYYY-MM-DD; null: of when it was recorded. */
  readonly date: string | null;
}

type Values<K extends RecordKind> = PatientRecord[K][number]['values'];

/** The parts that are there, as one line. */
const line = (...parts: (string | null | false | undefined)[]): string =>
  parts.filter(Boolean).join(' · ');

const bpm = (rate: number | null, what: string): string | null =>
  rate === null ? null : `${what} ${rate} bpm`;

const words: { readonly [K in RecordKind]: (values: Values<K>) => EntryWords } = {
  diagnoses: ({ kind, description, onsetOn }) => ({
    title: description,
    detail: diagnosisWords[kind],
    date: onsetOn,
  }),
  conditions: ({ kind, value }) => ({
    title: conditionWords[kind],
    detail: conditionAnswerWords(kind)[value] ?? value,
    date: null,
  }),
  'clinical-events': ({ kind, description, occurredOn }) => ({
    title: eventWords[kind],
    detail: description,
    date: occurredOn,
  }),
  'body-measurements': ({ weightKg, heightCm, measuredOn }) => ({
    title: line(
      weightKg !== null && `${Number(weightKg.toFixed(1))} kg (${pound.write(weightKg)} lb)`,
      heightCm !== null && `${Number(heightCm.toFixed(1))} cm (${footAndInch.write(heightCm)})`,
    ),
    detail: '',
    date: measuredOn,
  }),
  rhythms: ({ rhythm, observedOn }) => ({
    title: rhythmWords[rhythm],
    detail: '',
    date: observedOn,
  }),
  'resting-rates': ({ seated, standing, measuredOn }) => ({
    title: `${seated} bpm seated`,
    detail: bpm(standing, 'Standing') ?? '',
    date: measuredOn,
  }),
  medications: ({ name, dose, schedule, rateActing, startedOn, stoppedOn }) => ({
    title: `${name} ${dose}`,
    detail: line(
      schedule,
      rateActing !== null && `acts on the heart rate: ${rateActingWords[rateActing].toLowerCase()}`,
      stoppedOn !== null && `stopped ${formatLocalDate(stoppedOn)}`,
    ),
    date: startedOn,
  }),
  'medication-reviews': () => ({ title: 'List verified', detail: '', date: null }),
  devices: ({ icdStatus, icdZones, pacemaker, upperTrackingRate, checkedOn }) => ({
    title: icdWords[icdStatus],
    detail: line(
      ...icdZones.map(({ rate, kind }) => `${zoneWords[kind]} from ${rate} bpm`),
      icdStatus === 'present' && icdZones.length === 0 && 'zones not known',
      pacemaker && 'paces',
      bpm(upperTrackingRate, 'tracks up to'),
    ),
    date: checkedOn,
  }),
  'exercise-tests': (test) => ({
    title: `Peak ${test.peakHeartRate} bpm, ${test.protocol}`,
    detail: line(
      testModeWords[test.mode],
      `ended by ${testEndWords[test.endedBy].toLowerCase()}`,
      test.peakVo2 !== null && `VO2 ${test.peakVo2} mL/kg/min`,
      test.peakMets !== null && `${test.peakMets} METs`,
      test.vo2Source,
      bpm(test.restingHeartRate, 'resting'),
      test.note,
    ),
    date: test.performedOn,
  }),
  thresholds: ({ kind, heartRate, clearMets, exerciseTestId, foundOn, note }) => ({
    title: `${thresholdWords[kind]} at ${heartRate} bpm`,
    detail: line(
      exerciseTestId === null ? 'Found on the floor' : 'Found in a test',
      clearMets !== null && `clear up to ${clearMets} METs`,
      note,
    ),
    date: foundOn,
  }),
  'walk-tests': ({ distanceMeters, performedOn }) => ({
    title: `${distanceMeters} m in 6 minutes`,
    detail: '',
    date: performedOn,
  }),
  'risk-stratifications': ({ level, assessedOn, note }) => ({
    title: riskWords[level],
    detail: note ?? '',
    date: assessedOn,
  }),
};

export const entryWords = <K extends RecordKind>(kind: K, values: Values<K>): EntryWords =>
  words[kind](values);
