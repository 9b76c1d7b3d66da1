import type {
  BloodPressure,
  Bpm,
  Meters,
  MetersPerMinute,
  Mets,
  Range,
  Vo2,
  Watts,
} from '../../units';
import type {
  ExertionRange,
  FractionRange,
  HeartRateRange,
  MaximumMethod,
  Method,
  ThresholdKind,
} from './request';
import { thresholdKinds } from './request';

export const leads = ['heart-rate', 'perceived-exertion'] as const;
export type Lead = (typeof leads)[number];

export const limitKinds = [...thresholdKinds, 'icd', 'tracking'] as const;
export type LimitKind = ThresholdKind | 'icd' | 'tracking';

/** Why heart rate does not lead, in the order in which an answer lists them. */
export const reasonCodes = [
  'rhythm',
  'assist-device',
  'transplant',
  'chronotropic-incompetence',
  'physician-sets',
  'icd-rate-unknown',
  'resting-rate-unstable',
  'reserve-too-small',
  'no-usable-test',
  'no-valid-range',
  'chosen',
] as const;
export type ReasonCode = (typeof reasonCodes)[number];

export const severities = ['stop', 'warn', 'note'] as const;
export type Severity = (typeof severities)[number];

/** Every caution in the order in which an answer lists them, with its severity. */
export const cautionSeverity = {
  'icd-rate-unknown': 'stop',
  'physician-sets': 'stop',
  'no-valid-range': 'stop',
  'test-not-usable': 'warn',
  'estimated-maximum': 'warn',
  'no-ceiling-known': 'warn',
  'ceiling-below-intensity': 'warn',
  'work-ceiling-unknown': 'warn',
  'icd-present': 'warn',
  'tracking-limit': 'warn',
  'heart-rate-unreliable': 'warn',
  'silent-ischemia-possible': 'warn',
  'claudication-leads': 'warn',
  'pressure-ceiling': 'warn',
  'oxygen-floor': 'warn',
  'resting-plus-underdoses': 'note',
  'low-capacity': 'note',
  'estimated-vo2-runs-high': 'note',
  'equation-out-of-range': 'note',
  'defer-to-local-policy': 'note',
} as const satisfies Record<string, Severity>;
export type CautionCode = keyof typeof cautionSeverity;

export interface Caution {
  readonly code: CautionCode;
  readonly severity: Severity;
  readonly message: string;
}

export interface Maximum {
  readonly method: MaximumMethod;
  readonly value: Bpm;
  /** Of an estimate, where its authors or a comparison printed one. */
  readonly standardError: Bpm | null;
}

export interface Limit {
  readonly kind: LimitKind;
  readonly threshold: Bpm;
  readonly margin: Bpm;
  /** The threshold less its margin, rounded down. */
  readonly value: Bpm;
  readonly rule: string;
  readonly source: string;
}

export interface Ceiling {
  readonly value: Bpm;
  readonly bindingLimits: readonly LimitKind[];
}

export interface Candidate {
  readonly method: Method;
  readonly maximum: MaximumMethod | null;
  readonly maximumValue: Bpm | null;
  readonly standardError: Bpm | null;
  /** Before the ceiling. */
  readonly lower: Bpm | null;
  readonly upper: Bpm | null;
  readonly applicable: boolean;
  readonly why: string;
}

export const workloadPoints = ['start', 'limit'] as const;
/** `start` is the low end of the work target, `limit` its high end. */
export type WorkloadPoint = (typeof workloadPoints)[number];

interface WorkloadRow {
  readonly point: WorkloadPoint;
  readonly mets: Mets | null;
  readonly withinEquationRange: boolean;
  /** Why there is no number, or where the row comes from; else null. */
  readonly why: string | null;
}

export interface TreadmillWorkload extends WorkloadRow {
  readonly modality: 'treadmill-walk';
  readonly speedMetersPerMinute: MetersPerMinute | null;
  readonly speedMph: number | null;
  readonly gradePercent: number | null;
}

export interface CycleWorkload extends WorkloadRow {
  readonly modality: 'cycle';
  readonly powerWatts: Watts | null;
}

export interface ArmWorkload extends WorkloadRow {
  readonly modality: 'arm';
  readonly powerWatts: Watts | null;
  /** The heart-rate range for arm work. */
  readonly target: HeartRateRange | null;
}

export interface StepWorkload extends WorkloadRow {
  readonly modality: 'step';
  readonly stepHeightMeters: Meters | null;
  readonly stepsPerMinute: number | null;
}

export interface StepperWorkload extends WorkloadRow {
  readonly modality: 'stepper';
}

export type Workload =
  TreadmillWorkload | CycleWorkload | ArmWorkload | StepWorkload | StepperWorkload;
export type Modality = Workload['modality'];

/** What the engine proposes; a person signs. Null is *no value*. */
export interface PrescriptionAnswer {
  readonly leadBy: Lead;
  readonly method: Method;
  readonly maximum: Maximum | null;
  readonly target: HeartRateRange | null;
  readonly guide: HeartRateRange | null;
  readonly ceiling: Ceiling | null;
  readonly outerLimit: Bpm | null;
  readonly askLine: Bpm | null;
  readonly limits: readonly Limit[];
  readonly intensity: FractionRange;
  readonly intensityAtCeiling: number | null;
  readonly perceivedExertion: ExertionRange & { readonly scale: 'borg-6-20' };
  readonly patientTarget: HeartRateRange | null;
  /** Beats counted in ten seconds. */
  readonly tenSecondCount: { readonly lower: number; readonly upper: number } | null;
  readonly workCeilingMets: Mets | null;
  readonly targetVo2: Range<Vo2> | null;
  readonly targetMets: Range<Mets> | null;
  readonly workloads: readonly Workload[];
  readonly pressureCeiling: BloodPressure | null;
  /** Oxygen saturation, percent. */
  readonly oxygenFloor: number | null;
  readonly candidates: readonly Candidate[];
  readonly reasons: readonly ReasonCode[];
  readonly cautions: readonly Caution[];
  readonly policyVersion: number;
  readonly engineVersion: string;
}

/** A choice that does not apply, with the reason in words. */
export interface NotApplicable {
  readonly code: 'not-applicable';
  readonly path: 'choice.method' | 'choice.maximum';
  readonly message: string;
}

export type Evaluation =
  | { readonly ok: true; readonly answer: PrescriptionAnswer }
  | { readonly ok: false; readonly error: NotApplicable };
