import type { MachineSetting } from '@shared/clinical/progression/machine-setting';
import { watts } from '@shared/units';
import type { RowOf } from './row-of';

const treadmill = /^Treadmill ([\d.]+) mph, ([\d.]+) %$/;
const cycle = /^Cycle (\d+) W$/;
/** As long as the story lets a bout last. */
const boutMinutes = 12;

function settingIn(note: string | null | undefined): MachineSetting | null {
  const walk = treadmill.exec(note ?? '');
  if (walk) {
    return {
      modality: 'treadmill-walk',
      speedMph: Number(walk[1]),
      gradePercent: Number(walk[2]),
    };
  }
  const ride = cycle.exec(note ?? '');
  return ride && { modality: 'cycle', powerWatts: watts(Number(ride[1])) };
}

/** The work of a session as its readings' notes tell it: the machine of the first bout, for as long as all of them. */
export function workRow(
  readings: readonly RowOf<'vitalSigns'>[],
): RowOf<'exerciseBouts'> | undefined {
  const exercise = readings.filter(({ phase }) => phase === 'exercise');
  const [first] = exercise;
  const setting = settingIn(first?.note);
  return first && setting
    ? {
        id: first.id,
        sessionRecordId: first.sessionRecordId,
        patientId: first.patientId,
        setting,
        minutes: boutMinutes * exercise.length,
        shortBouts: false,
        receivedAt: first.receivedAt,
        recordedBy: first.recordedBy,
      }
    : undefined;
}
