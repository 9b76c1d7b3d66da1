/** The values that are possible in a request, ends included; outside them a request is refused. */
export const requestBounds = {
  ageYears: { lowest: 18, highest: 110 },
  heightCm: { lowest: 100, highest: 250 },
  weightKg: { lowest: 25, highest: 350 },
  seatedRate: { lowest: 30, highest: 130 },
  /** Standing raises the rate above the seated one. */
  otherRestingRate: { lowest: 30, highest: 180 },
  restingSpread: { lowest: 0, highest: 150 },
  programWeek: { lowest: 1, highest: 520 },
  icdRate: { lowest: 80, highest: 300 },
  trackingRate: { lowest: 50, highest: 220 },
  testDaysAgo: { lowest: 0, highest: 36_500 },
  peakRate: { lowest: 60, highest: 230 },
  vo2: { lowest: 4, highest: 80 },
  mets: { lowest: 1, highest: 25 },
  thresholdRate: { lowest: 40, highest: 230 },
  observedRate: { lowest: 30, highest: 230 },
  observedSessions: { lowest: 0, highest: 1000 },
  exertion: { lowest: 6, highest: 20 },
  walkMeters: { lowest: 1, highest: 2000 },
  fraction: { lowest: 0, highest: 1 },
} as const satisfies Record<string, Bounds>;

export interface Bounds {
  readonly lowest: number;
  readonly highest: number;
}

/** More rows than a person's record could need; a longer list is refused. */
export const requestLengths = { thresholds: 100, icdZones: 20, rateActingDrugs: 20 } as const;
