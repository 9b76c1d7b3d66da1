import type { Mets } from '../../units';
import { formatBloodPressure, metsOf } from '../../units';
import { cautionSeverity } from './answer';
import type { Caution, CautionCode, ReasonCode, Workload } from './answer';
import { reasonWords } from './can-lead';
import type { Decision } from './decision';
import type { Findings } from './findings';

/** What the cautions are read from. */
export interface CautionFacts {
  readonly findings: Findings;
  readonly decision: Decision;
  readonly workCeiling: Mets | null;
  readonly workloads: readonly Workload[];
}

/** Peaks under this, METs, are a low capacity. */
const lowCapacityMets = 5;

const unreliableRate: ReadonlySet<ReasonCode> = new Set<ReasonCode>([
  'rhythm',
  'assist-device',
  'transplant',
  'chronotropic-incompetence',
  'resting-rate-unstable',
]);

/** The message of a caution that is due; null when it is not. */
type Message = (facts: CautionFacts) => string | null;

const when = (isDue: boolean, message: string): string | null => (isDue ? message : null);

const isBlocked = ({ findings: { blocks } }: CautionFacts, code: ReasonCode): boolean =>
  blocks.includes(code);

const unreliable: Message = ({ decision }) => {
  const reason = decision.reasons.find((code) => unreliableRate.has(code));
  return reason === undefined
    ? null
    : `Do not train by heart rate: ${reasonWords[reason]}. Use effort, symptoms and blood pressure.`;
};

const silentIschemia: Message = ({ findings: { request } }) =>
  when(
    request.conditions.autonomicNeuropathy || request.conditions.transplant !== 'none',
    'Ischemia may come without pain: watch the ECG, breathlessness and blood pressure.',
  );

const estimatedMaximum: Message = ({ decision: { maximum } }) => {
  if (maximum === null || maximum.method === 'measured') return null;
  const { standardError } = maximum;
  const scatter =
    standardError === null ? '' : ` Its standard error is ${Number(standardError)} bpm.`;
  return `The maximum is an estimate and may be far from this patient's own.${scatter} Check it against effort.`;
};

const underdoses: Message = ({ decision: { method, guide } }) =>
  when(
    method === 'resting-plus' || guide !== null,
    'Resting plus 20 to 30 is a starting guide and often trains too little: move on to observed work or a test.',
  );

const pressureCeiling: Message = ({ findings: { request, policy } }) =>
  when(
    request.conditions.dissection,
    `Keep blood pressure under ${formatBloodPressure(policy.pressureCeiling)} during exercise.`,
  );

const oxygenFloor: Message = ({ findings: { request, policy } }) =>
  when(
    request.conditions.pulmonaryHypertension,
    `Keep oxygen saturation at or above ${policy.oxygenFloor} %; effort 11–13, no intervals.`,
  );

const isEstimatedVo2 = ({ findings: { peak } }: CautionFacts): boolean =>
  peak !== null && peak.test.vo2Source === 'estimated';

const messages: Readonly<Record<CautionCode, Message>> = {
  'icd-rate-unknown': (facts) =>
    when(
      isBlocked(facts, 'icd-rate-unknown'),
      'The detection rates of the ICD are not known: get them before training.',
    ),
  'physician-sets': (facts) =>
    when(
      isBlocked(facts, 'physician-sets'),
      'Outflow obstruction or severe stenosis: a physician sets rate, effort and work.',
    ),
  'no-valid-range': ({ decision }) =>
    when(
      decision.reasons.includes('no-valid-range'),
      'No heart-rate range of useful width is left: train by light effort and ask the physician.',
    ),
  'test-not-usable': ({ findings: { request, test } }) =>
    request.test === null || test.usable
      ? null
      : `The test does not serve heart rates. ${test.why}`,
  'estimated-maximum': estimatedMaximum,
  'no-ceiling-known': ({ findings }) =>
    when(findings.ceiling === null, 'No ceiling is known: ask at the ask line, stop on signs.'),
  'ceiling-below-intensity': ({ decision }) =>
    when(
      decision.cutByCeiling,
      'The ceiling lies below the upper end of the intensity, and cuts it.',
    ),
  'work-ceiling-unknown': ({ findings: { request }, workCeiling }) =>
    when(
      request.thresholds.length > 0 && workCeiling === null,
      'A threshold is known but not the work at which it comes: no work is prescribed.',
    ),
  'icd-present': ({ findings: { request } }) =>
    when(
      request.devices.icd.status === 'present',
      'An ICD is present: confirm its lowest zone at each device check.',
    ),
  'tracking-limit': ({ findings: { request } }) =>
    when(
      request.devices.upperTrackingRate !== null,
      'At the upper tracking rate a pacemaker may drop beats: the rate can fall suddenly.',
    ),
  'heart-rate-unreliable': unreliable,
  'silent-ischemia-possible': silentIschemia,
  'claudication-leads': ({ findings: { request } }) =>
    when(
      request.conditions.peripheralArteryDisease,
      'Leg pain may end the work before the heart does: walk to moderate pain, then rest.',
    ),
  'pressure-ceiling': pressureCeiling,
  'oxygen-floor': oxygenFloor,
  'resting-plus-underdoses': underdoses,
  'low-capacity': ({ findings: { peak } }) =>
    when(
      peak !== null && metsOf(peak.vo2) < lowCapacityMets,
      `The peak is under ${lowCapacityMets} METs: short bouts with rests.`,
    ),
  'estimated-vo2-runs-high': (facts) =>
    when(
      isEstimatedVo2(facts),
      'Oxygen uptake was estimated from the treadmill or cycle, which runs high, most with handrail support.',
    ),
  'equation-out-of-range': ({ workloads }) =>
    when(
      workloads.some(({ withinEquationRange }) => !withinEquationRange),
      'Some machines have no workload from the metabolic equations: each row says why.',
    ),
  'defer-to-local-policy': () =>
    'Local policy, orders and licensed judgment prevail over every number here.',
};

const codes = Object.keys(cautionSeverity) as CautionCode[];

/** Every caution that is due, in the order of the list of codes, each once. */
export function cautionsOf(facts: CautionFacts): Caution[] {
  const cautions: Caution[] = [];
  for (const code of codes) {
    const message = messages[code](facts);
    if (message !== null) cautions.push({ code, severity: cautionSeverity[code], message });
  }
  return cautions;
}
