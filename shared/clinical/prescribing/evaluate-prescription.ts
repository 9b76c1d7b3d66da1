import type { Bpm } from '../../units';
import { bpm, roundDown } from '../../units';
import type { Evaluation, PrescriptionAnswer } from './answer';
import { cautionsOf } from './cautions';
import { chosenOption } from './choice';
import { decide } from './decision';
import type { Decision } from './decision';
import { exertionOf } from './effort';
import { findingsOf } from './findings';
import type { Findings } from './findings';
import { patientTargetOf, tenSecondCountOf } from './for-the-patient';
import { candidateOf, optionsOf } from './options';
import type { Option } from './options';
import type { PrescriptionPolicy } from './policy';
import type { PrescriptionRequest } from './request';
import { workCeilingOf } from './work-ceiling';
import { targetMetsOf, targetVo2Of } from './work-target';
import { workloadsOf } from './workloads/workloads';

/** Stored with every prescription: the same inputs, policy and engine give the same answer years later. */
export const engineVersion = '1.0.0';

/** Where no ceiling is known, the rate at which the floor asks. */
function askLineOf({ ceiling, policy }: Findings, { target }: Decision): Bpm | null {
  if (target === null || ceiling !== null) return null;
  return bpm(roundDown(target.upper + policy.askLine.above));
}

function answerOf(
  findings: Findings,
  options: readonly Option[],
  chosen: Option,
): PrescriptionAnswer {
  const { request, policy, ceiling } = findings;
  const { dissection, pulmonaryHypertension } = request.conditions;
  const decision = decide(findings, options, chosen);
  const { target } = decision;
  const workCeiling = workCeilingOf(findings);
  const targetVo2 = targetVo2Of(findings, decision, workCeiling);
  const targetMets = targetMetsOf(targetVo2, workCeiling);
  const workloads = workloadsOf(findings, decision, targetMets);
  // Written out rather than spread together: spreading takes half of the time of an evaluation.
  return {
    leadBy: target === null ? 'perceived-exertion' : 'heart-rate',
    method: decision.method,
    maximum: decision.maximum,
    target,
    guide: decision.guide,
    ceiling,
    outerLimit: findings.usableTest?.peakHeartRate ?? null,
    askLine: askLineOf(findings, decision),
    limits: findings.limits,
    intensity: findings.intensity,
    intensityAtCeiling: findings.intensityAtCeiling,
    perceivedExertion: exertionOf(findings, decision, workCeiling),
    patientTarget: patientTargetOf(target, ceiling),
    tenSecondCount: tenSecondCountOf(target, ceiling),
    workCeilingMets: workCeiling,
    targetVo2,
    targetMets,
    workloads,
    pressureCeiling: dissection ? policy.pressureCeiling : null,
    oxygenFloor: pulmonaryHypertension ? policy.oxygenFloor : null,
    candidates: options.map(candidateOf),
    reasons: decision.reasons,
    cautions: cautionsOf({ findings, decision, workCeiling, workloads }),
    policyVersion: policy.version,
    engineVersion,
  };
}

/**
 * Proposes a heart-rate range, effort and work from the facts of a patient; a person signs.
 * Pure: the same request and policy give the same answer.
 * @param request within the bounds of `requestBounds`; peak rates above resting rates, lower ends below upper ends
 * @param policy within the bounds of `policyBounds`
 * @returns the answer, or why the clinician's choice of method or maximum does not apply
 */
export function evaluatePrescription(
  request: PrescriptionRequest,
  policy: PrescriptionPolicy,
): Evaluation {
  const findings = findingsOf(request, policy);
  const options = optionsOf(findings);
  const chosen = chosenOption(options, findings);
  if ('code' in chosen) return { ok: false, error: chosen };
  return { ok: true, answer: answerOf(findings, options, chosen) };
}
