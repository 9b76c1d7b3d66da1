import { isWorseThanAverage } from '@shared/clinical/five-times-sit-to-stand';
import {
  bandOfExertion,
  bandOfMaximum,
  bandOfReserve,
  escBandOfReserve,
} from '@shared/clinical/intensity-bands';
import { anxietyBandOf } from '@shared/clinical/questionnaires/gad-7';
import { phq2BandOf } from '@shared/clinical/questionnaires/phq-2';
import { depressionBandOf } from '@shared/clinical/questionnaires/phq-9';
import { ahaAdvice } from '@shared/clinical/risk/aha-class';
import { mets, seconds } from '@shared/units';
import { riskOf } from './risk-facts';
import { input } from './vectors';
import type { Vector } from './vectors';

type Name = (vector: Vector) => string;

const percent = (vector: Vector) => input(vector, 'percent');
const score = (vector: Vector) => input(vector, 'score');

/** Vectors whose expected value is a word: which of our functions says it. */
const words: readonly (readonly [RegExp, Name])[] = [
  [/^BAND-HRR-/, (vector) => bandOfReserve(percent(vector))],
  [/^BAND-HRM-/, (vector) => bandOfMaximum(percent(vector))],
  [/^BAND-RPE-/, (vector) => bandOfExertion(input(vector, 'rpe'))],
  [/^BAND-ESC-/, (vector) => escBandOfReserve(percent(vector))],
  [/^PHQ9-\d+$/, (vector) => depressionBandOf(score(vector))],
  [/^PHQ2-3$/, (vector) => phq2BandOf(score(vector))],
  [/^GAD7-\d+$/, (vector) => anxietyBandOf(score(vector))],
  [
    /^RISK-[1-6]$/,
    (vector) => riskOf(input(vector, 'lvef'), mets(input(vector, 'mets'))).riskClass,
  ],
  [/^AHA-B$/, () => ahaAdvice.B.monitoring],
  [/^AHA-C$/, () => ahaAdvice.C.monitoring],
  [/^AHA-D$/, () => ahaAdvice.D.monitoring],
  [
    /^STS-B70$/,
    (vector) =>
      isWorseThanAverage(seconds(input(vector, 'time')), input(vector, 'age')) === true
        ? 'worse than average'
        : 'not worse',
  ],
];

export const wordOf = ({ id }: Vector): Name | undefined =>
  words.find(([pattern]) => pattern.test(id))?.[1];
