import { conditionKinds } from '@shared/contracts/record-lists';
import type { ClinicalEventKind, ConditionKind } from '@shared/contracts/record-lists';
import { stagesOf } from '@shared/clinical/exercise-test/protocols';
import { anginaInClass } from './chart';
import type { Chart } from './chart';
import { isoOf } from './days';
import type { Day } from './days';
import { dice } from './dice';
import { writeAssessments, writeRestrictions, writeRisk } from './record-assessments';
import { writeDrugs } from './record-drugs';
import { entry } from './record-entries';
import type { RecordRows, Scribe } from './record-entries';
import type { DiagnosisKind } from './situations';

const diagnosisText: Record<DiagnosisKind, string> = {
  'heart-attack': 'Acute myocardial infarction',
  stent: 'Coronary stent',
  bypass: 'Coronary artery bypass grafting',
  valve: 'Aortic valve replacement',
  transplant: 'Heart transplant',
  'stable-angina': 'Stable angina pectoris',
  'heart-failure': 'Chronic heart failure',
  'assist-device': 'Left ventricular assist device',
  other: 'Referred after hospital stay, other cardiac condition',
};

const eventOfDiagnosis: Partial<Record<DiagnosisKind, ClinicalEventKind>> = {
  'heart-attack': 'heart-attack',
  stent: 'stent',
  bypass: 'bypass',
  valve: 'valve',
  transplant: 'transplant',
  'assist-device': 'device-implant',
};

export function writeDiagnosis(rows: RecordRows, scribe: Scribe, kind: DiagnosisKind, on: Day) {
  const description = diagnosisText[kind];
  rows.diagnoses.push({
    ...entry(scribe, 'diagnosis', kind, on),
    kind,
    description,
    onsetOn: isoOf(on),
  });
  const event = eventOfDiagnosis[kind];
  if (event) writeEvent(rows, scribe, event, description, on);
}

function writeEvent(
  rows: RecordRows,
  scribe: Scribe,
  kind: ClinicalEventKind,
  description: string,
  on: Day,
) {
  rows.clinicalEvents.push({
    ...entry(scribe, 'event', kind, on),
    kind,
    description,
    occurredOn: isoOf(on),
  });
}

function conditionValue({ facts }: Chart, kind: ConditionKind): string {
  const value = facts.conditions[kind];
  return typeof value === 'string' ? value : value ? 'yes' : 'no';
}

/** Three readings of as many days whose mean is the seated rate and whose ends lie `spread` apart. */
function threeReadings(seated: number, spread: number): number[] {
  const below = Math.ceil(spread / 2);
  const above = Math.floor(spread / 2);
  return [seated - below, seated + above, seated + below - above];
}

/** @param daysBefore the days of the readings, counted back from `day` */
export function writeRestingRates(
  rows: RecordRows,
  scribe: Scribe,
  chart: Chart,
  seated: number,
  day: Day,
  daysBefore: readonly number[],
) {
  const { spread, standing, seated: first } = chart.facts.resting;
  const readings = spread === null ? [seated] : threeReadings(seated, spread);
  const days = daysBefore.slice(-readings.length);
  readings.forEach((reading, each) => {
    rows.restingRates.push({
      ...entry(scribe, 'resting', day, each),
      seated: reading,
      standing: standing === null ? null : standing - first + seated,
      measuredOn: isoOf(day - (days[each] ?? 0)),
    });
  });
}

function pacingModeOf({ facts }: Chart) {
  if (facts.devices.upperTrackingRate !== null) return 'DDD' as const;
  return facts.rhythm === 'sensor-paced' ? ('VVIR' as const) : ('VVI' as const);
}

function writeDevices(rows: RecordRows, scribe: Scribe, chart: Chart, day: Day) {
  const { devices, pacemaker, test } = chart.facts;
  const check = (on: Day, upperTrackingRate: number | null) =>
    rows.cardiacDevices.push({
      ...entry(scribe, 'device', on),
      icdStatus: devices.icd.status,
      icdZones: devices.icd.zones,
      pacemaker,
      pacingMode: pacemaker ? pacingModeOf(chart) : null,
      lowerRate: pacemaker ? 50 : null,
      upperTrackingRate,
      upperSensorRate: null,
      checkedOn: isoOf(on),
    });
  if (test && !test.sameRhythmAndDevice) {
    const before = devices.upperTrackingRate === null ? null : devices.upperTrackingRate - 10;
    check(day - test.daysAgo - 20, before);
  }
  check(day, devices.upperTrackingRate);
}

const protocols = { treadmill: 'Modified Bruce', cycle: 'Ramp 10 W/min', arm: 'Arm ramp 5 W/min' };

const protocolKinds = {
  treadmill: 'modified-bruce',
  cycle: 'cycle-ramp',
  arm: 'other',
} as const;

const submaximalEnds: readonly string[] = ['protocol-end', 'target-rate', 'orthopedic', 'other'];

/** Three finished stages of the protocol, the rate rising evenly towards the peak. */
const stagesUpTo = (resting: number, peak: number) =>
  stagesOf('modified-bruce')
    .slice(0, 3)
    .map(({ label, minutes, speedMph, gradePercent }, index) => ({
      label,
      minutes,
      speedMph,
      gradePercent,
      powerWatts: null,
      heartRate: Math.round(resting + ((peak - resting) * (index + 1)) / 4),
      systolic: 134 + 10 * index,
      diastolic: 80,
      exertion: 9 + 2 * index,
    }));

export function writeTest(
  rows: RecordRows,
  scribe: Scribe,
  { facts }: Chart,
  on: Day,
): string | null {
  const { test } = facts;
  if (!test) return null;
  const treadmill = test.mode === 'treadmill';
  const row = {
    ...entry(scribe, 'test', on),
    mode: test.mode,
    protocol: protocols[test.mode],
    protocolKind: protocolKinds[test.mode],
    peakSystolic: 168,
    peakDiastolic: 82,
    peakExertion: 16,
    exerciseMinutes: treadmill ? 10.5 : 9,
    stages: treadmill ? stagesUpTo(test.restingHeartRate ?? 70, test.peakHeartRate) : [],
    gait: treadmill ? ('walk' as const) : null,
    handrail: treadmill ? false : null,
    effort: submaximalEnds.includes(test.endedBy) ? ('submaximal' as const) : ('maximal' as const),
    recoveryOne: Math.max(50, test.peakHeartRate - 19),
    recoveryTwo: null,
    recoveryPosture: 'upright' as const,
    signs: [],
    drugsTaken: null,
    performedOn: isoOf(on),
    endedBy: test.endedBy,
    restingHeartRate: test.restingHeartRate,
    peakHeartRate: test.peakHeartRate,
    peakVo2: test.peakVo2,
    peakMets: test.peakMets,
    vo2Source: test.peakVo2 === null && test.peakMets === null ? null : test.vo2Source,
    note: null,
  };
  rows.exerciseTests.push(row);
  return row.id;
}

function writeThresholds(rows: RecordRows, scribe: Scribe, chart: Chart, testId: string | null) {
  const foundOn = isoOf(chart.testOn ?? chart.person.enrolledOn);
  chart.facts.thresholds.forEach((threshold, each) => {
    rows.thresholds.push({
      ...thresholdRow(scribe, each),
      ...threshold,
      exerciseTestId: testId,
      foundOn,
    });
  });
}

const thresholdRow = (scribe: Scribe, name: string | number) => ({
  ...entry(scribe, 'threshold', name),
  exerciseTestId: null,
  supersedes: null,
  note: null,
  status: 'active' as const,
  supersededByTestId: null,
  endedAt: null,
  endedBy: null,
  endedReason: null,
});

/** All that is asked, measured and copied from letters on the day of enrollment. */
export function writeIntake(rows: RecordRows, scribe: Scribe, chart: Chart, day: Day, anchor: Day) {
  const { facts, testOn, heightCm, weightKg } = chart;
  for (const kind of conditionKinds) {
    rows.conditions.push({
      ...entry(scribe, 'condition', kind),
      kind,
      value: conditionValue(chart, kind),
      since: null,
      evidence:
        kind === 'transplant' && facts.conditions.transplant === 'recovered'
          ? 'Rate fell 24 bpm in the first minute after the test'
          : null,
    });
  }
  if (facts.measured) {
    const measuredOn = isoOf(day);
    rows.bodyMeasurements.push({ ...entry(scribe, 'body', day), heightCm, weightKg, measuredOn });
  }
  rows.rhythmRecords.push({
    ...entry(scribe, 'rhythm', day),
    rhythm: facts.rhythm,
    observedOn: isoOf(day),
  });
  writeRestingRates(rows, scribe, chart, facts.resting.seated, day, [3, 1, 0]);
  writeDrugs(rows, scribe, chart, day);
  writeDevices(rows, scribe, chart, day);
  const testId = testOn === null ? null : writeTest(rows, scribe, chart, testOn);
  if (facts.test?.eventSince) {
    writeEvent(
      rows,
      scribe,
      'stent',
      'Second coronary stent',
      day - Math.floor(facts.test.daysAgo / 2),
    );
  }
  writeThresholds(rows, scribe, chart, testId);
  if (facts.walkTest) {
    rows.walkTests.push({
      ...entry(scribe, 'walk', day),
      distanceMeters: facts.walkTest.distanceMeters,
      performedOn: isoOf(day),
    });
  }
  writeRisk(rows, scribe, chart, day);
  writeRestrictions(rows, scribe, chart, day);
  // One person of the last two days waits to be spoken with, so that the page of today shows what that looks like.
  const draw = dice(chart.person.key, 'told of self-harm');
  const recent = day >= anchor - 1 && day <= anchor;
  const selfHarm = draw.chance(recent ? 0.4 : 0.02);
  writeAssessments(rows, scribe, chart, day, { selfHarm, open: selfHarm && day >= anchor - 1 });
}

export function writeAnginaInClass(rows: RecordRows, scribe: Scribe, chart: Chart, day: Day) {
  rows.thresholds.push({
    ...thresholdRow(scribe, 'in class'),
    ...anginaInClass(chart),
    foundOn: isoOf(day),
    note: 'Chest pressure in class, gone two minutes after slowing down',
  });
}
