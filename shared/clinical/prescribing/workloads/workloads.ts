import type { Mets, Range } from '../../../units';
import type { Workload } from '../answer';
import { workloadPoints } from '../answer';
import type { Decision } from '../decision';
import type { Findings } from '../findings';
import type { TestMode } from '../request';
import { isStopped } from '../stop';
import { armTargetOf, armWorkload } from './arm';
import { cycleWorkload } from './cycle';
import type { WorkPoint } from './point';
import { stepWorkload, stepperWorkload } from './step';
import { treadmillWorkload, walkStart } from './treadmill';

/** In the order in which an answer lists the rows. */
const modalities: readonly ((at: WorkPoint) => Workload)[] = [
  treadmillWorkload,
  cycleWorkload,
  armWorkload,
  stepWorkload,
  stepperWorkload,
];

const pointEnd = { start: 'lower', limit: 'upper' } as const;

/** Two points a modality, for the low and the high end of the work target. */
function fromTarget(
  { request, policy }: Findings,
  mode: TestMode,
  target: Decision['target'],
  targetMets: Range<Mets>,
): Workload[] {
  const arm = {
    testMode: mode,
    workFraction: policy.arm.workFraction,
    target: armTargetOf(target, mode, policy),
  };
  const { weightKg: weight } = request.patient;
  const { equipment } = policy;
  const points = workloadPoints.map((point): WorkPoint => {
    return { point, work: targetMets[pointEnd[point]], weight, equipment, arm };
  });
  return modalities.flatMap((rowAt) => points.map(rowAt));
}

/** From the six-minute walk alone: nothing else tells the work, no threshold is known and nothing stops. */
function fromWalk(findings: Findings, decision: Decision): Workload[] {
  const { request, policy, peak } = findings;
  const { walkTest, thresholds } = request;
  if (walkTest === null || peak !== null || thresholds.length > 0) return [];
  return isStopped(findings, decision) ? [] : [walkStart(walkTest.distanceMeters, policy)];
}

export function workloadsOf(
  findings: Findings,
  decision: Decision,
  targetMets: Range<Mets> | null,
): Workload[] {
  const { peak } = findings;
  return peak === null || targetMets === null
    ? fromWalk(findings, decision)
    : fromTarget(findings, peak.test.mode, decision.target, targetMets);
}
