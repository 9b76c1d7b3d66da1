import { computedFromTest } from '@shared/clinical/exercise-test/computed-from-test';
import type { ComputedValue, RecordedTest } from '@shared/clinical/exercise-test/recorded-test';
import type { TestMode } from '@shared/clinical/prescribing/request';
import { bpm, centimeters, kilograms, minutes, mmHg, vo2, watts } from '@shared/units';
import type { Line } from '../entry-editor/entry-form';
import {
  type LineContext,
  ageAt,
  bodyOn,
  dateOf,
  numberOf,
  standing,
  wordOf,
} from './line-context';

type Values = Readonly<Record<string, unknown>>;

const digitsOf: Readonly<Record<ComputedValue['unit'], number>> = {
  METs: 1,
  'mL/kg/min': 1,
  '%': 0,
  bpm: 0,
  'bpm × mmHg': 0,
  '': 2,
};

const lineOf = ({ label, value, unit, judgment, source, why }: ComputedValue): Line => ({
  label,
  value: value === null ? null : `${value.toFixed(digitsOf[unit])} ${unit}`.trim(),
  judgment,
  isDue: judgment !== null && /^(abnormal|low)/.test(judgment),
  source,
  why,
});

/** The highest stage that was finished: by the time of exercise, else the last in which something was measured. */
export function lastFinished(stages: readonly Values[], time: number | null): Values | null {
  let ended = 0;
  const finished = stages.filter((stage) => {
    ended += numberOf(stage, 'minutes') ?? 0;
    return time === null ? wasDone(stage) : ended <= time + 1e-6;
  });
  return finished.at(-1) ?? null;
}

const measured = ['heartRate', 'systolic', 'diastolic', 'exertion'] as const;

/** Whether anything was measured in a stage. */
const wasDone = (stage: Values): boolean => measured.some((key) => stage[key] !== null);

/** The stages up to the last in which something was measured: a protocol's later ones were not done. */
export function doneStages(stages: readonly Values[]): Values[] {
  const last = stages.map(wasDone).lastIndexOf(true);
  return stages.slice(0, last + 1);
}

/** Whether a beta blocker was taken on the day: by the test's own list, else by the record once its list was verified. */
function onBetaBlocker(record: LineContext['record'], date: string): boolean | null {
  const taken = standing(record, 'medications').some(
    ({ values }) =>
      values.rateActing === 'beta-blocker' &&
      values.startedOn <= date &&
      (values.stoppedOn === null || values.stoppedOn > date),
  );
  if (taken) return true;
  return standing(record, 'medication-reviews').length > 0 ? false : null;
}

const ifNumber = <Q>(value: number | null, make: (value: number) => Q): Q | null =>
  value === null ? null : make(value);

function settingOf(stage: Values | null): RecordedTest['lastSetting'] {
  if (stage === null) return null;
  const [speedMph, gradePercent] = [numberOf(stage, 'speedMph'), numberOf(stage, 'gradePercent')];
  return speedMph === null || gradePercent === null ? null : { speedMph, gradePercent };
}

function recoveryOf(values: Values): RecordedTest['recovery'] {
  const rates = [numberOf(values, 'recoveryOne'), numberOf(values, 'recoveryTwo')];
  return rates.flatMap((rate, index) =>
    rate === null
      ? []
      : [{ minute: index === 0 ? (1 as const) : (2 as const), heartRate: bpm(rate) }],
  );
}

function recordedTest(values: Values, context: LineContext, age: number): RecordedTest {
  const date = dateOf(values, 'performedOn', context);
  const time = numberOf(values, 'exerciseMinutes');
  const last = lastFinished((values['stages'] as Values[] | undefined) ?? [], time);
  const { record, patient } = context;
  return {
    protocol: wordOf(values, 'protocolKind') ?? 'other',
    mode: wordOf<TestMode>(values, 'mode') ?? 'treadmill',
    ageYears: age,
    sexAtBirth: patient?.sexAtBirth ?? 'unknown',
    height: ifNumber(bodyOn(record, 'heightCm', date), centimeters),
    weight: ifNumber(bodyOn(record, 'weightKg', date), kilograms),
    time: ifNumber(time, minutes),
    lastSetting: settingOf(last),
    lastPower: last && ifNumber(numberOf(last, 'powerWatts'), watts),
    gait: wordOf(values, 'gait'),
    handrail: typeof values['handrail'] === 'boolean' ? values['handrail'] : null,
    restingHeartRate: ifNumber(numberOf(values, 'restingHeartRate'), bpm),
    peakHeartRate: ifNumber(numberOf(values, 'peakHeartRate'), bpm),
    peakSystolic: ifNumber(numberOf(values, 'peakSystolic'), mmHg),
    recovery: recoveryOf(values),
    posture: wordOf(values, 'recoveryPosture'),
    effort: wordOf(values, 'effort'),
    onBetaBlocker: onBetaBlocker(record, date),
    measuredVo2:
      values['vo2Source'] === 'measured' ? ifNumber(numberOf(values, 'peakVo2'), vo2) : null,
  };
}

/** All that a test comes to; [] before a mode is chosen. */
export function testLines(values: Values, context: LineContext): Line[] {
  const age = ageAt(context, dateOf(values, 'performedOn', context));
  if (age === null || wordOf(values, 'mode') === null) return [];
  return computedFromTest(recordedTest(values, context, age)).map(lineOf);
}
