import { choiceSituations } from './choices';
import { drugSituations, testSituations, thresholdSituations } from './drugs-and-tests';
import type { Situation } from './facts';
import { conditionSituations, rhythmSituations } from './rhythms-and-devices';
import { accountSituation, usualSituations } from './usual';

export * from './facts';
export { usualSituations };

/** Every situation that is told once, so that each rule has a person. */
export const singleSituations: readonly Situation[] = [
  ...rhythmSituations,
  ...conditionSituations,
  ...drugSituations,
  ...testSituations,
  ...thresholdSituations,
  ...choiceSituations,
];

export const allSituations: readonly Situation[] = [
  accountSituation,
  ...usualSituations,
  ...singleSituations,
];

export function situationNamed(name: string): Situation {
  const found = allSituations.find((each) => each.name === name);
  if (!found) throw new RangeError(`no situation ${name}`);
  return found;
}
