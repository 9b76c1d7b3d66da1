import type { Centimeters, Kilograms, Meters, Mets, Vo2 } from '../units';
import { metsOf } from '../units';
import type { SexAtBirth } from './prescribing/request';
import type { WalkChange, WalkCondition } from './six-minute-walk-change';
import { judgeWalkChange } from './six-minute-walk-change';
import {
  lowerLimitOfWalk,
  predictedWalk,
  walkPredictionAges,
  walkPredictionSource,
} from './six-minute-walk-predicted';
import { peakVo2OfWalk } from './six-minute-walk-uptake';

export interface RecordedWalk {
  readonly distance: Meters;
  readonly ageYears: number;
  readonly sexAtBirth: SexAtBirth;
  readonly height: Centimeters | null;
  readonly weight: Kilograms | null;
  /** The first walk of this course; null when this is it. */
  readonly first: Meters | null;
  readonly condition: WalkCondition;
}

export interface WalkPrediction {
  readonly predicted: Meters;
  readonly lowerLimit: Meters;
  readonly percentOfPredicted: number;
  readonly belowLimit: boolean;
}

export interface ComputedWalk {
  /** Null with the reason in `whyNoPrediction`. */
  readonly prediction: WalkPrediction | null;
  readonly whyNoPrediction: string | null;
  readonly predictionSource: string;
  /** A peak, from group means: weak for one patient. */
  readonly peakVo2: Vo2;
  readonly peakMets: Mets;
  readonly change: WalkChange | null;
}

function whyNoPrediction({ ageYears, sexAtBirth, height, weight }: RecordedWalk): string | null {
  const { lowest, highest } = walkPredictionAges;
  if (ageYears < lowest || ageYears > highest) {
    return `The prediction holds from ${lowest} to ${highest} years.`;
  }
  if (sexAtBirth === 'unknown') return 'The prediction asks for the sex at birth.';
  return height === null || weight === null ? 'The height or the weight is not known.' : null;
}

function predictionOf(walk: RecordedWalk): WalkPrediction | null {
  const { distance, ageYears, sexAtBirth, height, weight } = walk;
  if (whyNoPrediction(walk) !== null) return null;
  if (sexAtBirth === 'unknown' || height === null || weight === null) return null;
  const facts = { ageYears, sexAtBirth, height, weight };
  const predicted = predictedWalk(facts);
  const lowerLimit = lowerLimitOfWalk(facts);
  return {
    predicted,
    lowerLimit,
    percentOfPredicted: (100 * distance) / predicted,
    belowLimit: distance < lowerLimit,
  };
}

/** All that is computed from a six-minute walk; what cannot be says why. */
export function computedFromWalk(walk: RecordedWalk): ComputedWalk {
  const { distance, first, condition } = walk;
  const peakVo2 = peakVo2OfWalk(distance);
  return {
    prediction: predictionOf(walk),
    whyNoPrediction: whyNoPrediction(walk),
    predictionSource: walkPredictionSource,
    peakVo2,
    peakMets: metsOf(peakVo2),
    change: first === null ? null : judgeWalkChange(first, distance, condition),
  };
}
