import { computedFromWalk } from '@shared/clinical/computed-from-walk';
import {
  averageStandTime,
  chairStandPoints,
  isWorseThanAverage,
  standMarks,
  type StandEnding,
} from '@shared/clinical/five-times-sit-to-stand';
import type { WalkCondition } from '@shared/clinical/six-minute-walk-change';
import { centimeters, kilograms, meters, seconds } from '@shared/units';
import type { Line } from '../entry-editor/entry-form';
import {
  type LineContext,
  ageAt,
  bodyOn,
  dateOf,
  numberOf,
  rounded,
  standing,
  wordOf,
} from './line-context';

type Values = Readonly<Record<string, unknown>>;

/** By the diagnoses and answers of the record. */
function conditionOf({ record }: LineContext): WalkCondition {
  const failure = standing(record, 'conditions').find(
    ({ values }) => values.kind === 'heartFailure',
  );
  if (failure && failure.values.value !== 'none' && failure.values.value !== 'unknown') {
    return 'heart-failure';
  }
  const coronary = standing(record, 'conditions').find(
    ({ values }) => values.kind === 'coronaryDisease',
  );
  return coronary?.values.value === 'yes' ? 'coronary-disease' : 'general';
}

/** The first walk of the record before a date; null when there is none. */
function firstBefore({ record }: LineContext, date: string): number | null {
  const earlier = standing(record, 'walk-tests').filter(({ values }) => values.performedOn < date);
  return earlier.at(-1)?.values.distanceMeters ?? null;
}

const changeWords = { gain: 'important gain', loss: 'important loss', none: 'below what matters' };

/** A six-minute walk against its prediction, the lower limit of normal and the first walk. */
export function walkLines(values: Values, context: LineContext): Line[] {
  const distance = numberOf(values, 'distanceMeters');
  const date = dateOf(values, 'performedOn', context);
  const age = ageAt(context, date);
  if (distance === null || age === null) return [];
  const [height, weight] = [
    bodyOn(context.record, 'heightCm', date),
    bodyOn(context.record, 'weightKg', date),
  ];
  const first = firstBefore(context, date);
  const walk = computedFromWalk({
    distance: meters(distance),
    ageYears: age,
    sexAtBirth: context.patient?.sexAtBirth ?? 'unknown',
    height: height === null ? null : centimeters(height),
    weight: weight === null ? null : kilograms(weight),
    first: first === null ? null : meters(first),
    condition: conditionOf(context),
  });
  const { prediction, change } = walk;
  return [
    {
      label: 'Of predicted',
      value:
        prediction &&
        `${rounded(prediction.percentOfPredicted)} % of ${rounded(prediction.predicted)} m`,
      source: walk.predictionSource,
      why: walk.whyNoPrediction,
    },
    {
      label: 'Lower limit of normal',
      value: prediction && `${rounded(prediction.lowerLimit)} m`,
      judgment: prediction && (prediction.belowLimit ? 'below it' : 'at or above it'),
      isDue: prediction?.belowLimit === true,
    },
    {
      label: 'Peak VO2, estimated',
      value: `${rounded(walk.peakVo2, 1)} mL/kg/min, ${rounded(walk.peakMets, 1)} METs`,
      source: 'Ross 2010',
      why: 'From group means: weak for one patient.',
    },
    {
      label: 'Change against the first',
      value: change && `${change.change > 0 ? '+' : ''}${rounded(change.change)} m`,
      judgment: change && changeWords[change.important],
      isDue: change?.important === 'loss',
      source: change && `At least ${rounded(change.least)} m matter: ${change.source}`,
      why: change ? null : 'This is the first walk.',
    },
  ];
}

/** Five stands against the average of the age and published marks. */
export function chairLines(values: Values, context: LineContext): Line[] {
  const time = numberOf(values, 'seconds');
  const ending = wordOf<StandEnding>(values, 'ending');
  const age = ageAt(context, dateOf(values, 'performedOn', context));
  if (age === null || ending === null) return [];
  const points = chairStandPoints(time === null ? null : seconds(time), ending);
  const average = averageStandTime(age);
  const isWorse = time === null ? null : isWorseThanAverage(seconds(time), age);
  return [
    {
      label: 'Against people of the age',
      value: average === null ? null : `average up to ${average} s`,
      judgment: isWorse === null ? null : isWorse ? 'worse than average' : 'not worse than average',
      isDue: isWorse === true,
      source: 'Bohannon 2006',
      why: average === null ? 'No average was published for this age.' : null,
    },
    {
      label: 'Falls',
      value: time === null ? 'could not be done' : `${time} s`,
      judgment:
        time === null || time > standMarks.recurrentFalls
          ? 'risk of recurrent falls'
          : time > standMarks.disability
            ? 'risk of disability'
            : 'below the marks',
      isDue: time === null || time > standMarks.disability,
      source: `Above ${standMarks.recurrentFalls} s recurrent falls, above ${standMarks.disability} s disability`,
    },
    {
      label: 'Chair-stand points',
      value: points === null ? null : `${points} of 4`,
      source: 'Short Physical Performance Battery; from memory',
      why: points === null ? 'Only when the clock stops at the fifth standing.' : null,
    },
  ];
}
