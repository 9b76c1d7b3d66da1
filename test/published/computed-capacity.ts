import * as energy from '@shared/clinical/energy-expenditure';
import * as predicted from '@shared/clinical/exercise-test/predicted-capacity';
import { fosterPeakVo2, kokkinosPeakVo2 } from '@shared/clinical/exercise-test/stage-uptake';
import * as time from '@shared/clinical/exercise-test/treadmill-time';
import { metsOfHeartRateIndex } from '@shared/clinical/heart-rate-index';
import * as equations from '@shared/clinical/metabolic-equations';
import * as walk from '@shared/clinical/six-minute-walk-predicted';
import { peakVo2OfWalk } from '@shared/clinical/six-minute-walk-uptake';
import {
  bpm,
  centimeters,
  centimetersOfInches,
  kilograms,
  kilogramsOfPounds,
  meters,
  mets,
  metersPerMinute,
  metsOf,
  minutes,
  vo2,
  vo2Of,
  watts,
} from '@shared/units';
import type { Minutes } from '@shared/units';
import { input, text } from './vectors';
import type { Compute, Vector } from './vectors';

/** The publications take a mile an hour as 26.8 m/min. */
const speed = (vector: Vector) => metersPerMinute(26.8 * input(vector, 'speed'));
const weight = (vector: Vector) => kilograms(input(vector, 'mass'));
const running = (vector: Vector) =>
  equations.runningVo2(speed(vector), input(vector, 'grade') / 100);
const timeOf = (vector: Vector): Minutes => minutes(input(vector, 'time'));

/** 13:15 is 13.25 min. */
function clockTime(vector: Vector): Minutes {
  const [whole = NaN, seconds = NaN] = text(vector, 'time').split(':').map(Number);
  return minutes(whole + seconds / 60);
}

const man = (vector: Vector) => ({
  ageYears: input(vector, 'age'),
  sexAtBirth: 'male' as const,
  weight: kilogramsOfPounds(input(vector, 'weight')),
});

/** What an uptake comes to when a weight in kilograms is taken for pounds, as the equation must not be fed. */
const kilogramTrap: Compute = (vector) => {
  const wrong = predicted.friend2017Vo2(man(vector));
  return wrong - predicted.friend2017Vo2({ ...man(vector), weight: kilogramsOfPounds(180) });
};

const walker = (vector: Vector, sexAtBirth: 'male' | 'female') => ({
  ageYears: input(vector, 'age'),
  sexAtBirth,
  height: centimeters(input(vector, 'height')),
  weight: kilograms(input(vector, 'weight')),
});

/** Energy of the week's walks, by the equation at exact grade. */
const weeklyEnergy: Compute = (vector) =>
  3 *
  30 *
  energy.kilocaloriesPerMinute(
    equations.walkingVo2(speed(vector), input(vector, 'grade') / 100),
    weight(vector),
  );

const boutEnergy: Compute = (vector) =>
  energy.kilocalories(
    metsOf(vo2(input(vector, 'vo2'))),
    weight(vector),
    minutes(input(vector, 'minutes')),
  );

/** Minutes a day for the weekly energy. */
const dailyMinutes: Compute = (vector) => {
  const perMinute = energy.kilocaloriesPerMinute(
    vo2Of(mets(input(vector, 'mets'))),
    weight(vector),
  );
  return input(vector, 'weekly') / input(vector, 'days') / perMinute;
};

/** A watt as 6.12 against 6 kgm/min. */
const kilogramMeterGap: Compute = (vector) => {
  const power = input(vector, 'power');
  const [exact, rounded] = [power * (6.12 / 6), power].map((each) =>
    equations.cyclingVo2(watts(each), weight(vector)),
  );
  return (exact ?? NaN) - (rounded ?? NaN);
};

const kokkinos: Compute = (vector) => kokkinosPeakVo2(speed(vector), input(vector, 'grade') / 100);

/** Running, energy, capacity and walks: which of our functions computes a vector, by the pattern of its id. */
export const capacityComputations: readonly (readonly [RegExp, Compute])[] = [
  [/^MET-WWU13$/, running],
  [/^MET-R1$/, (vector) => equations.levelRunningSpeed(vo2Of(mets(input(vector, 'mets'))))],
  [
    /^MET-R2$/,
    (vector) => equations.runningVo2(metersPerMinute((26.8 * 60) / input(vector, 'pace')), 0),
  ],
  [/^BRU-[57]$/, (vector) => metsOf(running(vector))],
  [/^MET-(W2K|WWU2K)$/, boutEnergy],
  [/^MET-WWU8$/, weeklyEnergy],
  [
    /^MET-R2N$/,
    (vector) => energy.kilocaloriesPerMinute(vo2(input(vector, 'netVo2')), weight(vector)),
  ],
  [/^MET-C2A$/, (vector) => energy.absoluteVo2(vo2(input(vector, 'vo2')), weight(vector))],
  [/^MET-C5$/, kilogramMeterGap],
  [/^MET-K2$/, dailyMinutes],
  [/^MET-F96b$/, (vector) => fosterPeakVo2(vo2(input(vector, 'acsm')), true)],
  [/^FOS-(6|0)$/, (vector) => time.fosterVo2(timeOf(vector))],
  [/^FOS-dec$/, (vector) => time.fosterVo2(clockTime(vector))],
  [/^POL-\d+$/, (vector) => time.pollockWomenVo2(timeOf(vector))],
  [/^BR73-\d$/, (vector) => time.bruceSedentaryMenVo2(timeOf(vector))],
  [/^BR73G$/, (vector) => time.bruceGeneralizedVo2(minutes(input(vector, 'time') / 60), 'male')],
  [/^FRI-M60$/, (vector) => predicted.friend2017Vo2(man(vector))],
  [/^FRI-kgtrap$/, kilogramTrap],
  [
    /^FR18-M$/,
    (vector) =>
      predicted.friend2018Vo2(
        man(vector),
        centimetersOfInches(input(vector, 'height')),
        'treadmill',
      ),
  ],
  [
    /^PCT-1$/,
    (vector) =>
      predicted.percentOfPredicted(
        vo2(input(vector, 'measured')),
        vo2(input(vector, 'predicted')),
      ) ?? NaN,
  ],
  [/^KOK-\d$/, kokkinos],
  [
    /^WICKS-/,
    (vector) => metsOfHeartRateIndex(bpm(input(vector, 'hr')), bpm(input(vector, 'rest'))),
  ],
  [/^6MW-M2?$/, (vector) => walk.predictedWalk(walker(vector, 'male'))],
  [/^6MW-FL$/, (vector) => walk.lowerLimitOfWalk(walker(vector, 'female'))],
  [
    /^6MW-MB$/,
    (vector) => walk.predictedWalkByIndex(input(vector, 'bmi'), input(vector, 'age'), 'male'),
  ],
  [/^ROSS-\d+$/, (vector) => peakVo2OfWalk(meters(input(vector, 'distance')))],
];
