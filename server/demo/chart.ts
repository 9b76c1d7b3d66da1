import type { PrescriptionRequestInput } from '@shared/contracts/prescriptions-contract';
import type { Day } from './days';
import { isoOf } from './days';
import { dice } from './dice';
import type { Dice } from './dice';
import type { Turn } from './fates';
import type { Person } from './people';
import { tested } from './situations';
import type { Facts, ThresholdFacts } from './situations';

/** What the record says of a person on some day of the story. */
export interface Chart {
  readonly person: Person;
  readonly facts: Facts;
  readonly testOn: Day | null;
  readonly heightCm: number;
  readonly weightKg: number;
  /** How far the resting rate falls over a whole course, bpm. */
  readonly restingFall: number;
}

const round = (value: number, step: number) => Number((Math.round(value / step) * step).toFixed(2));

/** The usual situations are varied from person to person; the single ones stand as the table says. */
function varied(facts: Facts, draw: Dice): Facts {
  const seatedBy = draw.whole(-5, 4);
  const peakBy = draw.whole(-7, 7);
  const fitter = 1 + draw.near(0, 0.07);
  const scaled = (value: number | null) => (value === null ? null : round(value * fitter, 0.1));
  const { resting, test, walkTest } = facts;
  return {
    ...facts,
    resting: {
      ...resting,
      seated: resting.seated + seatedBy,
      standing: resting.standing === null ? null : resting.standing + seatedBy,
    },
    test: test && {
      ...test,
      peakHeartRate: test.peakHeartRate + peakBy,
      peakMets: scaled(test.peakMets),
      peakVo2: scaled(test.peakVo2),
    },
    thresholds: facts.thresholds.map((threshold) => ({
      ...threshold,
      heartRate: threshold.heartRate + peakBy,
      clearMets: scaled(threshold.clearMets),
    })),
    walkTest: walkTest && { distanceMeters: Math.round(walkTest.distanceMeters * fitter) },
  };
}

export function openChart(person: Person): Chart {
  const draw = dice(person.key, 'chart');
  const facts =
    person.situation.share > 0 ? varied(person.situation.facts, draw) : person.situation.facts;
  const tall = person.sex === 'female' ? draw.near(162, 5) : draw.near(176, 6);
  const steady = facts.rhythm !== 'sinus' || facts.conditions.transplant !== 'none';
  return {
    person,
    facts,
    testOn: facts.test ? person.enrolledOn - facts.test.daysAgo : null,
    heightCm: Math.round(tall),
    weightKg: round(draw.near(27.5, 3.2) * (tall / 100) ** 2, 0.1),
    restingFall: steady ? draw.whole(0, 1) : draw.whole(3, 8),
  };
}

const dosesRaised = (facts: Facts): Facts => ({
  ...facts,
  resting: { ...facts.resting, seated: facts.resting.seated - 5 },
  test: facts.test && { ...facts.test, sameRateActingDrugs: false },
});

function testedAgain({ facts, person }: Chart): Facts {
  const { test, resting } = facts;
  const peak = test ? test.peakHeartRate + 3 : resting.seated + 62;
  const mets = round((test?.peakMets ?? (test?.peakVo2 ? test.peakVo2 / 3.5 : 5.6)) * 1.16, 0.1);
  const sameRateActingDrugs = person.situation.facts.rateActingDrugs !== null;
  return { ...facts, test: tested(peak, mets, { sameRateActingDrugs }) };
}

export function anginaInClass({ facts }: Chart): ThresholdFacts {
  return { kind: 'angina', heartRate: facts.resting.seated + 46, clearMets: 3.8 };
}

/** Whether a turn makes sense for this person. */
export function canTurn({ facts }: Chart, { kind }: Turn): boolean {
  if (facts.rhythm !== 'sinus' || facts.conditions.ventricularAssistDevice) return false;
  return kind !== 'dose raised' || (facts.rateActingDrugs ?? []).includes('beta-blocker');
}

/** The chart after what happened on a day. */
export function turned(chart: Chart, kind: Turn['kind'], day: Day): Chart {
  switch (kind) {
    case 'dose raised':
      return { ...chart, facts: dosesRaised(chart.facts) };
    case 'tested again':
      return { ...chart, facts: testedAgain(chart), testOn: day };
    case 'angina in class': {
      const thresholds = [...chart.facts.thresholds, anginaInClass(chart)];
      return { ...chart, facts: { ...chart.facts, thresholds } };
    }
  }
}

/** Whole years on a day. */
export function ageOn(birthDay: Day, day: Day): number {
  const [born, today] = [isoOf(birthDay), isoOf(day)];
  const had = today.slice(5) >= born.slice(5) ? 0 : 1;
  return Number(today.slice(0, 4)) - Number(born.slice(0, 4)) - had;
}

/** What training has done to the seated rate after so many sessions, bpm. */
export function seatedAfter({ facts, restingFall }: Chart, attended: number): number {
  return facts.resting.seated - Math.round((restingFall * Math.min(attended, 36)) / 36);
}

/** What has been seen in class when a range is set. */
export interface Observed {
  readonly attended: number;
  readonly firstSession: Day | null;
  readonly work: PrescriptionRequestInput['observedWork'];
}

/** The evaluate request as the record stands on a day. */
export function inputsOn(chart: Chart, day: Day, observed: Observed): PrescriptionRequestInput {
  const { facts, person, testOn } = chart;
  const seated = seatedAfter(chart, observed.attended);
  const { resting, measured } = { resting: facts.resting, measured: facts.measured };
  return {
    patient: {
      ageYears: ageOn(person.birthDay, day),
      sexAtBirth: person.sex,
      heightCm: measured ? chart.heightCm : null,
      weightKg: measured ? chart.weightKg : null,
    },
    resting: {
      seated,
      standing: resting.standing === null ? null : resting.standing - resting.seated + seated,
      spread: resting.spread,
    },
    risk: facts.risk,
    programWeek:
      observed.firstSession === null ? 1 : Math.floor((day - observed.firstSession) / 7) + 1,
    rhythm: facts.rhythm,
    rateActingDrugs: facts.rateActingDrugs,
    conditions: facts.conditions,
    devices: facts.devices,
    test: facts.test && testOn !== null ? { ...facts.test, daysAgo: day - testOn } : null,
    thresholds: facts.thresholds,
    observedWork: observed.work,
    walkTest: facts.walkTest,
    intensity: facts.intensity,
    percentOfPeak: facts.percentOfPeak,
    choice: facts.choice,
  };
}
