import { situation, tested, walked } from './facts';

/** One person each: where the clinician chose otherwise than the rules propose. */
export const choiceSituations = [
  situation('Percent of peak chosen', 'stent', {
    test: tested(137, 8.4),
    percentOfPeak: { lower: 0.65, upper: 0.75 },
    choice: { method: 'percent-of-peak', maximum: null },
  }),
  situation('Effort chosen though the rate could lead', 'stent', {
    test: tested(134, 7.6),
    choice: { method: 'perceived-exertion', maximum: null },
  }),
  situation('Resting plus chosen to start with', 'bypass', {
    seated: 78,
    walkTest: walked(366),
    choice: { method: 'resting-plus', maximum: null },
  }),
  situation('Measured maximum named, gentler intensity', 'valve', {
    test: tested(130, 6.7),
    intensity: { lower: 0.4, upper: 0.7 },
    choice: { method: 'heart-rate-reserve', maximum: 'measured' },
  }),
  situation('Estimate for coronary disease on a beta blocker', 'heart-attack', {
    walkTest: walked(430),
    choice: { method: null, maximum: 'brawner' },
    ages: [48, 74],
  }),
  situation('Estimate for a reduced ejection fraction', 'heart-failure', {
    seated: 70,
    risk: 'high',
    walkTest: walked(340),
    choice: { method: null, maximum: 'keteyian' },
    ages: [46, 68],
  }),
  ...(['tanaka', 'gellish', 'nes', 'fox'] as const).map((maximum) =>
    situation(`Estimate by age: ${maximum}`, 'stent', {
      seated: 68,
      rateActingDrugs: [],
      walkTest: walked(470),
      risk: 'low',
      choice: { method: 'heart-rate-reserve', maximum },
      ages: [42, 66],
    }),
  ),
  situation('Estimate by age for women', 'valve', {
    seated: 70,
    rateActingDrugs: [],
    walkTest: walked(455),
    risk: 'low',
    sex: 'female',
    choice: { method: null, maximum: 'gulati' },
    ages: [40, 66],
  }),
];
