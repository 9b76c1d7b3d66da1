import type { Bpm } from '../../units';
import { bpm } from '../../units';
import {
  brawnerMaximum,
  foxMaximum,
  gellishMaximum,
  gulatiMaximum,
  keteyianMaximum,
  nesMaximum,
  tanakaMaximum,
} from '../maximum-heart-rate';
import type { Findings } from './findings';
import type { MaximumMethod, PrescriptionRequest } from './request';

type EstimatedMaximum = Exclude<MaximumMethod, 'measured'>;

interface Estimate {
  readonly value: (request: PrescriptionRequest) => Bpm;
  readonly standardError: Bpm | null;
  /** Why the equation is not for this patient; null when it is. */
  readonly whyNot: (request: PrescriptionRequest) => string | null;
  readonly why: string;
}

/** The ages of Brawner's patients, years. */
const brawnerAges = { lowest: 40, highest: 80 };

function whyNotHealthy({ rateActingDrugs, conditions }: PrescriptionRequest): string | null {
  if (rateActingDrugs === null)
    return 'Rate-acting drugs are not known, which counts as taking one.';
  if (rateActingDrugs.length > 0) return 'For healthy adults only: a rate-acting drug is taken.';
  if (conditions.chronotropicIncompetence) return 'Not with chronotropic incompetence.';
  if (conditions.autonomicNeuropathy) return 'Not with autonomic neuropathy.';
  return null;
}

function whyNotWoman(request: PrescriptionRequest): string | null {
  if (request.patient.sexAtBirth !== 'female') return 'For women only.';
  return whyNotHealthy(request);
}

function whyNotOnBetaBlockerInSinus({
  rateActingDrugs,
  rhythm,
}: PrescriptionRequest): string | null {
  if (!rateActingDrugs?.includes('beta-blocker')) return 'Only on a beta blocker.';
  return rhythm === 'sinus' ? null : 'Only in sinus rhythm.';
}

function whyNotBrawner(request: PrescriptionRequest): string | null {
  const { ageYears } = request.patient;
  const { coronaryDisease, heartFailure } = request.conditions;
  if (!coronaryDisease) return 'Only for coronary disease.';
  if (ageYears < brawnerAges.lowest || ageYears > brawnerAges.highest) {
    return `Only from ${brawnerAges.lowest} to ${brawnerAges.highest} years.`;
  }
  if (heartFailure !== 'none' && heartFailure !== 'preserved') {
    return 'Only without heart failure, or with a preserved ejection fraction.';
  }
  return whyNotOnBetaBlockerInSinus(request);
}

function whyNotKeteyian(request: PrescriptionRequest): string | null {
  if (request.conditions.heartFailure !== 'reduced') return 'Only for a reduced ejection fraction.';
  return whyNotOnBetaBlockerInSinus(request);
}

const healthy = (
  value: (age: number) => Bpm,
  standardError: Bpm | null,
  why: string,
): Estimate => ({
  value: ({ patient }) => value(patient.ageYears),
  standardError,
  whyNot: whyNotHealthy,
  why,
});

const estimates: Readonly<Record<EstimatedMaximum, Estimate>> = {
  fox: healthy(foxMaximum, bpm(12.4), 'Estimate for healthy adults, Fox 1971: 220 − age.'),
  tanaka: healthy(
    tanakaMaximum,
    bpm(11.4),
    'Estimate for healthy adults, Tanaka 2001: 208 − 0.7 × age.',
  ),
  gellish: healthy(
    gellishMaximum,
    null,
    'Estimate for healthy adults, Gellish 2007: 207 − 0.7 × age.',
  ),
  nes: healthy(nesMaximum, bpm(10.8), 'Estimate for healthy adults, Nes 2013: 211 − 0.64 × age.'),
  gulati: {
    ...healthy(gulatiMaximum, null, 'Estimate for healthy women, Gulati 2010: 206 − 0.88 × age.'),
    whyNot: whyNotWoman,
  },
  brawner: {
    value: ({ patient }) => brawnerMaximum(patient.ageYears),
    standardError: bpm(18),
    whyNot: whyNotBrawner,
    why: 'Estimate for coronary disease on a beta blocker, Brawner 2004: 164 − 0.7 × age.',
  },
  keteyian: {
    value: ({ patient, resting, test }) =>
      keteyianMaximum(patient.ageYears, resting.seated, test?.mode === 'cycle'),
    standardError: bpm(18),
    whyNot: whyNotKeteyian,
    why: 'Estimate for reduced ejection fraction on a beta blocker, Keteyian 2012.',
  },
};

/** A maximum that applies, or why it does not. */
export type MaximumFinding =
  | {
      readonly applicable: true;
      readonly value: Bpm;
      readonly standardError: Bpm | null;
      readonly why: string;
    }
  | { readonly applicable: false; readonly why: string };

function measuredPeak({ test }: Findings): MaximumFinding {
  if (!test.usable) return { applicable: false, why: test.why };
  const value = test.test.peakHeartRate;
  return { applicable: true, value, standardError: null, why: "Peak measured on today's drugs." };
}

/** The measured peak, or an estimate where no usable test exists and the equation is for this patient. */
export function maximumOf(method: MaximumMethod, findings: Findings): MaximumFinding {
  if (method === 'measured') return measuredPeak(findings);
  if (findings.test.usable) {
    return { applicable: false, why: 'A measured peak is there and comes first.' };
  }
  const { value, standardError, why, whyNot } = estimates[method];
  const objection = whyNot(findings.request);
  if (objection !== null) return { applicable: false, why: objection };
  return { applicable: true, value: value(findings.request), standardError, why };
}
