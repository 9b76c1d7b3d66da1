import type { Reading, RosterItem } from '@shared/contracts/floor-contract';
import { type Marks, placeReading } from '@shared/clinical/placement';
import type { VitalPhase } from '@shared/clinical/vital-sign-bounds';
import { bpm } from '@shared/units';
import type { AmendmentEntry, Entry, ReadingEntry, WorkEntry } from '../entry-queue/entry';

/** A reading as the floor shows it, on the server or still on its way there. */
export interface VisitReading extends Omit<
  Reading,
  'sessionRecordId' | 'receivedAt' | 'recordedBy'
> {
  /** Null while the server has not answered. */
  readonly savedAt: string | null;
  /** Null for what was entered here and is not stored yet. */
  readonly recordedBy: string | null;
  /** The entry that is on its way, null once it is stored. */
  readonly entry: ReadingEntry | AmendmentEntry | null;
}

/** A patient of the class with all that is known here, unsent entries too. */
export interface Visit extends Omit<RosterItem, 'readings'> {
  /** In the order of measuring, corrected ones and corrections too. */
  readonly readings: readonly VisitReading[];
  /** The record's id, also while its beginning is on its way. */
  readonly recordId: string | null;
  readonly recordEntry: Entry | null;
  /** Work that is on its way, null once it is stored. */
  readonly workEntry: WorkEntry | null;
}

export const marksOf = ({ target, ceiling }: Pick<RosterItem, 'target' | 'ceiling'>): Marks => ({
  target: target && { lower: bpm(target.lower), upper: bpm(target.upper) },
  ceiling: ceiling && { value: bpm(ceiling.value) },
});

/** Where a typed rate lies, by the same function that the server stores it with. */
export function placeOf(
  visit: Pick<RosterItem, 'target' | 'ceiling'>,
  phase: VitalPhase,
  rate: number | null,
) {
  return placeReading(phase, rate === null ? null : bpm(rate), marksOf(visit));
}

const stored = ({ receivedAt, ...reading }: Reading): VisitReading => ({
  ...reading,
  savedAt: receivedAt,
  entry: null,
});

function unsent(item: RosterItem, entry: ReadingEntry | AmendmentEntry): VisitReading {
  const { body } = entry;
  const isAmendment = entry.kind === 'amendment';
  const struckOut = entry.kind === 'amendment' && entry.body.enteredInError === true;
  return {
    id: entry.id,
    phase: body.phase,
    measuredAt: body.measuredAt,
    heartRate: body.heartRate ?? null,
    systolic: body.systolic ?? null,
    diastolic: body.diastolic ?? null,
    oxygenSaturation: body.oxygenSaturation ?? null,
    perceivedExertion: body.perceivedExertion ?? null,
    symptoms: body.symptoms ?? [],
    note: body.note ?? null,
    placement: placeOf(item, body.phase, body.heartRate ?? null),
    status: struckOut ? 'entered-in-error' : 'preliminary',
    amends: isAmendment ? entry.originalId : null,
    amendmentReason: isAmendment ? entry.body.reason : null,
    savedAt: null,
    recordedBy: null,
    entry,
  };
}

const isUnsentReading = (entry: Entry): entry is ReadingEntry | AmendmentEntry =>
  entry.kind === 'reading' || entry.kind === 'amendment';

/** A roster item together with the entries of its visit that are not acknowledged yet. */
export function visitOf(item: RosterItem, entries: readonly Entry[]): Visit {
  const { readings, ...rest } = item;
  const own = entries.filter(({ appointmentId }) => appointmentId === item.appointmentId);
  const known = new Set(readings.map(({ id }) => id));
  const waiting = own.filter(isUnsentReading).filter(({ id }) => !known.has(id));
  const all = [...readings.map(stored), ...waiting.map((entry) => unsent(item, entry))];
  const recordEntry = own.find(({ kind }) => kind === 'record') ?? null;
  const workEntry = own.filter((entry) => entry.kind === 'work').at(-1) ?? null;
  return {
    ...rest,
    readings: all.sort((a, b) => Date.parse(a.measuredAt) - Date.parse(b.measuredAt)),
    recordId: item.record?.id ?? recordEntry?.id ?? null,
    recordEntry,
    work: workEntry?.body ?? item.work,
    workEntry,
  };
}

/** The readings that count: a corrected one and one entered in error do not, nor does what the server refused. */
export function currentReadings(readings: readonly VisitReading[]): VisitReading[] {
  const corrected = new Set(
    readings.filter(({ entry }) => entry?.state !== 'refused').map(({ amends }) => amends),
  );
  return readings.filter(
    ({ id, status, entry }) =>
      status !== 'amended' &&
      status !== 'entered-in-error' &&
      !corrected.has(id) &&
      entry?.state !== 'refused',
  );
}

/** The last of these readings that has a value. */
export function lastWith<
  K extends 'heartRate' | 'systolic' | 'perceivedExertion' | 'oxygenSaturation',
>(readings: readonly VisitReading[], sign: K): VisitReading | undefined {
  return [...readings].reverse().find((reading) => reading[sign] !== null);
}

/** Whole minutes since the first reading at exercise, until the first in recovery or now; null before. */
export function minutesExercised(readings: readonly VisitReading[], now: Date): number | null {
  const first = readings.find(({ phase }) => phase === 'exercise');
  if (!first) return null;
  const from = Date.parse(first.measuredAt);
  const end = readings.find(
    ({ phase, measuredAt }) => phase === 'recovery' && Date.parse(measuredAt) >= from,
  );
  const until = end ? Date.parse(end.measuredAt) : now.getTime();
  return Math.max(0, Math.floor((until - from) / 60_000));
}
