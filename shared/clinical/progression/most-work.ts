import type { PrescriptionAnswer } from '../prescribing/answer';
import type { MachineSetting } from './machine-setting';

/** The work of the arms' limit, METs; null where none is prescribed. */
export function armLimit({ workloads }: PrescriptionAnswer): number | null {
  const row = workloads.find(({ modality, point }) => modality === 'arm' && point === 'limit');
  return row?.mets ?? null;
}

/**
 * The work never to pass on a machine, METs: the work ceiling and the upper end of the work target, for the arms their own limit;
 * infinite where the prescription holds none.
 */
export function mostWork(setting: MachineSetting, prescription: PrescriptionAnswer): number {
  const { workCeilingMets, targetMets } = prescription;
  const target = setting.modality === 'arm' ? armLimit(prescription) : (targetMets?.upper ?? null);
  return Math.min(workCeilingMets ?? Infinity, target ?? Infinity);
}
