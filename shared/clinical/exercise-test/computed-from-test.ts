import { chronotropicIndex, chronotropicSource, isIndexLow } from '../chronotropic-index';
import { foxMaximum } from '../maximum-heart-rate';
import { ratePressureProduct } from '../rate-pressure-product';
import { heartRateRecovery, isRecoveryAbnormal, recoveryCriterionFor } from './heart-rate-recovery';
import {
  friend2017Source,
  friend2017Vo2,
  friend2018Source,
  friend2018Vo2,
  percentOfPredicted,
} from './predicted-capacity';
import type { ComputedValue, RecordedTest } from './recorded-test';
import { found, notFound } from './recorded-test';
import { peakOfTest, workOfTest } from './work-of-test';

function percentPredicted(test: RecordedTest): ComputedValue {
  const { ageYears, sexAtBirth, height, weight, mode } = test;
  const part = {
    key: 'percent-of-predicted',
    label: 'Capacity, of predicted',
    unit: '%',
    source: mode === 'cycle' ? friend2018Source : friend2017Source,
  } as const;
  if (mode === 'arm') return notFound(part, 'No prediction for arm work.');
  if (sexAtBirth === 'unknown') return notFound(part, 'The prediction asks for the sex at birth.');
  if (weight === null) return notFound(part, 'The weight is not known.');
  if (mode === 'cycle' && height === null) return notFound(part, 'The height is not known.');
  const peak = peakOfTest(test);
  if (peak === null) return notFound(part, 'There is neither a measured nor an estimated peak.');
  const facts = { ageYears, sexAtBirth, weight };
  const predicted =
    mode === 'cycle' && height !== null
      ? friend2018Vo2(facts, height, 'cycle')
      : friend2017Vo2(facts);
  const percent = percentOfPredicted(peak.vo2, predicted);
  return percent === null
    ? notFound(part, 'The prediction does not reach this age and weight.')
    : found(part, percent, null, `The peak is ${peak.how}.`);
}

function recoveries({ recovery, peakHeartRate, posture, effort }: RecordedTest): ComputedValue[] {
  return recovery.map(({ minute, heartRate }) => {
    const criterion = recoveryCriterionFor({ minute, posture, effort });
    const part = {
      key: `recovery-${minute}`,
      label: `Heart-rate recovery, ${minute} min`,
      unit: 'bpm',
      source: criterion?.source ?? 'Peak less the rate after the minute',
    } as const;
    if (peakHeartRate === null) return notFound(part, 'The peak rate is not recorded.');
    const fall = heartRateRecovery(peakHeartRate, heartRate);
    if (criterion === null) {
      return found(
        part,
        fall,
        null,
        'No cut-off for this posture and effort, or one is not recorded.',
      );
    }
    const { abnormalTo } = criterion;
    const judgment = isRecoveryAbnormal(fall, criterion)
      ? `abnormal: ${Number(abnormalTo)} or less`
      : `normal: above ${Number(abnormalTo)}`;
    return found(part, fall, judgment);
  });
}

const chronotropicPart = {
  key: 'chronotropic-index',
  label: 'Chronotropic index',
  unit: '',
  source: `${chronotropicSource}; predicted by 220 − age`,
} as const;

function chronotropic(test: RecordedTest): ComputedValue {
  const { restingHeartRate, peakHeartRate, ageYears, onBetaBlocker, effort } = test;
  if (restingHeartRate === null || peakHeartRate === null) {
    return notFound(chronotropicPart, 'The resting or the peak rate is not recorded.');
  }
  const predicted = foxMaximum(ageYears);
  if (predicted <= restingHeartRate) {
    return notFound(chronotropicPart, 'The predicted maximum is not above rest.');
  }
  const index = chronotropicIndex(peakHeartRate, restingHeartRate, predicted);
  if (effort !== 'maximal') {
    return found(chronotropicPart, index, null, 'Judged only after a test limited by symptoms.');
  }
  const low = isIndexLow(index, onBetaBlocker);
  return low === null
    ? found(chronotropicPart, index, null, 'Say whether a beta blocker was taken.')
    : found(chronotropicPart, index, low ? 'low' : 'not low');
}

function product({ peakHeartRate, peakSystolic }: RecordedTest): ComputedValue {
  const part = {
    key: 'rate-pressure-product',
    label: 'Rate–pressure product, peak',
    unit: 'bpm × mmHg',
    source: 'Heart rate × systolic pressure; from memory',
  } as const;
  if (peakHeartRate === null || peakSystolic === null) {
    return notFound(part, 'The peak rate or systolic pressure is not recorded.');
  }
  return found(part, ratePressureProduct(peakHeartRate, peakSystolic));
}

/** All that is computed from the record of a test, in the order of reading; what cannot be says why. */
export const computedFromTest = (test: RecordedTest): ComputedValue[] => [
  ...workOfTest(test),
  percentPredicted(test),
  ...recoveries(test),
  chronotropic(test),
  product(test),
];
