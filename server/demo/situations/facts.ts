import type { PrescriptionRequestInput } from '@shared/contracts/prescriptions-contract';
import type { diagnosisKind } from '../../database/schema';

export type DiagnosisKind = (typeof diagnosisKind.enumValues)[number];
type Request = PrescriptionRequestInput;
export type Conditions = Request['conditions'];
export type ThresholdFacts = Request['thresholds'][number];
export type RateActingDrug = NonNullable<Request['rateActingDrugs']>[number];
export type TestFacts = NonNullable<Request['test']>;

/** What a record says of a person when the course begins; the words are those of the prescribing request. */
export interface Facts extends Pick<
  Request,
  | 'resting'
  | 'risk'
  | 'rhythm'
  | 'rateActingDrugs'
  | 'conditions'
  | 'devices'
  | 'test'
  | 'thresholds'
  | 'walkTest'
  | 'intensity'
  | 'percentOfPeak'
  | 'choice'
> {
  readonly pacemaker: boolean;
  /** Whether height and weight are known. */
  readonly measured: boolean;
}

/** A situation that the rules of prescribing tell apart. */
export interface Situation {
  readonly name: string;
  readonly diagnosis: DiagnosisKind;
  /** How often it comes among the usual ones; 0: one person of it, as the table says to the digit. */
  readonly share: number;
  readonly ages: readonly [youngest: number, oldest: number];
  readonly sex: 'female' | 'male' | 'unknown' | 'either';
  readonly facts: Facts;
}

type ExceptFacts = Partial<Pick<Situation, 'ages' | 'sex'>>;
type Stated = Partial<Omit<Facts, 'conditions' | 'devices' | 'resting'>> &
  ExceptFacts & {
    readonly seated?: number;
    readonly standing?: number | null;
    readonly spread?: number | null;
    readonly conditions?: Partial<Conditions>;
    readonly icd?: Facts['devices']['icd'];
    readonly upperTrackingRate?: number;
  };

const coronary: readonly DiagnosisKind[] = ['heart-attack', 'stent', 'bypass', 'stable-angina'];

function conditionsOf(diagnosis: DiagnosisKind): Conditions {
  return {
    coronaryDisease: coronary.includes(diagnosis),
    heartFailure: ['heart-failure', 'assist-device'].includes(diagnosis) ? 'reduced' : 'none',
    transplant: diagnosis === 'transplant' ? 'denervated' : 'none',
    ventricularAssistDevice: diagnosis === 'assist-device',
    chronotropicIncompetence: false,
    autonomicNeuropathy: false,
    pulmonaryHypertension: false,
    dissection: false,
    peripheralArteryDisease: false,
    outflowObstruction: false,
  };
}

function factsOf(diagnosis: DiagnosisKind, stated: Stated): Facts {
  const { seated = 66, standing = seated + 7, spread = 5 } = stated;
  return {
    resting: { seated, standing, spread },
    risk: stated.risk ?? 'moderate',
    rhythm: stated.rhythm ?? 'sinus',
    rateActingDrugs:
      stated.rateActingDrugs === undefined ? ['beta-blocker'] : stated.rateActingDrugs,
    conditions: { ...conditionsOf(diagnosis), ...stated.conditions },
    devices: {
      icd: stated.icd ?? { status: 'none', zones: [] },
      upperTrackingRate: stated.upperTrackingRate ?? null,
    },
    test: stated.test ?? null,
    thresholds: stated.thresholds ?? [],
    walkTest: stated.walkTest ?? null,
    intensity: stated.intensity ?? null,
    percentOfPeak: stated.percentOfPeak ?? null,
    choice: stated.choice ?? { method: null, maximum: null },
    pacemaker: stated.pacemaker ?? stated.upperTrackingRate !== undefined,
    measured: stated.measured ?? true,
  };
}

/** One row of a table of situations: what is not stated is the usual. */
export function situation(
  name: string,
  diagnosis: DiagnosisKind,
  stated: Stated,
  share = 0,
): Situation {
  return {
    name,
    diagnosis,
    share,
    ages: stated.ages ?? [50, 84],
    sex: stated.sex ?? 'either',
    facts: factsOf(diagnosis, stated),
  };
}

/** A test that stands: ended by fatigue, on today's drugs, same rhythm and device, nothing since. */
export function tested(
  peakHeartRate: number,
  peakMets: number | null,
  but: Partial<TestFacts> = {},
): TestFacts {
  return {
    mode: 'treadmill',
    daysAgo: 16,
    endedBy: 'fatigue',
    sameRateActingDrugs: true,
    sameRhythmAndDevice: true,
    eventSince: false,
    restingHeartRate: null,
    peakHeartRate,
    peakVo2: null,
    peakMets,
    vo2Source: 'estimated',
    ...but,
  };
}

/** A cardiopulmonary test: uptake measured, mL/kg/min. */
export function breathTested(
  peakHeartRate: number,
  peakVo2: number,
  but: Partial<TestFacts> = {},
): TestFacts {
  return tested(peakHeartRate, null, { peakVo2, vo2Source: 'measured', ...but });
}

export const walked = (distanceMeters: number): Facts['walkTest'] => ({ distanceMeters });
