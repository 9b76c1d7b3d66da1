import { describe, expect, it } from 'vitest';
import { defaultPolicy } from './policy';
import { policyKeys, policyValue } from './policy-keys';

function leaves(part: object, above: readonly string[] = []): string[] {
  return Object.entries(part).flatMap(([name, value]) =>
    typeof value === 'object' && value !== null
      ? leaves(value as object, [...above, name])
      : [[...above, name].join('.')],
  );
}

describe('the keys of the policy', () => {
  it('are every number of it but the version, each once', () => {
    const numbers = leaves(defaultPolicy).filter((key) => key !== 'version');
    expect(policyKeys.map(({ key }) => key).sort()).toEqual(numbers.sort());
  });

  it.each(policyKeys)('$key has a default within its bounds, and a source', (row) => {
    expect(row.default).toBeGreaterThanOrEqual(row.lowest);
    expect(row.default).toBeLessThanOrEqual(row.highest);
    expect(row.source).not.toBe('');
  });

  it('has no value at what is no key', () => {
    expect(() => policyValue(defaultPolicy, 'intensity.wide')).toThrow(RangeError);
    expect(() => policyValue(defaultPolicy, 'nothing.here')).toThrow(RangeError);
  });
});
