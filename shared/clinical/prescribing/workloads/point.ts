import type { Kilograms, Mets } from '../../../units';
import type { WorkloadPoint } from '../answer';
import type { Equipment } from '../policy';
import type { HeartRateRange, TestMode } from '../request';

/** One end of the work target, and what is needed to set a machine to it. */
export interface WorkPoint {
  readonly point: WorkloadPoint;
  readonly work: Mets;
  readonly weight: Kilograms | null;
  readonly equipment: Equipment;
  readonly arm: {
    /** The mode of the test that the work comes from. */
    readonly testMode: TestMode;
    readonly workFraction: number;
    readonly target: HeartRateRange | null;
  };
}

export const weightNotKnown = 'The weight is not known.';

export const outsideRange = (what: string, range: string): string =>
  `${what} outside the validated range of the equation, ${range}.`;
