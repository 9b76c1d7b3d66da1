import { physicianCausesOf } from '@shared/clinical/plan-limits';
import { defaultPolicy } from '@shared/clinical/prescribing';
import { prescriptionRequestSchema } from '@shared/contracts/prescriptions-contract';
import { canTurn, inputsOn, seatedAfter, turned } from './chart';
import { atSite, workday } from './charting';
import type { CoursePlan } from './courses';
import type { Day } from './days';
import { minutesLater } from './days';
import { observedWorkOn } from './observed-work';
import { evaluate, issueRange, signedAtOnce } from './ranges';
import type { Evaluated, Signing } from './ranges';
import { writeDoseRaised } from './record-drugs';
import { writeRestingRates, writeTest } from './record-rows';
import { scribeAt } from './telling';
import type { Telling } from './telling';

/** Plans are reviewed every 30 days (42 CFR 410.49). */
const reviewEveryDays = 28;
/** Nobody reviews who has not been seen for so many days. */
const seenWithinDays = 12;
const postponedBy = 7;

/** Whether no range of this course has been written yet. */
const isFirst = ({ ranges, rangesBefore }: Telling) => ranges.length === rangesBefore;

/** A physician signs too where staff may not sign alone. */
function signingOf(telling: Telling, day: Day, createdAt: Date, evaluated: Evaluated): Signing {
  const { site, fate } = telling.person;
  const first = isFirst(telling);
  const inputs = prescriptionRequestSchema.parse(evaluated.inputs);
  const proposal = { inputs, result: evaluated.answer, first, student: false };
  if (physicianCausesOf(proposal, defaultPolicy).length === 0) return signedAtOnce(createdAt);
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
export function writeRange(telling: Telling, day: Day, createdAt: Date): void {
  const { chart, ranges, attended, firstSession, readings, changedOn } = telling;
  const work = observedWorkOn(readings, day, changedOn);
  const evaluated = evaluate(inputsOn(chart, day, { attended, firstSession, work }));
  const signing = signingOf(telling, day, createdAt, evaluated);
  const supersedes = isFirst(telling) ? null : (ranges.at(-1)?.id ?? null);
  ranges.push(issueRange(`${telling.person.key} ${day}`, evaluated, signing, supersedes));
  telling.nextRange = { on: day + reviewEveryDays, afterChange: false };
}

function review(telling: Telling, on: Day, afterChange: boolean): void {
  const seenLast = telling.lastSession ?? on;
  if (!afterChange && on - seenLast > seenWithinDays) {
    telling.nextRange = { on: on + postponedBy, afterChange };
    return;
  }
  const at = atSite(telling.person.site, on, workday.review);
  restAndWrite(telling, on, at, afterChange ? [2, 1, 0] : [4, 2, 0]);
}

/** The first range after a course that was closed is opened again. */
export function reviewAtReturn(telling: Telling, on: Day): void {
  restAndWrite(telling, on, atSite(telling.person.site, on, workday.range), [2, 1, 0]);
}

/** Takes the resting rate anew and writes a range on it. @param days before the review on which the rate was taken */
function restAndWrite(telling: Telling, on: Day, at: Date, days: readonly number[]): void {
  const seated = seatedAfter(telling.chart, telling.attended);
  writeRestingRates(telling.rows, scribeAt(telling, at), telling.chart, seated, on, days);
  writeRange(telling, on, at);
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
    telling.nextRange = { on: on + 3, afterChange: true };
  } else {
    writeTest(telling.rows, scribe, telling.chart, on);
    telling.nextRange = { on: on + 1, afterChange: true };
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
      review(telling, nextRange.on, nextRange.afterChange);
    } else return;
  }
}
