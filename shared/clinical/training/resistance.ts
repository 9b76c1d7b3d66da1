import type { Kilograms } from '../../units';
import { kilograms } from '../../units';
import type { ResistancePolicy } from './resistance-policy';

/** Weeks since something was done; `never`, or null when it is not known, which counts as just now. */
export type WeeksSince = number | 'never' | null;

export interface ResistanceFacts {
  readonly sternotomy: WeeksSince;
  readonly infarction: WeeksSince;
  readonly stent: WeeksSince;
  readonly device: WeeksSince;
  /** False when the sternum clicks, moves or is not healed; null: not examined. */
  readonly sternumStable: boolean | null;
  /** Weeks of supervised endurance training done. */
  readonly supervisedWeeks: number;
  /** An order's lifting limit; null: none. It wins over the policy. */
  readonly liftingLimit: Kilograms | null;
}

/** `none` yet, `light` loads up to a limit, or `load` by the one-repetition maximum. */
export type LoadLevel = 'none' | 'light' | 'load';

export interface RegionLimit {
  readonly level: LoadLevel;
  /** Never to pass; null where the one-repetition maximum or the repetitions set the load. */
  readonly mostLoad: Kilograms | null;
  /** First load as a fraction of the one-repetition maximum; null where it does not go by it. */
  readonly startFraction: number | null;
  /** Why the level is what it is, in words. */
  readonly why: readonly string[];
}

export interface ResistanceLimits {
  readonly legs: RegionLimit;
  readonly arms: RegionLimit;
  /** The arm beside a device. */
  readonly deviceArm: RegionLimit;
  readonly deviceArmAboveShoulder: boolean;
  readonly repetitions: { readonly lower: number; readonly upper: number };
  readonly sets: number;
  readonly highestEffort: number;
}

interface Bound {
  readonly level: Exclude<LoadLevel, 'load'>;
  readonly mostLoad: number | null;
  readonly why: string;
}

const isBefore = (since: WeeksSince, weeks: number): boolean =>
  since !== 'never' && (since === null || since < weeks);

const stop = (why: string): Bound => ({ level: 'none', mostLoad: null, why });

/** What forbids any resistance yet. */
function forAll(facts: ResistanceFacts, policy: ResistancePolicy): Bound[] {
  const rules: readonly (readonly [boolean, string])[] = [
    [
      isBefore(facts.sternotomy, policy.afterSternotomy),
      `Not before ${policy.afterSternotomy} weeks after sternotomy.`,
    ],
    [
      isBefore(facts.infarction, policy.afterInfarction),
      `Not before ${policy.afterInfarction} weeks after an infarction.`,
    ],
    [
      isBefore(facts.stent, policy.afterStent),
      `Not before ${policy.afterStent} weeks after a stent.`,
    ],
    [
      facts.supervisedWeeks < policy.supervisedFirst,
      `After ${policy.supervisedFirst} weeks of supervised endurance training.`,
    ],
  ];
  return rules.flatMap(([applies, why]) => (applies ? [stop(why)] : []));
}

/** What holds the arms back further. */
function forArms(
  { sternotomy, sternumStable }: ResistanceFacts,
  policy: ResistancePolicy,
): Bound[] {
  if (sternotomy === 'never') return [];
  if (sternumStable === false) return [stop('The sternum is not stable: ask the surgeon.')];
  if (isBefore(sternotomy, policy.upperAfterSternotomy)) {
    const why = `Light loads until ${policy.upperAfterSternotomy} weeks after sternotomy.`;
    return [{ level: 'light', mostLoad: policy.lightLoad, why }];
  }
  const why = 'Light loads until the sternum has been examined.';
  return sternumStable === null ? [{ level: 'light', mostLoad: policy.lightLoad, why }] : [];
}

/** What holds the arm beside a device back further. */
function forDeviceArm({ device }: ResistanceFacts, policy: ResistancePolicy): Bound[] {
  if (!isBefore(device, policy.afterDevice)) return [];
  const why = `Light loads, below the shoulder, until ${policy.afterDevice} weeks after implantation.`;
  return [{ level: 'light', mostLoad: policy.deviceLoad, why }];
}

const order = (limit: Kilograms | null): readonly number[] => (limit === null ? [] : [limit]);

function regionOf(
  bounds: readonly Bound[],
  startFraction: number,
  liftingLimit: Kilograms | null,
): RegionLimit {
  const why = bounds.map((bound) => bound.why);
  if (bounds.some(({ level }) => level === 'none')) {
    return { level: 'none', mostLoad: null, startFraction: null, why };
  }
  const loads = [
    ...bounds.flatMap(({ mostLoad }) => (mostLoad === null ? [] : [mostLoad])),
    ...order(liftingLimit),
  ];
  const isLight = bounds.length > 0;
  return {
    level: isLight ? 'light' : 'load',
    mostLoad: loads.length === 0 ? null : kilograms(Math.min(...loads)),
    startFraction: isLight ? null : startFraction,
    why: liftingLimit === null ? why : [...why, 'A lifting limit is ordered.'],
  };
}

/** What resistance exercise a patient may do now, region by region; what is not known holds back like what has just happened. */
export function resistanceLimits(
  facts: ResistanceFacts,
  policy: ResistancePolicy,
): ResistanceLimits {
  const all = forAll(facts, policy);
  const arms = [...all, ...forArms(facts, policy)];
  const beside = forDeviceArm(facts, policy);
  return {
    legs: regionOf(all, policy.lowerStart, facts.liftingLimit),
    arms: regionOf(arms, policy.upperStart, facts.liftingLimit),
    deviceArm: regionOf([...arms, ...beside], policy.upperStart, facts.liftingLimit),
    deviceArmAboveShoulder: beside.length === 0,
    repetitions: { lower: policy.leastRepetitions, upper: policy.mostRepetitions },
    sets: policy.mostSets,
    highestEffort: policy.highestEffort,
  };
}

export interface LoadHistory {
  readonly load: Kilograms;
  readonly repetitions: number | null;
  readonly effort: number | null;
  readonly symptoms: boolean | null;
}

/**
 * The next load: raised by the policy's step when the most repetitions were done without symptoms and under the highest effort, else the
 * same. Never above the region's limit; what was not recorded raises nothing.
 */
export function nextLoad(
  { load, repetitions, effort, symptoms }: LoadHistory,
  { level, mostLoad }: RegionLimit,
  policy: ResistancePolicy,
): Kilograms | null {
  if (level === 'none') return null;
  const isReady =
    symptoms === false &&
    repetitions !== null &&
    repetitions >= policy.mostRepetitions &&
    effort !== null &&
    effort < policy.highestEffort;
  const next = isReady ? load * (1 + policy.loadStep) : load;
  return kilograms(Math.min(next, mostLoad ?? Infinity));
}
