import type { Minutes, Vo2 } from '../../units';
import { vo2 } from '../../units';
import type { KnownSex } from '../known-sex';

/**
 * Peak oxygen uptake, mL/kg/min, from time on the treadmill in decimal minutes. The functions compute anywhere;
 * `treadmillTimeEstimates` says which of them holds for a test.
 */

/** Men, Bruce, no handrail. 14.8 − 1.379 T + 0.451 T² − 0.012 T³; falls until 1.64 min. Foster 1984. */
export const fosterVo2 = (time: Minutes): Vo2 =>
  vo2(14.8 - 1.379 * time + 0.451 * time ** 2 - 0.012 * time ** 3);

/** Women, Bruce: 4.38 T − 3.9. Pollock 1982. */
export const pollockWomenVo2 = (time: Minutes): Vo2 => vo2(4.38 * time - 3.9);

/** Men, Bruce: 4.33 T − 4.66. Pollock 1976. */
export const pollockMenVo2 = (time: Minutes): Vo2 => vo2(4.33 * time - 4.66);

/** Sedentary men, Bruce: 3.29 T + 4.07. Bruce 1973. */
export const bruceSedentaryMenVo2 = (time: Minutes): Vo2 => vo2(3.29 * time + 4.07);

/** Men with heart disease, Bruce: 2.327 T + 9.48. Bruce 1973, from memory. */
export const bruceCardiacMenVo2 = (time: Minutes): Vo2 => vo2(2.327 * time + 9.48);

/** Either sex, Bruce: 6.70 − 2.82 sex (man 1, woman 2) + 0.056 seconds. Bruce 1973, from memory. */
export const bruceGeneralizedVo2 = (time: Minutes, sexAtBirth: KnownSex): Vo2 =>
  vo2(6.7 - 2.82 * (sexAtBirth === 'male' ? 1 : 2) + 0.056 * 60 * time);

/** Bruce: 3.18 T − 0.59. Froelicher. */
export const froelicherVo2 = (time: Minutes): Vo2 => vo2(3.18 * time - 0.59);

/** Men, Balke: 1.44 T + 14.99. Pollock. */
export const pollockBalkeVo2 = (time: Minutes): Vo2 => vo2(1.44 * time + 14.99);
