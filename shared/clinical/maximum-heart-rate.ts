import type { Bpm } from '../units';
import { bpm } from '../units';
import type { KnownSex } from './known-sex';

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

/**
 * Equations in print that no range of ours is built on; for comparison, and so that a form met elsewhere can be told apart.
 */

/** 206.9 − 0.67 age: also in print as Gellish's; at 60 years 1.7 bpm above 207 − 0.7 age. */
export const gellishVariantMaximum = (age: number): Bpm => bpm(206.9 - 0.67 * age);

/** 209 − 0.7 age: the laboratory part of Tanaka et al. J Am Coll Cardiol 2001;37:153–156. */
export const tanakaLaboratoryMaximum = (age: number): Bpm => bpm(209 - 0.7 * age);

/** Men 220 − 0.95 age, women 210 − 0.79 age; healthy people. Sydó et al. Mayo Clin Proc 2014;89:1664–1672. */
export const sydoMaximum = (age: number, sexAtBirth: KnownSex): Bpm =>
  bpm(sexAtBirth === 'male' ? 220 - 0.95 * age : 210 - 0.79 * age);

/**
 * 109 − 0.5 age + 0.5 resting + 0.2 ejection fraction, less 5 with hemoglobin under 11 g/dL; reduced ejection fraction on
 * a beta blocker, error 17.5 bpm. MECKI score group, Eur J Prev Cardiol 2023.
 * @param ejectionFraction percent
 * @param hemoglobin g/dL
 */
export const meckiMaximum = (
  age: number,
  seated: Bpm,
  ejectionFraction: number,
  hemoglobin: number,
): Bpm => bpm(109 - 0.5 * age + 0.5 * seated + 0.2 * ejectionFraction - (hemoglobin < 11 ? 5 : 0));

/** 168 − 0.76 age; heart failure of ischemic cause on a beta blocker. J Card Fail 2012;18:831–836. */
export const ischemicHeartFailureMaximum = (age: number): Bpm => bpm(168 - 0.76 * age);

/** 205.8 − 0.685 age; healthy people. Inbar et al. Med Sci Sports Exerc 1994;26:538–546. */
export const inbarMaximum = (age: number): Bpm => bpm(205.8 - 0.685 * age);

/** Inbar's less 30 on a beta blocker: a convention of UK teaching, not a measurement. */
export const inbarBetaBlockerMaximum = (age: number): Bpm => bpm(inbarMaximum(age) - 30);

/** 179 + 0.29 age − 0.011 age²; 18–50 years only. CARDIA study. */
export const cardiaMaximum = (age: number): Bpm => bpm(179 + 0.29 * age - 0.011 * age ** 2);
