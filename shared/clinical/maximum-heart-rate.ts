import type { Bpm } from '../units';
import { bpm } from '../units';

/**
 * Estimates of the maximum heart rate. Ages in years, adults; results in bpm, not rounded.
 * None is a limit of safety: the scatter about each is 10 bpm or more, and a measured peak comes first.
 */

/** 220 − age. Never regressed on data; error 12.4 bpm in HERITAGE. Fox, Naughton, Haskell. Ann Clin Res 1971;3:404–432. */
export const foxMaximum = (age: number): Bpm => bpm(220 - age);

/** 208 − 0.7 age; healthy people without a rate-slowing drug, error 11.4 bpm. Tanaka et al. J Am Coll Cardiol 2001;37:153–156. */
export const tanakaMaximum = (age: number): Bpm => bpm(208 - 0.7 * age);

/** 207 − 0.7 age; healthy people. Gellish et al. Med Sci Sports Exerc 2007;39:822–829 (also printed as 206.9 − 0.67 age). */
export const gellishMaximum = (age: number): Bpm => bpm(207 - 0.7 * age);

/** 211 − 0.64 age; healthy, 19–89 years, error 10.8 bpm. Nes et al. Scand J Med Sci Sports 2013;23:697–704. */
export const nesMaximum = (age: number): Bpm => bpm(211 - 0.64 * age);

/** 206 − 0.88 age; women without symptoms. Gulati et al. Circulation 2010;122:130–137. */
export const gulatiMaximum = (age: number): Bpm => bpm(206 - 0.88 * age);

/** 164 − 0.7 age; coronary disease on a beta blocker, 40–80 years, sinus rhythm, error 18 bpm. Brawner et al. Am Heart J 2004;148:910–914. */
export const brawnerMaximum = (age: number): Bpm => bpm(164 - 0.7 * age);

/**
 * 119 + 0.5 resting − 0.5 age, less 5 on a cycle; reduced ejection fraction on a beta blocker, error 18 bpm.
 * The authors doubt its use for prescribing. Keteyian et al. Med Sci Sports Exerc 2012;44:371–376.
 */
export const keteyianMaximum = (age: number, seated: Bpm, onCycle: boolean): Bpm =>
  bpm(119 + 0.5 * seated - 0.5 * age - (onCycle ? 5 : 0));
