import { bpm } from '@shared/units';
import { placeReading } from '@shared/clinical/placement';
import type { PrescriptionAnswer } from '@shared/clinical/prescribing';
import type { RowOf } from './row-of';
import type { Chart } from './chart';
import { seatedAfter } from './chart';
import { minutesLater } from './days';
import { dice, idAt } from './dice';
import type { Dice } from './dice';
import type { Visit } from './courses';
import { workNote } from './workload-notes';

type VitalRow = RowOf<'vitalSigns'>;
type Values = Pick<
  VitalRow,
  | 'heartRate'
  | 'systolic'
  | 'diastolic'
  | 'oxygenSaturation'
  | 'perceivedExertion'
  | 'symptoms'
  | 'note'
>;

/** What a session is read from. */
export interface SessionFacts {
  readonly visit: Visit;
  readonly chart: Chart;
  readonly prescriptionId: string | null;
  readonly answer: PrescriptionAnswer | null;
  readonly recordId: string;
  readonly patientId: string;
  readonly nurse: string;
  /** Angina begins at this rate in the last bout. */
  readonly anginaAt: number | null;
}

/** Asked, and had none. */
const noSymptoms = ['none'];
const whole = Math.round;
const clamp = (value: number, low: number, high: number) => Math.max(low, Math.min(high, value));

/** How much the rate rises at easy work where nothing guides it, bpm; irregular rhythms scatter. */
function freeRise({ facts }: Chart, draw: Dice): number {
  if (facts.rhythm === 'fixed-paced') return draw.whole(0, 2);
  if (facts.rhythm === 'high-grade-block') return draw.whole(4, 12);
  if (facts.conditions.transplant === 'denervated') return draw.whole(12, 24);
  if (facts.conditions.chronotropicIncompetence) return draw.whole(16, 25);
  if (facts.conditions.ventricularAssistDevice) return draw.whole(12, 24);
  if (['atrial-fibrillation', 'atrial-flutter'].includes(facts.rhythm)) return draw.near(33, 9);
  return draw.near(27, 4);
}

/** Mostly in the range, higher in it as weeks pass; sometimes short of it, now and then past it. */
function rateInRange(lower: number, upper: number, progress: number, draw: Dice): number {
  const width = upper - lower;
  if (draw.chance(0.05)) return lower - draw.whole(1, 6);
  if (draw.chance(0.04)) return upper + draw.whole(1, 5);
  const middle = lower + width * (0.35 + 0.25 * progress);
  return clamp(draw.near(middle, Math.max(1.5, width * 0.14)), lower, upper);
}

function exerciseRate(facts: SessionFacts, seated: number, progress: number, draw: Dice): number {
  const range = facts.answer?.target ?? facts.answer?.guide ?? null;
  if (range) return whole(rateInRange(range.lower, range.upper, progress, draw));
  const free = seated + freeRise(facts.chart, draw);
  const ceiling = facts.answer?.ceiling?.value;
  return whole(ceiling !== undefined && free > ceiling && !draw.chance(0.04) ? ceiling - 2 : free);
}

function effort(answer: PrescriptionAnswer | null, bout: number, draw: Dice): number {
  const { lower, upper } = answer?.perceivedExertion ?? { lower: 11, upper: 13 };
  const stray = draw.chance(0.05) ? draw.pick([-1, 1, 2]) : 0;
  return clamp(whole(draw.near((lower + upper) / 2 + (bout - 1) * 0.4, 0.8)), lower, upper) + stray;
}

function symptomsOf({ facts, person }: Chart, draw: Dice): string[] {
  if (facts.conditions.peripheralArteryDisease && draw.chance(0.3)) return ['leg-pain'];
  if (facts.conditions.heartFailure === 'reduced' && draw.chance(0.06))
    return ['shortness-of-breath'];
  if (person.situation.diagnosis === 'stable-angina' && draw.chance(0.03))
    return ['chest-discomfort'];
  if (draw.chance(0.012)) return [draw.pick(['dizziness', 'palpitations', 'unusual-fatigue'])];
  return noSymptoms;
}

/** A person's own pressure and saturation, from which every session differs a little. */
function constitution({ person, facts }: Chart) {
  const own = dice(person.key, 'constitution');
  return {
    systolic: own.whole(112, 140),
    diastolic: own.whole(66, 82),
    oxygen: facts.conditions.pulmonaryHypertension ? 92 : own.whole(95, 98),
  };
}

function pressure(facts: SessionFacts, rise: number, progress: number, draw: Dice) {
  if (facts.chart.facts.conditions.ventricularAssistDevice) {
    return { systolic: null, diastolic: null };
  }
  const own = constitution(facts.chart);
  const limit = facts.answer?.pressureCeiling;
  const systolic = whole(draw.near(own.systolic - 5 * progress + rise, 4));
  const diastolic = whole(draw.near(own.diastolic - 3 * progress + rise / 10, 3));
  return {
    systolic: limit ? Math.min(systolic, limit.systolic - 2) : systolic,
    diastolic: limit ? Math.min(diastolic, limit.diastolic - 2) : diastolic,
  };
}

function oxygen(facts: SessionFacts, drop: number, draw: Dice): number {
  const value = whole(draw.near(constitution(facts.chart).oxygen - drop, 0.6));
  return clamp(value, facts.answer?.oxygenFloor ?? 88, 99);
}

const byDoppler = ({ chart }: SessionFacts, draw: Dice) =>
  chart.facts.conditions.ventricularAssistDevice
    ? `Mean pressure ${draw.whole(74, 88)} mmHg by Doppler`
    : null;

function atRest(facts: SessionFacts, seated: number, progress: number, draw: Dice): Values {
  const scatter = (facts.chart.facts.resting.spread ?? 5) / 3;
  return {
    heartRate: whole(draw.near(seated, scatter)),
    ...pressure(facts, 0, progress, draw),
    oxygenSaturation: oxygen(facts, 0, draw),
    perceivedExertion: null,
    symptoms: noSymptoms,
    note: byDoppler(facts, draw),
  };
}

/** Not let exercise: a pressure above what the program accepts at rest. */
function heldAtRest(facts: SessionFacts, seated: number, draw: Dice): Values {
  return {
    ...atRest(facts, seated, 0, draw),
    systolic: draw.whole(188, 202),
    diastolic: draw.whole(102, 110),
    note: 'Held at rest: pressure above the program’s limit twice, 10 minutes apart. Physician told.',
  };
}

function atWork(
  facts: SessionFacts,
  seated: number,
  progress: number,
  bout: number,
  draw: Dice,
): Values {
  return {
    heartRate: exerciseRate(facts, seated, progress, draw),
    ...pressure(facts, 20 + bout * 5 + 6 * progress, progress, draw),
    oxygenSaturation: oxygen(facts, 1, draw),
    perceivedExertion: effort(facts.answer, bout, draw),
    symptoms: symptomsOf(facts.chart, draw),
    note: workNote(facts.chart, facts.answer, progress, bout),
  };
}

function afterwards(facts: SessionFacts, seated: number, progress: number, draw: Dice): Values {
  const denervated = facts.chart.facts.conditions.transplant === 'denervated';
  return {
    ...atRest(facts, seated + (denervated ? 14 : 8), progress, draw),
    ...pressure(facts, 4, progress, draw),
  };
}

type Reading = Pick<VitalRow, 'phase' | 'measuredAt'> & Values;

/** The readings of one visit in the order of measuring. */
function readingsOf(facts: SessionFacts): Reading[] {
  const { visit, chart } = facts;
  const draw = dice(visit.key, 'vitals');
  const at = (minutes: number) => minutesLater(visit.startsAt, minutes + draw.whole(0, 2));
  const seated = seatedAfter(chart, visit.attendedBefore);
  if (visit.state === 'held') {
    return [{ phase: 'resting', measuredAt: at(3), ...heldAtRest(facts, seated, draw) }];
  }
  const progress = Math.min(1, visit.attendedBefore / 36);
  const bouts = visit.attendedBefore < 3 || draw.chance(0.25) ? 2 : 3;
  const exercise = Array.from({ length: bouts }, (_, bout): Reading => ({
    phase: 'exercise',
    measuredAt: at(14 + bout * 12),
    ...atWork(facts, seated, progress, bout, draw),
  }));
  const readings: Reading[] = [
    { phase: 'resting', measuredAt: at(2), ...atRest(facts, seated, progress, draw) },
    ...exercise,
    { phase: 'recovery', measuredAt: at(53), ...afterwards(facts, seated, progress, draw) },
  ];
  return readings.map((reading, each) =>
    each === bouts ? withAngina(reading, facts.anginaAt) : reading,
  );
}

function withAngina(reading: Reading, anginaAt: number | null): Reading {
  if (anginaAt === null) return reading;
  const note = 'Chest pressure 2 of 4 at this rate, gone two minutes after slowing down';
  return { ...reading, heartRate: anginaAt, symptoms: ['chest-discomfort'], note };
}

function placementOf(facts: SessionFacts, { phase, heartRate }: Reading): VitalRow['placement'] {
  if (typeof heartRate !== 'number' || !facts.answer) return null;
  return placeReading(phase, bpm(heartRate), facts.answer);
}

function rowOf(facts: SessionFacts, reading: Reading, name: string): VitalRow {
  return {
    id: idAt(reading.measuredAt, facts.visit.key, 'vitals', name),
    sessionRecordId: facts.recordId,
    patientId: facts.patientId,
    ...reading,
    placement: placementOf(facts, reading),
    prescriptionId: facts.prescriptionId,
    status: 'final',
    amends: null,
    amendmentReason: null,
    receivedAt: new Date(reading.measuredAt.getTime() + 4_000),
    recordedBy: facts.nurse,
  };
}

const swapped = (rate: number) => (rate % 10) * 10 + Math.floor(rate / 10);

/** Now and then two digits were swapped in typing: the first reading stays, and a second one amends it. */
function withSlips(facts: SessionFacts, reading: Reading, each: number): VitalRow[] {
  const right = rowOf(facts, reading, String(each));
  const rate = reading.heartRate ?? 0;
  const slips = dice(facts.visit.key, 'slip', each).chance(0.012);
  const slip = swapped(rate);
  if (!slips || rate >= 100 || slip === rate || slip < 30) return [right];
  const wrong = rowOf(facts, { ...reading, heartRate: slip }, `${each} first`);
  return [
    { ...wrong, status: 'amended' },
    {
      ...right,
      amends: wrong.id,
      amendmentReason: 'Digits swapped',
      receivedAt: minutesLater(reading.measuredAt, 3),
    },
  ];
}

export function vitalRows(facts: SessionFacts): VitalRow[] {
  return readingsOf(facts).flatMap((reading, each) => withSlips(facts, reading, each));
}
