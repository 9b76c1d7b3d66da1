import type { PolicyKey } from '../prescribing/policy-keys';
import type { PolicyValuesByKey } from './program-policy';
import { programPolicyKeys } from './program-policy';

/** Two numbers of which one must not be above the other. */
export interface PolicyOrder {
  readonly lower: string;
  readonly upper: string;
  readonly mayBeEqual: boolean;
}

const below = (lower: string, upper: string): PolicyOrder => ({ lower, upper, mayBeEqual: false });
const atMost = (lower: string, upper: string): PolicyOrder => ({ lower, upper, mayBeEqual: true });

/** What numbers of a policy must be to each other, beside the bounds of each. */
export const policyOrders: readonly PolicyOrder[] = [
  below('intensity.wide.lower', 'intensity.wide.upper'),
  below('intensity.narrow.lower', 'intensity.narrow.upper'),
  below('intensity.lowCapacity.lower', 'intensity.lowCapacity.upper'),
  below('percentOfPeak.lower', 'percentOfPeak.upper'),
  below('restingPlus.lower', 'restingPlus.upper'),
  below('pressureCeiling.diastolic', 'pressureCeiling.systolic'),
  atMost('equipment.step.lowest', 'equipment.step.highest'),
  atMost('intermittent.boutMinutes', 'intermittent.totalMinutes'),
  atMost('intermittent.totalMinutes', 'intermittent.mostMinutes'),
  below('intervals.recoveryHighest', 'intervals.highestFraction'),
  atMost('intervals.physicianAbove', 'intervals.highestFraction'),
  atMost('resistance.afterSternotomy', 'resistance.upperAfterSternotomy'),
  atMost('resistance.leastRepetitions', 'resistance.mostRepetitions'),
  atMost('staffing.highRiskEach', 'staffing.patientsEach'),
];

const decimalsOf = (value: number): number => (String(value).split('.')[1] ?? '').length;

/** A number without a unit that is a part of a whole, and so is read and entered as percent. */
export const isFraction = ({ unit, highest }: Pick<PolicyKey, 'unit' | 'highest'>): boolean =>
  unit === '' && highest <= 1;

/** The step in which a number is set: a hundredth for fractions, else as fine as its bounds and its default are. */
export function policyStep(number: Omit<PolicyKey, 'key' | 'label' | 'source'>): number {
  if (isFraction(number)) return 0.01;
  const { lowest, highest, default: usual } = number;
  return 1 / 10 ** Math.max(...[lowest, highest, usual].map(decimalsOf));
}

/** Whether a value is a whole number of steps; 1e-9 for the noise of decimals. */
export const isOnStep = (value: number, step: number): boolean =>
  Math.abs(value / step - Math.round(value / step)) < 1e-9;

/** A value without the noise of decimals: 0.1 + 0.2 is set as 0.3. */
export const toStep = (value: number, step: number): number =>
  Number((Math.round(value / step) * step).toFixed(2));

const byKey: ReadonlyMap<string, PolicyKey> = new Map(
  programPolicyKeys.map((number) => [number.key, number]),
);

const labelOf = (key: string): string => byKey.get(key)?.label ?? key;

export interface PolicyFault {
  readonly key: string;
  readonly message: string;
}

/**
 * Where numbers do not fit together, each told at the upper of the two.
 * @param values a number at every key
 */
export function orderFaults(values: PolicyValuesByKey): PolicyFault[] {
  return policyOrders.flatMap(({ lower, upper, mayBeEqual }) => {
    const [least, most] = [values[lower] ?? NaN, values[upper] ?? NaN];
    if (least < most || (mayBeEqual && least === most)) return [];
    const words = mayBeEqual ? 'must not be below' : 'must be above';
    return [{ key: upper, message: `“${labelOf(upper)}” ${words} “${labelOf(lower)}”.` }];
  });
}

/** The policy's values with others in their place, each exactly on its step. */
export function withValues(
  values: PolicyValuesByKey,
  changes: Readonly<Record<string, number | undefined>>,
): PolicyValuesByKey {
  const changed = programPolicyKeys.flatMap((number) => {
    const value = changes[number.key];
    return value === undefined ? [] : [[number.key, toStep(value, policyStep(number))] as const];
  });
  return { ...values, ...Object.fromEntries(changed) };
}

/** How two policies differ, in the order of reading. */
export function changedKeys(from: PolicyValuesByKey, to: PolicyValuesByKey): PolicyKey[] {
  return programPolicyKeys.filter(({ key }) => from[key] !== to[key]);
}
