import { canTurn, inputsOn, seatedAfter, turned } from './chart';
import { atSite, workday } from './charting';
import type { CoursePlan } from './courses';
import type { Day } from './days';
import { minutesLater } from './days';
import { observedWorkOn } from './observed-work';
import { issueRange, signedAtOnce } from './ranges';
import type { Signing } from './ranges';
import { writeDoseRaised } from './record-drugs';
import { writeRestingRates, writeTest } from './record-rows';
import { scribeAt } from './telling';
import type { Telling } from './telling';

/** Plans are reviewed every 30 days (42 CFR 410.49). */
const reviewEveryDays = 28;
/** Nobody reviews who has not been seen for so many days. */
const seenWithinDays = 12;
const postponedBy = 7;

function signingOf(telling: Telling, day: Day, createdAt: Date, withPhysician: boolean): Signing {
  if (!withPhysician) return signedAtOnce(createdAt);
  const { site, fate } = telling.person;
  const first = telling.ranges.length === telling.rangesBefore;
  const { physiologist, physician } = first ? fate.signing : { physiologist: 0, physician: 1 };
  return {
    createdAt,
    signedAt:
      physiologist > 0
        ? atSite(site, day + physiologist, workday.physiologistSigns)
        : minutesLater(createdAt, 15),
    physicianSignedAt: atSite(site, day + physiologist + physician, workday.physicianSigns),
  };
}

/** Writes the range that the record gives on a day, and sets the day of the next. */
export function writeRange(telling: Telling, day: Day, createdAt: Date, withPhysician: boolean) {
  const { chart, ranges, attended, firstSession, readings, changedOn } = telling;
  const work = observedWorkOn(readings, day, changedOn);
  const inputs = inputsOn(chart, day, { attended, firstSession, work });
  const key = `${telling.person.key} ${day}`;
  const isFirst = ranges.length === telling.rangesBefore;
  const supersedes = isFirst ? null : (ranges.at(-1)?.id ?? null);
  ranges.push(
    issueRange(key, inputs, signingOf(telling, day, createdAt, withPhysician), supersedes),
  );
  telling.nextRange = { on: day + reviewEveryDays, withPhysician: false };
}

function review(telling: Telling, on: Day, withPhysician: boolean): void {
  const seenLast = telling.lastSession ?? on;
  if (!withPhysician && on - seenLast > seenWithinDays) {
    telling.nextRange = { on: on + postponedBy, withPhysician };
    return;
  }
  const at = atSite(telling.person.site, on, workday.review);
  const seated = seatedAfter(telling.chart, telling.attended);
  const days = withPhysician ? [2, 1, 0] : [4, 2, 0];
  writeRestingRates(telling.rows, scribeAt(telling, at), telling.chart, seated, on, days);
  writeRange(telling, on, at, withPhysician);
}

/** The dose goes up, which withdraws the range until the next, or a second test is done. */
function turn(telling: Telling, on: Day, at: Date): void {
  const kind = telling.person.fate.turn?.kind;
  telling.turnDone = true;
  if (!kind || kind === 'angina in class') return;
  telling.chart = turned(telling.chart, kind, on);
  const scribe = scribeAt(telling, at);
  if (kind === 'dose raised') {
    writeDoseRaised(telling.rows, scribe, on);
    telling.changedOn = on;
    telling.withdrawal = { at, reason: 'drugs' };
    telling.nextRange = { on: on + 3, withPhysician: true };
  } else {
    writeTest(telling.rows, scribe, telling.chart, on);
    telling.nextRange = { on: on + 1, withPhysician: true };
  }
}

function turnDue({ person, turnDone, chart }: Telling, plan: CoursePlan): Day | null {
  const planned = person.fate.turn;
  if (turnDone || !planned || planned.kind === 'angina in class' || !canTurn(chart, planned)) {
    return null;
  }
  return plan.enrolledOn + planned.afterDays;
}

/** Does at the chart what falls due before an instant. */
export function passTime(telling: Telling, plan: CoursePlan, until: Date): void {
  const { site } = telling.person;
  for (;;) {
    const turnOn = turnDue(telling, plan);
    const turnAt = turnOn === null ? null : atSite(site, turnOn, workday.chartChange);
    const { nextRange } = telling;
    const rangeAt = nextRange && atSite(site, nextRange.on, workday.review);
    if (turnOn !== null && turnAt && turnAt < until && (!rangeAt || turnAt < rangeAt)) {
      turn(telling, turnOn, turnAt);
    } else if (nextRange && rangeAt && rangeAt < until) {
      review(telling, nextRange.on, nextRange.withPhysician);
    } else return;
  }
}
