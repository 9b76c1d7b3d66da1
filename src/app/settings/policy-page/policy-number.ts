/** A number of the policy as people read it: a fraction, which has no unit, as percent. */
export function policyNumber(value: number, unit: string): string {
  const shown = new Intl.NumberFormat('en-US', { maximumFractionDigits: 2 });
  return unit === '' ? `${shown.format(value * 100)} %` : `${shown.format(value)} ${unit}`;
}
