import { describe, expect, it } from 'vitest';
import common from './common-passwords.json';
import { normalizePassword, passwordFault } from './password-rule';

const about = ['nora.castellan@harborlane.example', 'Nora Castellan', 'Quayside'];
const faultOf = (password: string) => passwordFault(normalizePassword(password), about);

describe('which passwords will do', () => {
  it.each([
    'correct horse battery staple',
    'seven lanterns on the quay',
    '               x   y   z          7 of 9',
    'ΑΒΓ δελτίο ταχυδρομείου',
    'Harbor-Lane-36-steps',
    '839201746520183',
    'a'.repeat(3) +
      ' tidy row of words that is long enough, at a hundred and some characters in all, as managers make them',
  ])('takes %s', (password) => expect(faultOf(password)).toBeNull());

  it.each([
    ['short', 'too-short'],
    ['fourteen chars', 'too-short'],
    ['🛟'.repeat(14), 'too-short'],
    ['x y '.repeat(40), 'too-long'],
  ])('measures in characters: %s is %s', (password, fault) => {
    expect(faultOf(password)).toBe(fault);
  });

  it.each([
    ...common.passwords
      .split(' ')
      .filter((password) => password.length >= 15)
      .slice(0, 20),
    'passwordpassword',
    'PasswordPassword',
    'aaaaaaaaaaaaaaa',
    'abcabcabcabcabc',
    '123456789012345',
    'abcdefghijklmno',
    'qwertyuiopasdfghjkl',
    'password1234567',
    'princess!!!!!!!',
    '0000000monkey00',
    'qwertyqwertyqwerty',
  ])('refuses what is tried first: %s', (password) => expect(faultOf(password)).toBe('common'));

  it.each([
    'plimsoll-plimsoll',
    'Plimsoll-2026-11',
    'nurse.Nurse.nurse!',
    'physiologist-7!',
    'cardiac rehab 24',
    'castellan-nora-1',
    'harborlane2026!!',
    'Quayside-Clinic-1',
  ])('refuses what leans on this place: %s', (password) =>
    expect(faultOf(password)).toBe('context'),
  );

  it('lists more than 3,000 of the most used', () => {
    expect(common.passwords.split(' ').length).toBeGreaterThan(10_000);
  });

  it('answers at once, whatever it is given', () => {
    const start = performance.now();
    faultOf('ab'.repeat(64));
    faultOf('a'.repeat(127) + 'b');
    expect(performance.now() - start).toBeLessThan(100);
  });
});
