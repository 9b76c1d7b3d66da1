import { describe, expect, it } from 'vitest';
import { isAtLeast } from './node-version.mjs';

describe('versions of Node', () => {
  it.each([
    ['20.19.0', '20.19.0', true],
    ['20.20.2', '20.19.0', true],
    ['22.0.0', '20.19.0', true],
    ['20.9.0', '20.19.0', false],
    ['18.20.4', '20.19.0', false],
  ])('%s for %s: %s', (version, least, enough) => {
    expect(isAtLeast(version, least)).toBe(enough);
  });
});
