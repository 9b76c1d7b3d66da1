import { chronotropicIndex } from '@shared/clinical/chronotropic-index';
import { chairStandPoints } from '@shared/clinical/five-times-sit-to-stand';
import { fractionOfReserve } from '@shared/clinical/heart-rate-reserve';
import * as maxima from '@shared/clinical/maximum-heart-rate';
import { peakVo2OfDasi, scoreDasi } from '@shared/clinical/questionnaires/dasi';
import { prorateTotal } from '@shared/clinical/questionnaires/phq-9';
import { ratePressureProduct } from '@shared/clinical/rate-pressure-product';
import { observedDoseOfGuides } from '@shared/clinical/starting-guides';
import {
  banisterLoad,
  edwardsLoad,
  edwardsZone,
  sessionLoad,
} from '@shared/clinical/training-load';
import { bpm, minutes, mmHg, seconds } from '@shared/units';
import { input, text } from './vectors';
import type { Compute, Vector } from './vectors';

const age = (vector: Vector) => input(vector, 'age');

const banister =
  (sexAtBirth: 'male' | 'female'): Compute =>
  (vector) => {
    const [rest, max] = [bpm(input(vector, 'rest')), bpm(input(vector, 'max'))];
    const fraction = fractionOfReserve(rest, max, input(vector, 'hr'));
    return banisterLoad(minutes(input(vector, 'minutes')), fraction, sexAtBirth);
  };

const edwards: Compute = (vector) => {
  const [one = 0, two = 0, three = 0, four = 0, five = 0] = text(vector, 'minutes')
    .split(',')
    .map(Number);
  return edwardsLoad([minutes(one), minutes(two), minutes(three), minutes(four), minutes(five)]);
};

/** A score whose *yes* items are listed; `12 yes` is all. */
const dasi: Compute = (vector) => {
  const given = text(vector, 'items');
  const yes = given === '12 yes' ? null : given.split(',').map(Number);
  const answers = Array.from({ length: 12 }, (_, index) => yes?.includes(index + 1) ?? true);
  const score = scoreDasi(answers);
  return score.state === 'complete' ? score.total : NaN;
};

const product = (vector: Vector) =>
  ratePressureProduct(bpm(input(vector, 'hr')), mmHg(input(vector, 'sbp')));

/** Maxima in print, questionnaires, tests and loads: which of our functions computes a vector. */
export const scoreComputations: readonly (readonly [RegExp, Compute])[] = [
  [/^HRM-GL2-/, (vector) => maxima.gellishVariantMaximum(age(vector))],
  [/^HRM-TLAB-/, (vector) => maxima.tanakaLaboratoryMaximum(age(vector))],
  [/^HRM-SYF-/, (vector) => maxima.sydoMaximum(age(vector), 'female')],
  [
    /^HRM-MECKI-/,
    (vector) =>
      maxima.meckiMaximum(
        age(vector),
        bpm(input(vector, 'rest')),
        input(vector, 'lvef'),
        input(vector, 'hb'),
      ),
  ],
  [/^HRM-ISC-/, (vector) => maxima.ischemicHeartFailureMaximum(age(vector))],
  [/^HRM-INB-/, (vector) => maxima.inbarMaximum(age(vector))],
  [/^HRM-INBBB-/, (vector) => maxima.inbarBetaBlockerMaximum(age(vector))],
  [/^RX-JOO-1$/, () => observedDoseOfGuides['resting-plus-20'].mean],
  [/^RX-JOO-2$/, () => observedDoseOfGuides['perceived-exertion-11-13'].mean],
  [/^PHQ9-MISS$/, (vector) => prorateTotal(input(vector, 'sum'), input(vector, 'answered'))],
  [
    /^STS-\d/,
    (vector) => chairStandPoints(seconds(input(vector, 'time')), 'standing-fifth-time') ?? NaN,
  ],
  [/^DASI-(MAX|720)$/, dasi],
  [/^DASI-(0|720V)$/, (vector) => peakVo2OfDasi(input(vector, 'dasi'))],
  [/^RPP-2$/, product],
  [/^RPP-3$/, (vector) => product(vector) / 1000],
  [/^TRIMP-[12]$/, banister('male')],
  [/^TRIMP-F$/, banister('female')],
  // Printed 3.4 keeps the men's factor for women: what is expected is the value recomputed with the women's own.
  [/^TRIMP-Fmax$/, (vector) => banisterLoad(minutes(1), input(vector, 'fraction'), 'female')],
  [/^TRIMP-Mmax$/, (vector) => banisterLoad(minutes(1), input(vector, 'fraction'), 'male')],
  [/^EDW-[12]$/, edwards],
  [/^EDW-3$/, (vector) => edwardsZone(input(vector, 'percent'))],
  [/^SRPE-\d$/, (vector) => sessionLoad(input(vector, 'rpe'), minutes(input(vector, 'minutes')))],
  [
    /^CHRON-/,
    (vector) =>
      chronotropicIndex(
        bpm(input(vector, 'peak')),
        bpm(input(vector, 'rest')),
        bpm(input(vector, 'predicted')),
      ),
  ],
];
