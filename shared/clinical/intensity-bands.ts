export const intensityBands = [
  'very light',
  'light',
  'moderate',
  'vigorous',
  'near-maximal',
] as const;
/** The names of the ACSM's bands. */
export type IntensityBand = (typeof intensityBands)[number];

export const escIntensityBands = ['low', 'moderate', 'high', 'very high'] as const;
/** The names of the ESC's bands; its *moderate* reaches higher than the ACSM's. */
export type EscIntensityBand = (typeof escIntensityBands)[number];

/** Where light, moderate, vigorous and near-maximal begin. The printed whole numbers leave no gap: 39.9 is light. */
type Edges = readonly [light: number, moderate: number, vigorous: number, nearMaximal: number];

const bandAt =
  (edges: Edges) =>
  (value: number): IntensityBand =>
    intensityBands[edges.filter((edge) => value >= edge).length] ?? 'near-maximal';

/**
 * ACSM bands (Garber et al. Med Sci Sports Exerc 2011;43:1334–1359; the table read in a reprint). A reprint puts 95 % of the
 * maximal rate into two bands; the ACSM begins near-maximal at 96.
 */

/** Band of a percentage of heart-rate reserve or VO2 reserve. */
export const bandOfReserve = bandAt([30, 40, 60, 90]);

/** Band of a percentage of the maximal heart rate, measured. */
export const bandOfMaximum = bandAt([57, 64, 77, 96]);

/** Band of an effort on the Borg 6–20 scale. */
export const bandOfExertion = bandAt([9, 12, 14, 18]);

/**
 * ESC band of a percentage of heart-rate reserve: low below 40, moderate below 70, high to 85, then very high.
 * @see ESC sports cardiology guideline 2020, from memory
 */
export function escBandOfReserve(percent: number): EscIntensityBand {
  if (percent < 40) return 'low';
  if (percent < 70) return 'moderate';
  return percent <= 85 ? 'high' : 'very high';
}
