import { toMillionths } from '../../units';
import type { ReasonCode } from './answer';
import type { PrescriptionPolicy } from './policy';
import type { ExerciseTest, PrescriptionRequest } from './request';

type Block = (
  request: PrescriptionRequest,
  policy: PrescriptionPolicy,
  usableTest: ExerciseTest | null,
) => boolean;

const rhythmBlocks: Block = ({ rhythm }, _policy, usableTest) => {
  if (rhythm === 'sinus' || rhythm === 'sinus-tracked') return false;
  return rhythm !== 'sensor-paced' || usableTest === null;
};

const transplantBlocks: Block = ({ conditions: { transplant } }, _policy, usableTest) =>
  transplant === 'denervated' || (transplant === 'recovered' && usableTest === null);

/** An ICD whose detection rates are not known, or of which nobody knows whether it is there. */
const icdBlocks: Block = ({ devices: { icd } }) =>
  icd.status === 'unknown' || (icd.status === 'present' && icd.zones.length === 0);

const spreadBlocks: Block = ({ resting: { spread } }, policy) =>
  spread !== null && spread > policy.resting.maximumSpread;

const reserveBlocks: Block = ({ resting: { seated } }, policy, usableTest) =>
  usableTest !== null && toMillionths(usableTest.peakHeartRate - seated) < policy.reserve.minimum;

/** In the order in which an answer lists the reasons. */
const blocks: readonly (readonly [ReasonCode, Block])[] = [
  ['rhythm', rhythmBlocks],
  ['assist-device', ({ conditions }) => conditions.ventricularAssistDevice],
  ['transplant', transplantBlocks],
  ['chronotropic-incompetence', ({ conditions }) => conditions.chronotropicIncompetence],
  ['physician-sets', ({ conditions }) => conditions.outflowObstruction],
  ['icd-rate-unknown', icdBlocks],
  ['resting-rate-unstable', spreadBlocks],
  ['reserve-too-small', reserveBlocks],
];

/** Why heart rate cannot lead, every reason; [] when it can. */
export function leadBlocks(...facts: Parameters<Block>): ReasonCode[] {
  return blocks.filter(([, isBlocked]) => isBlocked(...facts)).map(([code]) => code);
}

/** Each reason in words, to follow "Effort leads: ". */
export const reasonWords: Readonly<Record<ReasonCode, string>> = {
  rhythm: 'the rhythm does not let heart rate follow effort',
  'assist-device': 'an assist device carries the circulation',
  transplant: 'the transplanted heart does not follow effort, or no usable test shows that it does',
  'chronotropic-incompetence': 'the heart rate does not rise with effort',
  'physician-sets': 'outflow obstruction or severe stenosis: a physician sets everything',
  'icd-rate-unknown': 'the detection rates of the ICD are not known',
  'resting-rate-unstable': 'the resting rate varies too much from day to day',
  'reserve-too-small': 'the measured heart-rate reserve is too small',
  'no-usable-test': 'there is neither a usable test nor observed work',
  'no-valid-range': 'no range of useful width is left',
  chosen: 'the clinician chose effort',
};
