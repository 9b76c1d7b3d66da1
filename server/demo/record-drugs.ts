import type { Chart } from './chart';
import { isoOf } from './days';
import type { Day } from './days';
import { dice } from './dice';
import { doubled, drugList } from './drugs';
import { entry } from './record-entries';
import type { RecordRows, Scribe } from './record-entries';

/** What the person takes, and what of it was raised since the test; an unknown list has not been gone through. */
export function writeDrugs(rows: RecordRows, scribe: Scribe, chart: Chart, day: Day) {
  const { rateActingDrugs, test } = chart.facts;
  const listed = rateActingDrugs ?? ['beta-blocker'];
  const started = chart.person.eventOn + 1;
  const raisedOn =
    rateActingDrugs && test && !test.sameRateActingDrugs
      ? day - Math.floor(test.daysAgo / 2)
      : null;
  drugList(listed, dice(chart.person.key, 'drugs')).forEach((drug, each) => {
    const raised = raisedOn !== null && drug.rateActing === 'beta-blocker';
    const first = {
      ...entry(scribe, 'drug', each),
      ...drug,
      startedOn: isoOf(started),
      stoppedOn: raised ? isoOf(raisedOn) : null,
      stopRecordedAt: null,
      stopRecordedBy: null,
      replaces: null,
    };
    rows.medications.push(first);
    if (!raised) return;
    rows.medications.push({
      ...first,
      id: entry(scribe, 'drug', each, 'raised').id,
      dose: doubled(drug.dose),
      startedOn: isoOf(raisedOn),
      stoppedOn: null,
      replaces: first.id,
    });
  });
  if (rateActingDrugs) rows.medicationReviews.push(entry(scribe, 'drugs gone through', day));
}

/** The beta blocker's dose doubled: the old entry stops, the next one names it. */
export function writeDoseRaised(rows: RecordRows, scribe: Scribe, day: Day) {
  const index = rows.medications.findIndex(
    ({ rateActing, stoppedOn }) => rateActing === 'beta-blocker' && stoppedOn === null,
  );
  const current = rows.medications[index];
  if (!current) return;
  rows.medications[index] = {
    ...current,
    stoppedOn: isoOf(day),
    stopRecordedAt: scribe.at,
    stopRecordedBy: scribe.by,
  };
  rows.medications.push({
    ...current,
    ...entry(scribe, 'drug', 'raised', day),
    dose: doubled(current.dose),
    startedOn: isoOf(day),
    replaces: current.id,
  });
}
