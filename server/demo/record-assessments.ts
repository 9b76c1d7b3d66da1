import { riskFindings, type RiskFinding } from '@shared/clinical/risk/criteria';
import { stratificationOf } from '@shared/clinical/risk/recorded-risk';
import { riskLevelOf } from '@shared/clinical/risk/override';
import type { RiskLevel } from '@shared/clinical/prescribing';
import type { Chart } from './chart';
import { isoOf, minutesLater } from './days';
import type { Day } from './days';
import { dice } from './dice';
import type { Dice } from './dice';
import { entry } from './record-entries';
import type { RecordRows, Scribe } from './record-entries';

const findingNames = Object.keys(riskFindings) as RiskFinding[];

const findingsWith = (present: readonly RiskFinding[]) =>
  Object.fromEntries(findingNames.map((name) => [name, present.includes(name)])) as Record<
    RiskFinding,
    boolean
  >;

/** Criteria that come to the level, as far as the criteria alone can. */
function criteriaOf(level: RiskLevel, { facts }: Chart) {
  const missing = Object.fromEntries(findingNames.map((name) => [name, null])) as Record<
    RiskFinding,
    null
  >;
  if (level === 'unknown') return { findings: missing, ejectionFraction: null, capacity: null };
  const present: RiskFinding[] = [];
  if (facts.devices.icd.status === 'present') present.push('implantedDefibrillator');
  if (facts.conditions.heartFailure !== 'none') present.push('heartFailure');
  if (level === 'moderate') present.push('symptomsAtHigherWork');
  if (level === 'high' && present.length === 0) present.push('complicatedEvent');
  return {
    findings: findingsWith(present),
    ejectionFraction: level === 'low' ? 58 : level === 'moderate' ? 46 : 35,
    capacity: level === 'low' ? 8.1 : 5.4,
  };
}

/** The level of the situation with its criteria; where they come to another, somebody said why. */
export function writeRisk(rows: RecordRows, scribe: Scribe, chart: Chart, day: Day) {
  const level = chart.facts.risk;
  const criteria = criteriaOf(level, chart);
  const same =
    riskLevelOf(stratificationOf({ ...criteria, level, overrideReason: null }), null) === level;
  rows.riskStratifications.push({
    ...entry(scribe, 'risk', day),
    level,
    ...criteria,
    overrideReason: same ? null : 'Judged with the cardiologist’s letter',
    assessedOn: isoOf(day),
    note: null,
  });
}

const answers = (draw: Dice, items: number, likely: number) =>
  Array.from({ length: items }, () => (draw.chance(likely) ? draw.whole(1, 2) : 0));

interface Asked {
  /** Somebody told of thoughts of self-harm. */
  readonly selfHarm: boolean;
  /** Nobody has spoken with them yet. */
  readonly open: boolean;
}

/** What is asked at intake: PHQ-9, GAD-7 and DASI, and five stands from a chair. */
export function writeAssessments(
  rows: RecordRows,
  scribe: Scribe,
  { person }: Chart,
  day: Day,
  { selfHarm, open }: Asked,
) {
  const draw = dice(person.key, 'questionnaires');
  const answeredOn = isoOf(day);
  const ask = (instrument: 'phq-9' | 'gad-7' | 'dasi', given: (number | boolean)[]) => {
    const closed = instrument === 'phq-9' && selfHarm && !open;
    rows.questionnaireAnswers.push({
      ...entry(scribe, 'asked', instrument, day),
      instrument,
      answers: given,
      answeredOn,
      endedAt: closed ? minutesLater(scribe.at, 35) : null,
      endedBy: closed ? scribe.by : null,
      endedReason: closed ? 'Spoke in private, no plan; referring physician called' : null,
    });
  };
  ask('phq-9', [...answers(draw, 8, 0.35), selfHarm ? 1 : 0]);
  ask('gad-7', answers(draw, 7, 0.3));
  ask(
    'dasi',
    Array.from({ length: 12 }, (_, item) => item < 4 || draw.chance(0.4)),
  );
  rows.chairStands.push({
    ...entry(scribe, 'stands', day),
    seconds: Number(draw.near(12.5, 2.2).toFixed(1)),
    ending: 'standing-fifth-time',
    performedOn: answeredOn,
  });
  rows.restingEcgs.push({
    ...entry(scribe, 'ecg', day),
    hindrances: draw.chance(0.08) ? ['left-bundle-branch-block'] : [],
    observedOn: answeredOn,
    note: null,
  });
}

/** Orders that came with the referral. */
export function writeRestrictions(rows: RecordRows, scribe: Scribe, chart: Chart, day: Day) {
  const { facts, person } = chart;
  const draw = dice(person.key, 'restrictions');
  const order = (kind: 'oxygen' | 'lifting' | 'fall', limit: number | null, detail: string) =>
    rows.restrictions.push({
      ...entry(scribe, 'restriction', kind, day),
      kind,
      limit,
      diastolic: null,
      detail,
      orderedBy: 'Referring cardiologist',
      orderedOn: isoOf(day),
      until: kind === 'lifting' ? isoOf(day + 70) : null,
      endedAt: null,
      endedBy: null,
      endedReason: null,
    });
  if (facts.conditions.pulmonaryHypertension) order('oxygen', 2, 'By nasal cannula');
  if (person.situation.diagnosis === 'bypass')
    order('lifting', 4.5, 'As the surgeon’s letter says');
  if (draw.chance(0.06)) order('fall', null, 'Fell at home this year');
}
