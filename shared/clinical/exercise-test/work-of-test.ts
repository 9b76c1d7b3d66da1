import type { Vo2 } from '../../units';
import { metsOf, speedOfMph } from '../../units';
import { equationSource, handrailNote } from '../gait';
import { metsOfHeartRateIndex } from '../heart-rate-index';
import { armCyclingPowerInRange, armCyclingVo2 } from '../metabolic-equations';
import type { ComputedValue, RecordedTest } from './recorded-test';
import { found, notFound } from './recorded-test';
import type { StageWork } from './stage-uptake';
import { cycleStageWork, fosterPeakVo2, kokkinosPeakVo2, treadmillStageWork } from './stage-uptake';
import { treadmillTimeEstimates } from './time-estimates';

const outside = 'Outside the validated range of the equation: an extrapolation.';

const stagePart = {
  key: 'stage-work',
  label: 'Work of the last finished stage',
  unit: 'METs',
  source: equationSource,
} as const;

type Found<T> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly why: string };

function treadmillWork({ lastSetting, gait }: RecordedTest): Found<StageWork> {
  if (lastSetting === null) return { ok: false, why: 'The last finished stage is not recorded.' };
  if (gait === null) return { ok: false, why: 'Say whether the patient walked or ran.' };
  return { ok: true, value: treadmillStageWork(lastSetting, gait) };
}

function ergometerWork({ lastPower, weight, mode }: RecordedTest): Found<StageWork> {
  if (lastPower === null) return { ok: false, why: 'The last finished stage is not recorded.' };
  if (weight === null) return { ok: false, why: 'The weight is not known.' };
  if (mode === 'cycle') return { ok: true, value: cycleStageWork(lastPower, weight) };
  const vo2 = armCyclingVo2(lastPower, weight);
  return {
    ok: true,
    value: {
      vo2,
      mets: metsOf(vo2),
      withinEquationRange: armCyclingPowerInRange(lastPower),
      source: equationSource,
    },
  };
}

/** Work of the last finished stage by the metabolic equation, or why there is none. */
const lastWork = (test: RecordedTest): Found<StageWork> =>
  test.mode === 'treadmill' ? treadmillWork(test) : ergometerWork(test);

function stageWork(test: RecordedTest): ComputedValue {
  const work = lastWork(test);
  if (!work.ok) return notFound(stagePart, work.why);
  const { mets, withinEquationRange } = work.value;
  const why = test.handrail === true ? handrailNote : withinEquationRange ? null : outside;
  return found(stagePart, mets, null, why);
}

const fosterPart = {
  key: 'peak-foster',
  label: 'Peak from the last stage, corrected',
  unit: 'METs',
  source: 'Foster et al. Med Sci Sports Exerc 1996;28:752–756',
} as const;

/** Foster's peak; null without a last stage, its gait, or word of the handrail. */
function fosterPeak(test: RecordedTest): Vo2 | null {
  const work = treadmillWork(test);
  return work.ok && test.handrail !== null ? fosterPeakVo2(work.value.vo2, test.handrail) : null;
}

function fosterValue(test: RecordedTest): ComputedValue {
  const work = treadmillWork(test);
  if (!work.ok) return notFound(fosterPart, work.why);
  const peak = fosterPeak(test);
  return peak === null
    ? notFound(fosterPart, 'Say whether the handrail was held.')
    : found(fosterPart, metsOf(peak));
}

const kokkinosPart = {
  key: 'peak-friend',
  label: 'Peak from the last stage, registry equation',
  unit: 'METs',
  source: 'FRIEND treadmill equation, Kokkinos 2017',
} as const;

function kokkinosValue({ lastSetting, handrail }: RecordedTest): ComputedValue {
  if (lastSetting === null) {
    return notFound(kokkinosPart, 'The last finished stage is not recorded.');
  }
  if (handrail === true) return notFound(kokkinosPart, 'Not when the handrail was held.');
  const speed = speedOfMph(lastSetting.speedMph);
  return found(kokkinosPart, metsOf(kokkinosPeakVo2(speed, lastSetting.gradePercent / 100)));
}

function timeValues({ protocol, sexAtBirth, time, handrail }: RecordedTest): ComputedValue[] {
  if (time === null) return [];
  return treadmillTimeEstimates({ protocol, sexAtBirth, time, handrail: handrail === true }).map(
    ({ label, source, mets, why }, index) => {
      const part = {
        key: `time-${index + 1}`,
        label: `${label}, from time`,
        unit: 'METs',
        source,
      } as const;
      return mets === null ? notFound(part, why ?? '') : found(part, mets);
    },
  );
}

const indexPart = {
  key: 'heart-rate-index',
  label: 'Peak from the heart-rate index',
  unit: 'METs',
  source: 'Wicks et al. Med Sci Sports Exerc 2011;43:2005–2012; from memory',
} as const;

function indexValue({
  peakHeartRate,
  restingHeartRate,
  onBetaBlocker,
}: RecordedTest): ComputedValue {
  if (peakHeartRate === null || restingHeartRate === null) {
    return notFound(indexPart, 'The resting or the peak rate is not recorded.');
  }
  return onBetaBlocker === false
    ? found(indexPart, metsOfHeartRateIndex(peakHeartRate, restingHeartRate))
    : notFound(indexPart, 'Not on a beta blocker, nor when it is not known.');
}

/** The peak on which a comparison rests: measured, else corrected from the last treadmill stage, else of the ergometer. */
export function peakOfTest(test: RecordedTest): { readonly vo2: Vo2; readonly how: string } | null {
  if (test.measuredVo2 !== null) return { vo2: test.measuredVo2, how: 'measured' };
  if (test.mode === 'treadmill') {
    const foster = fosterPeak(test);
    return foster === null ? null : { vo2: foster, how: 'estimated from the last stage' };
  }
  const work = ergometerWork(test);
  return work.ok ? { vo2: work.value.vo2, how: 'estimated from the last stage' } : null;
}

/** What the test's work comes to, every estimate beside its source. */
export const workOfTest = (test: RecordedTest): ComputedValue[] => [
  stageWork(test),
  ...(test.mode === 'treadmill' ? [fosterValue(test), kokkinosValue(test)] : []),
  ...timeValues(test),
  indexValue(test),
];
