import type { Change } from './bulk';
import type { PeopleRows } from './rows';

export interface TableChanges<R> {
  readonly added: R[];
  readonly changed: Change<R>[];
}

/** What lies between two tellings of the same story; nothing that was told is ever taken back. */
export type StoryChanges = {
  readonly [T in keyof PeopleRows]: TableChanges<PeopleRows[T][number]>;
};

interface Identified {
  readonly id?: string | undefined;
}

/** The tables whose rows change after they were told; in the others rows are only added. */
const changing: readonly (keyof PeopleRows)[] = [
  'enrollments',
  'medications',
  'prescriptions',
  'appointments',
  'charges',
];

function tableChanges<R extends Identified>(
  before: readonly R[],
  after: readonly R[],
  mayChange: boolean,
): TableChanges<R> {
  const known = new Map(before.map((row) => [row.id, row]));
  const changes: TableChanges<R> = { added: [], changed: [] };
  for (const row of after) {
    const old = known.get(row.id);
    if (!old) changes.added.push(row);
    else if (mayChange && JSON.stringify(old) !== JSON.stringify(row)) {
      changes.changed.push({ before: old, after: row });
    }
  }
  return changes;
}

/** The changes without those of some patients. */
export function withoutPatients(
  changes: StoryChanges,
  patientIds: ReadonlySet<string>,
): StoryChanges {
  if (patientIds.size === 0) return changes;
  const isKept = (row: object) => !('patientId' in row && patientIds.has(String(row.patientId)));
  const entries = Object.entries(changes).map(([table, { added, changed }]) => [
    table,
    {
      added: (added as object[]).filter(isKept),
      changed: (changed as Change<object>[]).filter(({ after }) => isKept(after)),
    },
  ]);
  return Object.fromEntries(entries) as StoryChanges;
}

export function storyChanges(before: PeopleRows, after: PeopleRows): StoryChanges {
  const tables = Object.keys(after) as (keyof PeopleRows)[];
  const entries = tables.map((table) => [
    table,
    tableChanges<Identified>(before[table], after[table], changing.includes(table)),
  ]);
  return Object.fromEntries(entries) as StoryChanges;
}
