import { rateAtPeakFraction, rateAtReserve } from '@shared/clinical/heart-rate-reserve';
import * as maxima from '@shared/clinical/maximum-heart-rate';
import * as equations from '@shared/clinical/metabolic-equations';
import { sixMinuteWalkSpeed } from '@shared/clinical/six-minute-walk';
import { wilsonInterval } from '@shared/statistics/wilson-interval';
import {
  bpm,
  kilograms,
  meters,
  mets,
  metersPerMinute,
  metsOf,
  mphOf,
  vo2,
  vo2Of,
  watts,
} from '@shared/units';
import type { Bpm, Vo2 } from '@shared/units';
import { capacityComputations } from './computed-capacity';
import { scoreComputations } from './computed-scores';
import { input } from './vectors';
import type { Compute, Vector } from './vectors';

/** The publications take a mile an hour as 26.8 m/min, and a watt as 6 kgm/min. */
const printedSpeed = (vector: Vector) => metersPerMinute(26.8 * input(vector, 'speed'));
const printedPower = (vector: Vector) => watts(input(vector, 'work') / 6);

const reserve =
  (maximum: (vector: Vector) => Bpm, fraction = 'fraction'): Compute =>
  (vector) =>
    rateAtReserve(bpm(input(vector, 'rest')), maximum(vector), input(vector, fraction));

const peak = (vector: Vector) => bpm(input(vector, 'peak'));
const age = (vector: Vector) => input(vector, 'age');

const walking: (vector: Vector) => Vo2 = (vector) =>
  equations.walkingVo2(printedSpeed(vector), input(vector, 'grade') / 100);
const weight = (vector: Vector) => kilograms(input(vector, 'mass'));
const stepping = (vector: Vector) =>
  equations.steppingVo2(input(vector, 'rate'), meters(input(vector, 'height')));

const keteyian =
  (onCycle: boolean): Compute =>
  (vector) =>
    maxima.keteyianMaximum(age(vector), bpm(input(vector, 'rest')), onCycle);

const wilsonEnd =
  (end: 'lower' | 'upper', z?: number): Compute =>
  (vector) =>
    wilsonInterval(input(vector, 'x'), input(vector, 'n'), z)[end];

const fox = reserve((vector) => maxima.foxMaximum(age(vector)));
const cycling: Compute = (vector) => equations.cyclingVo2(printedPower(vector), weight(vector));
const cyclingPower: Compute = (vector) =>
  equations.cyclingPower(vo2Of(mets(input(vector, 'mets'))), weight(vector));

/** Which of our functions computes a vector, by the pattern of its id. */
const computations: readonly (readonly [RegExp, Compute])[] = [
  [/^HRR-01$/, reserve(peak)],
  [/^HRR-02$/, reserve((vector) => bpm(input(vector, 'hrmax')))],
  [/^HRR-0[47]$/, fox],
  [/^BAND-BR-(LO|HI)$/, reserve(peak)],
  [/^HRM-FOX-\d+$/, (vector) => maxima.foxMaximum(age(vector))],
  [/^HRM-TAN-\d+$/, (vector) => maxima.tanakaMaximum(age(vector))],
  [/^HRM-GEL-\d+$/, (vector) => maxima.gellishMaximum(age(vector))],
  [/^HRM-NES-\d+$/, (vector) => maxima.nesMaximum(age(vector))],
  [/^HRM-GUL-\d+$/, (vector) => maxima.gulatiMaximum(age(vector))],
  [/^HRM-BRA-\d+$/, (vector) => maxima.brawnerMaximum(age(vector))],
  [/^HRM-KBK-\d+$/, keteyian(true)],
  [/^HRM-KTM-\d+$/, keteyian(false)],
  [/^MET-W[12]$/, walking],
  [/^MET-WWU3M$/, (vector) => metsOf(vo2(input(vector, 'vo2')))],
  [/^MET-WWU5$/, walking],
  [/^MET-C[12]$/, cycling],
  [/^MET-C3$/, (vector) => 6 * cyclingPower(vector)],
  [/^MET-C4$/, cyclingPower],
  [/^MET-A1$/, (vector) => equations.armCyclingVo2(printedPower(vector), weight(vector))],
  [/^MET-A3$/, (vector) => equations.armCyclingVo2(watts(input(vector, 'power')), weight(vector))],
  [/^MET-S[12]$/, stepping],
  [/^MET-S3$/, (vector) => metsOf(stepping(vector))],
  [/^(BRU-[23]|NAU-[\d.]+|BAL-\d+)$/, (vector) => metsOf(walking(vector))],
  [/^6MW-SPD$/, (vector) => mphOf(sixMinuteWalkSpeed(meters(input(vector, 'distance'))))],
  [/^WIL-T-.*-lo$/, wilsonEnd('lower', 1.96)],
  [/^WIL-T-.*-hi$/, wilsonEnd('upper', 1.96)],
  [/^WIL-\d.*-lo$/, wilsonEnd('lower')],
  [/^WIL-\d.*-hi$/, wilsonEnd('upper')],
  ...capacityComputations,
  ...scoreComputations,
];

export const computationOf = ({ id }: Vector): Compute | undefined =>
  computations.find(([pattern]) => pattern.test(id))?.[1];

/** Vectors that print the two ends of a range. */
export const ranges: Readonly<Record<string, (vector: Vector) => readonly [number, number]>> = {
  'HRR-08': (vector) => [reserve(peak, 'low')(vector), reserve(peak, 'high')(vector)],
  'PHRM-02': (vector) => [
    rateAtPeakFraction(peak(vector), 0.64),
    rateAtPeakFraction(peak(vector), 0.76),
  ],
  'HRM-CI-60': (vector) => {
    const estimate = maxima.brawnerMaximum(age(vector));
    const error = input(vector, 'see');
    return [estimate - error, estimate + error];
  },
};
