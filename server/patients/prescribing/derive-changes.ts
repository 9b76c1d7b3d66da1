import type { RecordFacts } from './record-facts';

/** A change of the record, told in words. */
export interface Change {
  readonly text: string;
  readonly date: string;
  readonly entryId: string;
}

const latest = (changes: readonly Change[]): Change | null =>
  changes.reduce<Change | null>(
    (last, change) => (last === null || change.date > last.date ? change : last),
    null,
  );

/** Starts and stops of rate-acting drugs; a change of dose is both. */
function drugChanges({ record }: RecordFacts): Change[] {
  return record.medications
    .filter(({ values }) => values.rateActing !== null)
    .flatMap(({ id, values }) => {
      const drug = `${values.name} ${values.dose}`;
      const started = { text: `${drug} started`, date: values.startedOn, entryId: id };
      if (values.stoppedOn === null) return [started];
      return [started, { text: `${drug} stopped`, date: values.stoppedOn, entryId: id }];
    });
}

/** What differs from the entry before it; the first entry changes nothing, since nothing was known. */
function differences<E>(oldestFirst: readonly E[], isOther: (entry: E, before: E) => boolean): E[] {
  return oldestFirst.filter((entry, index) => {
    const before = oldestFirst[index - 1];
    return before !== undefined && isOther(entry, before);
  });
}

function rhythmChanges({ record }: RecordFacts): Change[] {
  const changed = differences(
    [...record.rhythms].reverse(),
    (entry, before) => entry.values.rhythm !== before.values.rhythm,
  );
  return changed.map(({ id, values }) => ({
    text: `rhythm now ${values.rhythm.replaceAll('-', ' ')}`,
    date: values.observedOn,
    entryId: id,
  }));
}

type Device = RecordFacts['record']['devices'][number];

const settingsOf = ({ values }: Device): string =>
  JSON.stringify([values.icdStatus, values.icdZones, values.pacemaker, values.upperTrackingRate]);

/** How the device paces; what was not written down is not known, and becoming known is no change. */
const pacingKeys = ['pacingMode', 'lowerRate', 'upperSensorRate'] as const;

const pacesOtherwise = (entry: Device, before: Device): boolean =>
  pacingKeys.some((key) => {
    const [now, then] = [entry.values[key], before.values[key]];
    return now !== null && then !== null && now !== then;
  });

function deviceChanges({ record }: RecordFacts): Change[] {
  // What was unknown and became known did not change by it.
  const known = [...record.devices]
    .reverse()
    .filter(({ values }) => values.icdStatus !== 'unknown');
  const changed = differences(
    known,
    (entry, before) => settingsOf(entry) !== settingsOf(before) || pacesOtherwise(entry, before),
  );
  return changed.map(({ id, values }) => ({
    text: 'device settings changed',
    date: values.checkedOn,
    entryId: id,
  }));
}

function eventChanges({ record }: RecordFacts): Change[] {
  return record['clinical-events'].map(({ id, values }) => ({
    text: values.kind.replaceAll('-', ' '),
    date: values.occurredOn,
    entryId: id,
  }));
}

/** The latest of each, null where nothing ever changed. A change on a day counts for that whole day: order within is unknown. */
export interface LatestChanges {
  readonly drugs: Change | null;
  readonly rhythmOrDevice: Change | null;
  readonly event: Change | null;
}

export function latestChanges(facts: RecordFacts): LatestChanges {
  return {
    drugs: latest(drugChanges(facts)),
    rhythmOrDevice: latest([...rhythmChanges(facts), ...deviceChanges(facts)]),
    event: latest(eventChanges(facts)),
  };
}
