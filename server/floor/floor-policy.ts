import { placeReading, type Marks, type Placement } from '@shared/clinical/placement';
import type { VitalPhase } from '@shared/clinical/vital-sign-bounds';
import type { Role } from '@shared/contracts/accounts-contract';
import { bpm } from '@shared/units';

/** Who reads what is logged on the floor. */
export const floorReaders: readonly Role[] = ['nurse', 'exercise-physiologist', 'physician'];

/** Who logs and signs on the floor. A student logs, and does not sign: their entries wait for who supervises them. */
export const floorWriters: readonly Role[] = ['nurse', 'exercise-physiologist'];

export const statusOfEntry = (actor: { readonly student: boolean }): 'preliminary' | 'final' =>
  actor.student ? 'preliminary' : 'final';

/** What a visit's readings are placed against; a range that was withdrawn when the visit began has its ceiling alone. */
export interface VisitRange extends Marks {
  readonly withdrawn: readonly string[];
}

/** @param range null for a visit that began without one */
export function placementOf(
  { phase, heartRate }: { readonly phase: VitalPhase; readonly heartRate: number | null },
  range: VisitRange | null,
): Placement | null {
  if (range === null) return null;
  const target = range.withdrawn.length > 0 ? null : range.target;
  const rate = heartRate === null ? null : bpm(heartRate);
  return placeReading(phase, rate, { target, ceiling: range.ceiling });
}

/** What a sender says of a reading, however it was written: instants as instants, absent as null, symptoms as a set. */
export interface SentReading {
  readonly phase: VitalPhase;
  readonly measuredAt: Date;
  readonly heartRate: number | null;
  readonly systolic: number | null;
  readonly diastolic: number | null;
  readonly oxygenSaturation: number | null;
  readonly perceivedExertion: number | null;
  readonly symptoms: readonly string[];
  readonly note: string | null;
}

const signs = [
  'phase',
  'heartRate',
  'systolic',
  'diastolic',
  'oxygenSaturation',
  'perceivedExertion',
  'note',
] as const;

export const sameSet = (one: readonly string[], other: readonly string[]): boolean => {
  const [a, b] = [new Set(one), new Set(other)];
  return a.size === b.size && [...a].every((entry) => b.has(entry));
};

/** Whether the same reading was sent again. */
export const sameReading = (one: SentReading, other: SentReading): boolean =>
  one.measuredAt.getTime() === other.measuredAt.getTime() &&
  signs.every((sign) => one[sign] === other[sign]) &&
  sameSet(one.symptoms, other.symptoms);
