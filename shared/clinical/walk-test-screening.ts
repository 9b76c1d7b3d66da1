import type { BloodPressure, Bpm } from '../units';

export const walkStandards = ['ats-2002', 'ers-ats-2014'] as const;
/** The two documents differ widely: the program chooses one. */
export type WalkStandard = (typeof walkStandards)[number];

export const walkStandardSources: Readonly<Record<WalkStandard, string>> = {
  'ats-2002': 'ATS statement, Am J Respir Crit Care Med 2002;166:111–117; numbers from memory',
  'ers-ats-2014': 'ERS/ATS technical standard 2014, Table 4',
};

interface Limits {
  readonly heartRate: number | null;
  readonly systolic: number;
  readonly diastolic: number;
  /** At or under it no walk on room air, percent. */
  readonly oxygen: number | null;
}

const limits: Readonly<Record<WalkStandard, Limits>> = {
  'ats-2002': { heartRate: 120, systolic: 180, diastolic: 100, oxygen: null },
  'ers-ats-2014': { heartRate: null, systolic: 200, diastolic: 120, oxygen: 85 },
};

/** Resting readings before a walk; null is not measured. */
export interface BeforeWalk {
  readonly heartRate: Bpm | null;
  readonly pressure: BloodPressure | null;
  /** Percent, room air. */
  readonly oxygenSaturation: number | null;
  /** Unstable angina or an infarction within the standard's time. */
  readonly recentEvent: boolean | null;
}

export interface WalkScreening {
  /** `ask` while something that the standard asks for is missing. */
  readonly verdict: 'proceed' | 'relative' | 'contraindicated' | 'ask';
  readonly why: readonly string[];
}

/** Whether a reading is there, asked for, and above its limit. */
const exceeds = (value: number | null | undefined, limit: number | null): boolean =>
  value !== null && value !== undefined && limit !== null && value > limit;

function missingOf(before: BeforeWalk, { heartRate, oxygen }: Limits): string[] {
  return [
    ...(before.recentEvent === null ? ['Ask for unstable angina and a recent infarction.'] : []),
    ...(heartRate !== null && before.heartRate === null ? ['Count the resting rate.'] : []),
    ...(before.pressure === null ? ['Measure the blood pressure.'] : []),
    ...(oxygen !== null && before.oxygenSaturation === null ? ['Measure the saturation.'] : []),
  ];
}

function relativeOf({ heartRate, pressure }: BeforeWalk, limit: Limits): string[] {
  return [
    ...(exceeds(heartRate, limit.heartRate)
      ? [`The resting rate is above ${limit.heartRate ?? ''}.`]
      : []),
    ...(exceeds(pressure?.systolic, limit.systolic) || exceeds(pressure?.diastolic, limit.diastolic)
      ? [`Blood pressure is above ${limit.systolic}/${limit.diastolic} mmHg.`]
      : []),
  ];
}

/** Whether a six-minute walk may begin, by the chosen standard; a person decides. */
export function screenWalk(before: BeforeWalk, standard: WalkStandard): WalkScreening {
  const limit = limits[standard];
  const { oxygenSaturation, recentEvent } = before;
  if (recentEvent === true) {
    return { verdict: 'contraindicated', why: ['Unstable angina or a recent infarction.'] };
  }
  if (limit.oxygen !== null && oxygenSaturation !== null && oxygenSaturation <= limit.oxygen) {
    const why = `Saturation is ${limit.oxygen} % or less on room air: test on oxygen instead.`;
    return { verdict: 'contraindicated', why: [why] };
  }
  const missing = missingOf(before, limit);
  const relative = relativeOf(before, limit);
  if (relative.length > 0) return { verdict: 'relative', why: [...relative, ...missing] };
  return missing.length > 0 ? { verdict: 'ask', why: missing } : { verdict: 'proceed', why: [] };
}
