import type { NewRecordEntry, RecordEntry, RecordValues } from '@shared/contracts/record-contract';
import type { Transaction } from '../database/client';
import { fail } from '../http/failure';
import { fieldFailure } from './field-failure';
import {
  endThreshold,
  hasTest,
  restoreThreshold,
  restoreThresholdsEndedBy,
  resumeMedication,
  stopMedication,
  type Scribe,
} from './record-repository';

async function supersede(
  tx: Transaction,
  values: RecordValues<'thresholds'>,
  path: string,
  scribe: Scribe,
): Promise<void> {
  if (values.supersedes === null) return;
  const end = { status: 'superseded', reason: 'A new finding took its place' } as const;
  const former = await endThreshold(tx, values.supersedes, end, scribe);
  if (!former) throw fail('stale-version');
  if (former.kind !== values.kind) {
    throw fieldFailure(
      `${path}kind`,
      'other-kind',
      'Only a finding of the same kind takes its place',
    );
  }
  if (former.foundOn > values.foundOn) {
    throw fieldFailure(`${path}foundOn`, 'earlier', 'The finding it replaces is younger');
  }
}

async function replace(
  tx: Transaction,
  values: RecordValues<'medications'>,
  scribe: Scribe,
): Promise<void> {
  if (values.replaces === null) return;
  if (!(await stopMedication(tx, values.replaces, values.startedOn, scribe))) {
    throw fail('stale-version');
  }
}

/** What an entry names must be of the same patient. @throws Failure `invalid-request` */
export async function checkLinks(
  tx: Transaction,
  entry: NewRecordEntry,
  path: string,
  { patientId }: Scribe,
): Promise<void> {
  if (entry.kind !== 'thresholds' || entry.values.exerciseTestId === null) return;
  if (await hasTest(tx, patientId, entry.values.exerciseTestId)) return;
  throw fieldFailure(`${path}exerciseTestId`, 'unknown', 'Choose a test of this patient');
}

/**
 * What a new entry does to those it names: a threshold ends the one it supersedes, a new dose stops the former.
 * @param path of the entry's values in the request, '' or ending in a dot
 * @throws Failure `stale-version` when what it names has ended already, `invalid-request`
 */
export async function linkEntry(
  tx: Transaction,
  entry: NewRecordEntry,
  path: string,
  scribe: Scribe,
): Promise<void> {
  if (entry.kind === 'thresholds') await supersede(tx, entry.values, path, scribe);
  if (entry.kind === 'medications') await replace(tx, entry.values, scribe);
}

/** What an entry in error did is undone, unless another took its place since. */
export async function unlinkEntry(
  tx: Transaction,
  kind: NewRecordEntry['kind'],
  entry: RecordEntry,
  scribe: Scribe,
): Promise<void> {
  if (kind === 'exercise-tests') await restoreThresholdsEndedBy(tx, entry.id);
  if (entry.ended) return;
  const { supersedes, replaces, stoppedOn } = entry.values as Partial<
    Record<string, string | null>
  >;
  if (kind === 'thresholds' && supersedes) await restoreThreshold(tx, supersedes);
  if (kind === 'medications' && replaces && !stoppedOn)
    await resumeMedication(tx, replaces, scribe);
}
