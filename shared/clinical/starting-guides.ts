/**
 * What patients of one trial truly did when they trained by a guide that needs no test: percent of VO2 reserve. Eleven
 * patients: one guide trains too little, the other too hard, so both are looked at together.
 * @see Joo et al. 2004, PubMed 15235299
 */
export const observedDoseOfGuides = {
  'resting-plus-20': { patients: 11, mean: 41.8, deviation: 12.3 },
  'perceived-exertion-11-13': { patients: 11, mean: 71, deviation: 15.3 },
} as const;
