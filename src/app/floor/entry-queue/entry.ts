import type {
  AmendmentRequest,
  BeginRecordRequest,
  ReadingRequest,
} from '@shared/contracts/floor-contract';
import type { BoutRequest } from '@shared/contracts/progression-contract';
import type { Problem } from '../../core/problem';

interface EntryBase {
  /** Made here once, so that sending again is the same write. */
  readonly id: string;
  readonly appointmentId: string;
  readonly classDateId: string;
  /** Who entered it: it is sent in no other name. */
  readonly userId: string;
  /** `sending` waits for its first answer, `kept` for the network, `refused` for a person. */
  readonly state: 'sending' | 'kept' | 'refused';
  /** Why it was not taken, null while nothing is wrong. */
  readonly problem: Problem | null;
}

export interface RecordEntry extends EntryBase {
  readonly kind: 'record';
  readonly body: BeginRecordRequest;
}

export interface ReadingEntry extends EntryBase {
  readonly kind: 'reading';
  readonly body: ReadingRequest;
}

export interface AmendmentEntry extends EntryBase {
  readonly kind: 'amendment';
  readonly originalId: string;
  readonly body: AmendmentRequest & Pick<ReadingRequest, 'phase' | 'measuredAt'>;
}

export interface WorkEntry extends EntryBase {
  readonly kind: 'work';
  readonly body: BoutRequest;
}

/** A write of the floor on its way to the server. */
export type Entry = RecordEntry | ReadingEntry | AmendmentEntry | WorkEntry;

type New<E extends EntryBase> = Omit<E, 'state' | 'problem' | 'userId'>;
export type NewEntry = New<RecordEntry> | New<ReadingEntry> | New<AmendmentEntry> | New<WorkEntry>;

const passing: readonly string[] = [
  'unreachable',
  'internal',
  'unavailable',
  'too-many-requests',
  'unauthenticated',
  'csrf',
];

/** Whether the same entry may be taken later: no answer, a busy or broken server, a session that ended. */
export const mayPass = ({ code, status }: Pick<Problem, 'code' | 'status'>): boolean =>
  passing.includes(code) || (code === 'unreadable-answer' && status >= 500);

/** Milliseconds before try `tries` + 1: one second, doubling up to half a minute. */
export const pauseAfter = (tries: number): number => Math.min(30_000, 1000 * 2 ** (tries - 1));
