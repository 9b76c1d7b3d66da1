import { drugFlagWords } from '@shared/clinical/drugs/drug';
import { questionnaires } from '@shared/clinical/questionnaires/questionnaires';
import { limitWords, restrictionWords } from '@shared/clinical/restrictions/restriction-limits';
import { ecgHindranceWords } from '@shared/clinical/thresholds/ecg-readable';
import { restrictionEffects } from '@shared/clinical/training/restrictions';
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
import { dosingWords } from '../entry-editor/treatment-forms';
import { cycleLength, footAndInch, pound } from '../entry-editor/units';
import { scoreWords } from '../lines/assessment-lines';

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
  conditions: ({ kind, value, since, evidence }) => ({
    title: conditionWords[kind],
    detail: line(
      conditionAnswerWords(kind)[value] ?? value,
      since !== null && `since ${formatLocalDate(since)}`,
      evidence,
    ),
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
  medications: ({
    name,
    salt,
    dose,
    schedule,
    times,
    flags,
    rateActing,
    startedOn,
    stoppedOn,
  }) => ({
    title: [name, salt, dose].filter(Boolean).join(' '),
    detail: line(
      schedule,
      times.map((time) => dosingWords[time]?.toLowerCase()).join(', '),
      ...flags.map((flag) => drugFlagWords[flag].toLowerCase()),
      rateActing !== null && `acts on the heart rate: ${rateActingWords[rateActing].toLowerCase()}`,
      stoppedOn !== null && `stopped ${formatLocalDate(stoppedOn)}`,
    ),
    date: startedOn,
  }),
  'medication-reviews': () => ({ title: 'List verified', detail: '', date: null }),
  devices: ({ icdStatus, icdZones, pacemaker, upperTrackingRate, checkedOn, ...pacing }) => ({
    title: icdWords[icdStatus],
    detail: line(
      ...icdZones.map(
        ({ rate, kind }) => `${zoneWords[kind]} from ${rate} bpm (${cycleLength.write(rate)} ms)`,
      ),
      icdStatus === 'present' && icdZones.length === 0 && 'zones not known',
      pacemaker && `paces${pacing.pacingMode === null ? '' : ` ${pacing.pacingMode}`}`,
      bpm(pacing.lowerRate, 'from'),
      bpm(upperTrackingRate, 'tracks up to'),
      bpm(pacing.upperSensorRate, 'sensor up to'),
    ),
    date: checkedOn,
  }),
  'exercise-tests': (test) => ({
    title: `Peak ${test.peakHeartRate} bpm, ${test.protocol}`,
    detail: line(
      testModeWords[test.mode],
      `ended by ${testEndWords[test.endedBy].toLowerCase()}`,
      test.effort === 'submaximal' && 'stopped before the limit',
      test.exerciseMinutes !== null && `${test.exerciseMinutes} min`,
      test.peakSystolic !== null &&
        `peak ${[test.peakSystolic, test.peakDiastolic].filter((each) => each !== null).join('/')} mmHg`,
      test.stages.length > 0 && `${test.stages.length} stages`,
      ...test.signs.map(({ kind, heartRate }) => `${signWords[kind]} from ${heartRate} bpm`),
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
  'risk-stratifications': ({ level, overrideReason, assessedOn, note }) => ({
    title: riskWords[level],
    detail: line(overrideReason !== null && `not by the criteria: ${overrideReason}`, note),
    date: assessedOn,
  }),
  'resting-ecgs': ({ hindrances, observedOn, note }) => ({
    title: hindrances.length > 0 ? 'Cannot show ischemia' : 'Can show ischemia',
    detail: line(...hindrances.map((each) => ecgHindranceWords[each]), note),
    date: observedOn,
  }),
  'chair-stands': ({ seconds, ending, performedOn }) => ({
    title: seconds === null ? 'Could not be done' : `${seconds} s`,
    detail: ending === 'standing-fifth-time' ? 'to the fifth standing' : 'to the fifth sitting',
    date: performedOn,
  }),
  restrictions: ({ kind, limit, diastolic, detail, orderedBy, orderedOn, until }) => ({
    title: [restrictionWords[kind], limitWords(kind, limit, diastolic)].filter(Boolean).join(' '),
    detail: line(
      detail,
      `ordered by ${orderedBy}`,
      until === null ? 'until it is lifted' : `until ${formatLocalDate(until)}`,
      restrictionEffects[kind].words,
    ),
    date: orderedOn,
  }),
  questionnaires: ({ instrument, answers, answeredOn }) => ({
    title: questionnaires[instrument].name,
    detail: scoreWords(instrument, answers) ?? 'not enough answers for a score',
    date: answeredOn,
  }),
};

const signWords: Readonly<Record<string, string>> = {
  'st-change': 'ST change',
  angina: 'angina',
  arrhythmia: 'arrhythmia',
};

export const entryWords = <K extends RecordKind>(kind: K, values: Values<K>): EntryWords =>
  words[kind](values);
