import type { InputOrigin, PrefilledInputs } from '@shared/contracts/prescribing-inputs-contract';
import { daysBetween } from '@shared/scheduling/wall-time';
import type { Change, LatestChanges } from './derive-changes';
import { isOld, nothingEntered, type RecordFacts } from './record-facts';

type Test = PrefilledInputs['test'];

interface DerivedTest {
  readonly value: Test;
  readonly origins: Readonly<Record<string, InputOrigin>>;
}

/** A change on the day of the test counts as after it: which came first is not known, and unknown never widens. */
const isSince = (change: Change | null, performedOn: string): boolean =>
  change !== null && change.date >= performedOn;

function originOfChange(change: Change | null, since: boolean, none: string): InputOrigin {
  if (change === null || !since) return nothingEntered(none);
  return { text: change.text, date: change.date, old: false, entryId: change.entryId };
}

/** The latest test, with what changed since. Drugs count as the same only on a list that was gone through once. */
export function testOf(facts: RecordFacts, changes: LatestChanges, today: string): DerivedTest {
  const [latest] = facts.record['exercise-tests'];
  if (!latest)
    return { value: null, origins: { test: nothingEntered('No exercise test entered') } };
  const { performedOn, protocol, mode, endedBy, vo2Source } = latest.values;
  const { restingHeartRate, peakHeartRate, peakVo2, peakMets } = latest.values;
  const drugsKnown = facts.record['medication-reviews'].length > 0;
  const drugsChanged = isSince(changes.drugs, performedOn);
  const rhythmChanged = isSince(changes.rhythmOrDevice, performedOn);
  const eventSince = isSince(changes.event, performedOn);
  return {
    value: {
      ...{ mode, endedBy, restingHeartRate, peakHeartRate, peakVo2, peakMets },
      daysAgo: daysBetween(performedOn, today),
      sameRateActingDrugs: drugsKnown && !drugsChanged,
      sameRhythmAndDevice: !rhythmChanged,
      eventSince,
      // Not stated: the one that the rules trust less.
      vo2Source: vo2Source ?? 'estimated',
    },
    origins: {
      test: {
        text: `${protocol}, ${mode}, ended by ${endedBy.replaceAll('-', ' ')}`,
        date: performedOn,
        old: isOld(performedOn, today, facts.testValidDays),
        entryId: latest.id,
      },
      'test.sameRateActingDrugs': drugsKnown
        ? originOfChange(changes.drugs, drugsChanged, 'No change of rate-acting drugs since')
        : nothingEntered('The list of medicines was never verified'),
      'test.sameRhythmAndDevice': originOfChange(
        changes.rhythmOrDevice,
        rhythmChanged,
        'No change of rhythm or device entered since',
      ),
      'test.eventSince': originOfChange(changes.event, eventSince, 'No event or procedure since'),
    },
  };
}
