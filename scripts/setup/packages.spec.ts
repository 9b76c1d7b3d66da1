import { describe, expect, it } from 'vitest';
import { outdatedPackages } from './packages.mjs';

const locked = {
  '': { version: '0.1.0' },
  'node_modules/pg': { version: '8.0.0' },
  'node_modules/for-another-system': { version: '1.0.0', optional: true },
};

describe('the packages that npm installed last', () => {
  it('are as the lock file says, even without those of other systems', () => {
    expect(outdatedPackages(locked, { 'node_modules/pg': { version: '8.0.0' } })).toEqual([]);
  });

  it.each([
    ['one is missing', {}, ['node_modules/pg']],
    ['one is of another version', { 'node_modules/pg': { version: '7.9.0' } }, ['node_modules/pg']],
    [
      'one is left over',
      { 'node_modules/pg': { version: '8.0.0' }, 'node_modules/old': { version: '1.0.0' } },
      ['node_modules/old'],
    ],
    [
      'an optional one is of another version',
      {
        'node_modules/pg': { version: '8.0.0' },
        'node_modules/for-another-system': { version: '0.9.0' },
      },
      ['node_modules/for-another-system'],
    ],
  ])('are not when %s', (_case, installed, expected) => {
    expect(outdatedPackages(locked, installed)).toEqual(expected);
  });
});
