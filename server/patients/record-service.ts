import { v7 as uuidv7 } from 'uuid';
import type {
  NewRecordEntry,
  RecordEntry,
  RecordKind,
  RecordValues,
} from '@shared/contracts/record-contract';
import type { Actor } from '../accounts/actor';
import type { Transaction } from '../database/client';
import { fail } from '../http/failure';
import { fieldFailure } from './field-failure';
import { mayEnterInError } from './patients-policy';
import { patientDates } from './patients-queries';
import { checkLinks, linkEntry, unlinkEntry } from './record-links';
import { recordEntry } from './record-queries';
import { recordRegistry } from './record-registry';
import {
  insertEntry,
  markEnteredInError,
  resumeMedication,
  stopMedication as stop,
  type Scribe,
} from './record-repository';

/** A call of someone who treats, on one patient's record. */
export interface RecordCall {
  readonly tx: Transaction;
  readonly actor: Actor;
  readonly patientId: string;
  readonly now: Date;
}

export const scribeOf = ({ actor, patientId, now }: RecordCall): Scribe => ({
  patientId,
  userId: actor.id,
  now,
});

interface Dates {
  readonly birthDate: string;
  readonly today: string;
}

/** No entry is of a day to come, or of before the patient was born. */
function checkDate(value: unknown, path: string, { birthDate, today }: Dates): void {
  if (typeof value !== 'string') return;
  if (value > today) throw fieldFailure(path, 'future', 'Enter a date up to today');
  if (value < birthDate) throw fieldFailure(path, 'before-birth', 'Enter a date after birth');
}

function checkDates({ kind, values }: NewRecordEntry, path: string, dates: Dates): void {
  const { dateField } = recordRegistry[kind];
  const fields = values as Record<string, unknown>;
  if (dateField) checkDate(fields[dateField], `${path}${dateField}`, dates);
  checkDate(fields['stoppedOn'], `${path}stoppedOn`, dates);
}

/** Equal as the database keeps them: numbers in single precision, the keys of JSON in no order. */
const kept = (values: object): string =>
  JSON.stringify(values, (_, value: unknown) => {
    if (typeof value === 'number') return Math.fround(value);
    if (value === null || typeof value !== 'object' || Array.isArray(value)) return value;
    return Object.fromEntries(Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1)));
  });

/** The entry of an id that is taken: the same again is answered, anything else refused. */
async function alreadyEntered(
  { tx, patientId }: RecordCall,
  { kind, values }: NewRecordEntry,
  id: string,
): Promise<RecordEntry> {
  const entry = await recordEntry(tx, patientId, kind, id);
  if (!entry || kept(entry.values) !== kept(values)) throw fail('already-recorded');
  return entry;
}

async function addEntry(
  call: RecordCall,
  entry: NewRecordEntry,
  path: string,
  dates: Dates,
): Promise<RecordEntry> {
  const { tx, actor, now } = call;
  const id = entry.id ?? uuidv7();
  checkDates(entry, path, dates);
  await checkLinks(tx, entry, path, scribeOf(call));
  if (!(await insertEntry(tx, entry.kind, id, entry.values, scribeOf(call)))) {
    return alreadyEntered(call, entry, id);
  }
  await linkEntry(tx, entry, path, scribeOf(call));
  return {
    id,
    values: entry.values as RecordValues<RecordKind>,
    recordedAt: now.toISOString(),
    recordedBy: { id: actor.id, displayName: actor.displayName },
    enteredInErrorAt: null,
    enteredInErrorBy: null,
    ended: null,
  };
}

/**
 * Adds entries, all or none, in their order.
 * @param pathOf where the values of an entry stand in the request, '' or ending in a dot
 * @throws Failure `forbidden`, `invalid-request`, `already-recorded` (another entry under the id), `stale-version`
 */
export async function addEntries(
  call: RecordCall,
  entries: readonly NewRecordEntry[],
  pathOf: (index: number) => string,
): Promise<RecordEntry[]> {
  const allowed = ({ kind }: NewRecordEntry) =>
    call.actor.roles.some((role) => recordRegistry[kind].writers.includes(role));
  if (!entries.every(allowed)) throw fail('forbidden');
  const dates = await patientDates(call.tx, call.patientId, call.now);
  const added: RecordEntry[] = [];
  for (const [index, entry] of entries.entries()) {
    added.push(await addEntry(call, entry, pathOf(index), dates));
  }
  return added;
}

/** @throws Failure `not-found` */
export async function existing(
  call: RecordCall,
  kind: RecordKind,
  entryId: string,
): Promise<RecordEntry> {
  const entry = await recordEntry(call.tx, call.patientId, kind, entryId);
  if (!entry) throw fail('not-found');
  return entry;
}

/** Marks an entry as entered in error; it stays to be read. Doing it twice is doing it once. @throws Failure `not-found`, `forbidden` */
export async function enterInError(
  call: RecordCall,
  kind: RecordKind,
  entryId: string,
): Promise<RecordEntry> {
  const entry = await existing(call, kind, entryId);
  const entered = { recordedBy: entry.recordedBy.id, recordedAt: new Date(entry.recordedAt) };
  if (!mayEnterInError(call.actor, kind, entered, call.now)) throw fail('forbidden');
  if (await markEnteredInError(call.tx, kind, entryId, scribeOf(call))) {
    await unlinkEntry(call.tx, kind, entry, scribeOf(call));
  }
  return existing(call, kind, entryId);
}

/** Stops a medication on a date, or takes the stop back. @throws Failure `not-found`, `invalid-request`, `stale-version` */
export async function stopMedication(
  call: RecordCall,
  entryId: string,
  stoppedOn: string | null,
): Promise<RecordEntry> {
  const entry = (await existing(call, 'medications', entryId)) as RecordEntry<'medications'>;
  if (stoppedOn === null) {
    if (!(await resumeMedication(call.tx, entryId, call))) throw fail('stale-version');
    return existing(call, 'medications', entryId);
  }
  checkDate(stoppedOn, 'stoppedOn', await patientDates(call.tx, call.patientId, call.now));
  if (stoppedOn < entry.values.startedOn) {
    throw fieldFailure('stoppedOn', 'before-start', 'It cannot stop before it started');
  }
  if (!(await stop(call.tx, entryId, stoppedOn, scribeOf(call)))) throw fail('stale-version');
  return existing(call, 'medications', entryId);
}
