import { isFraction } from '@shared/clinical/program-policy';
import type { PolicyItem } from '@shared/contracts/policy-in-force-contract';

/** A number of the policy as people read it: a fraction as percent, a count without a unit. */
export function policyNumber(value: number, number: Pick<PolicyItem, 'unit' | 'highest'>): string {
  const shown = new Intl.NumberFormat('en-US', { maximumFractionDigits: 2 });
  if (isFraction(number)) return `${shown.format(value * 100)} %`;
  return number.unit === '' ? shown.format(value) : `${shown.format(value)} ${number.unit}`;
}
