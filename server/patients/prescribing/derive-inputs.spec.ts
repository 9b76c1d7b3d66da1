import { describe, expect, it } from 'vitest';
import { prescriptionRequestSchema } from '@shared/contracts/prescriptions-contract';
import { prescribingInputsSchema } from '@shared/contracts/prescribing-inputs-contract';
import {
  recordKinds,
  recordValues,
  type PatientRecord,
  type RecordInput,
  type RecordKind,
} from '@shared/contracts/record-contract';
import { conditionKinds } from '@shared/contracts/record-lists';
import { ageOn } from '@shared/scheduling/age';
import { deriveInputs } from './derive-inputs';
import type { ExerciseReading, RecordFacts } from './record-facts';

const today = '2026-12-01';

let made = 0;

/** An entry as the record has it; later ones are younger. */
function entry<K extends RecordKind>(kind: K, input: RecordInput<K>, recordedOn = today) {
  made += 1;
  return {
    id: `00000000-0000-7000-8000-${String(made).padStart(12, '0')}`,
    values: recordValues[kind].parse(input),
    recordedAt: `${recordedOn}T12:00:00+00:00`,
    recordedBy: { id: '00000000-0000-7000-8000-00000000000a', displayName: 'Ines Calder' },
    enteredInErrorAt: null,
    enteredInErrorBy: null,
    ended: null,
  };
}

function facts(
  record: { [K in RecordKind]?: unknown[] },
  rest: Partial<Omit<RecordFacts, 'record'>> = {},
): RecordFacts {
  const empty = Object.fromEntries(recordKinds.map((kind) => [kind, []]));
  return {
    patient: { birthDate: '1961-12-02', sexAtBirth: 'female' },
    course: null,
    readings: [],
    testValidDays: 180,
    ...rest,
    record: { ...empty, ...record } as unknown as PatientRecord,
  };
}

const inputsOf = (...given: Parameters<typeof facts>) => deriveInputs(facts(...given), today);

const rest = (seated: number, measuredOn: string, standing: number | null = null) =>
  entry('resting-rates', { seated, standing, measuredOn });
const drug = (startedOn: string, stoppedOn: string | null = null, dose = '50 mg') =>
  entry('medications', {
    name: 'metoprolol tartrate',
    rateActing: 'beta-blocker',
    dose,
    schedule: 'twice a day',
    startedOn,
    stoppedOn,
  });
const review = () => entry('medication-reviews', {});
const test = (performedOn: string) =>
  entry('exercise-tests', {
    mode: 'treadmill',
    protocol: 'Bruce',
    performedOn,
    endedBy: 'fatigue',
    peakHeartRate: 134,
    peakVo2: 22.4,
    vo2Source: 'measured',
  });
const icd = (checkedOn: string, rate: number | null) =>
  entry('devices', {
    icdStatus: rate === null ? 'none' : 'present',
    icdZones: rate === null ? [] : [{ rate, kind: 'shock' }],
    checkedOn,
  });

describe('an empty record', () => {
  const { inputs, missing, origins } = inputsOf({});

  it('leaves unknown what nobody entered, and never takes it for absent', () => {
    expect(inputs.devices.icd.status).toBe('unknown');
    expect(inputs.rateActingDrugs).toBeNull();
    expect(inputs.risk).toBe('unknown');
    expect(inputs.conditions.heartFailure).toBe('unknown');
    expect(inputs.conditions.outflowObstruction).toBeNull();
    expect(inputs).toMatchObject({ test: null, thresholds: [], walkTest: null, programWeek: 1 });
  });

  it('lists what must be answered first', () => {
    const conditions = conditionKinds
      .filter((kind) => kind !== 'heartFailure')
      .map((kind) => `conditions.${kind}`);
    expect(missing).toEqual(['resting.seated', 'rhythm', ...conditions]);
  });

  it('says of every input where it comes from', () => {
    expect(Object.keys(origins)).toEqual(expect.arrayContaining(['rhythm', 'resting', 'devices']));
    expect(prescribingInputsSchema.parse(inputsOf({}))).toBeDefined();
  });
});

it('is a request that can be evaluated once nothing is missing', () => {
  const { inputs, missing } = inputsOf({
    'resting-rates': [rest(62, today)],
    rhythms: [entry('rhythms', { rhythm: 'sinus', observedOn: today })],
    conditions: conditionKinds.map((kind) =>
      entry('conditions', {
        kind,
        value: kind === 'heartFailure' || kind === 'transplant' ? 'none' : 'no',
      }),
    ),
    'exercise-tests': [test('2026-11-18')],
    'medication-reviews': [review()],
    devices: [icd(today, null)],
  });
  expect(missing).toEqual([]);
  expect(prescriptionRequestSchema.safeParse(inputs).error).toBeUndefined();
  expect(inputs.test).toMatchObject({ daysAgo: 13, peakHeartRate: 134, sameRateActingDrugs: true });
});

describe('age and week', () => {
  it.each([
    ['1961-12-01', 65],
    ['1961-12-02', 64],
    ['2000-02-29', 26],
  ])('born %s is %i', (birthDate, years) => expect(ageOn(birthDate, today)).toBe(years));

  it.each([
    [null, 1],
    ['2026-12-01', 1],
    ['2026-11-25', 1],
    ['2026-11-24', 2],
    ['2026-12-05', 1],
  ])('first session %s is week %i', (firstSessionOn, week) => {
    const course = { firstSessionOn, qualifyingDiagnosis: 'stent' as const };
    expect(inputsOf({}, { course }).inputs.programWeek).toBe(week);
  });
});

describe('resting rate', () => {
  it.each([
    ['none', [], { seated: null, standing: null, spread: null }],
    ['one: no spread', [rest(62, today, 70)], { seated: 62, standing: 70, spread: null }],
    [
      'the last three',
      [rest(60, today), rest(64, '2026-11-28', 71), rest(65, '2026-11-26'), rest(90, '2026-11-20')],
      { seated: 63, standing: 71, spread: 5 },
    ],
    [
      'those of 30 days',
      [rest(60, today), rest(70, '2026-11-01'), rest(90, '2026-10-31')],
      { seated: 65, standing: null, spread: 10 },
    ],
    [
      'the last alone when all are older',
      [rest(60, '2026-10-01'), rest(66, '2026-09-30')],
      { seated: 60, standing: null, spread: null },
    ],
  ])('%s', (_, rates, expected) => {
    expect(inputsOf({ 'resting-rates': rates }).inputs.resting).toEqual(expected);
  });

  it('leaves out rates from before a change of a rate-acting drug', () => {
    const { inputs } = inputsOf({
      'resting-rates': [rest(58, today), rest(76, '2026-11-20')],
      medications: [drug('2026-11-25')],
    });
    expect(inputs.resting).toEqual({ seated: 58, standing: null, spread: null });
  });

  it('is called old when only such rates are there, or after 30 days', () => {
    const before = inputsOf({
      'resting-rates': [rest(76, '2026-11-20')],
      medications: [drug('2026-11-25')],
    });
    expect(before.origins['resting']).toMatchObject({ old: true });
    expect(inputsOf({ 'resting-rates': [rest(60, '2026-10-31')] }).origins['resting']?.old).toBe(
      true,
    );
    expect(inputsOf({ 'resting-rates': [rest(60, '2026-11-01')] }).origins['resting']?.old).toBe(
      false,
    );
  });
});

describe('drugs', () => {
  it('are unknown until the list was verified once', () => {
    expect(inputsOf({ medications: [drug('2026-01-01')] }).inputs.rateActingDrugs).toBeNull();
  });

  it.each([
    ['taken', [drug('2026-01-01')], ['beta-blocker']],
    ['none', [], []],
    ['stopped today', [drug('2026-01-01', today)], []],
    [
      'a dose changed today',
      [drug(today, null, '25 mg'), drug('2026-01-01', today)],
      ['beta-blocker'],
    ],
    ['to be stopped', [drug('2026-01-01', '2026-12-02')], ['beta-blocker']],
  ])('%s', (_, medications, classes) => {
    const { inputs } = inputsOf({ medications, 'medication-reviews': [review()] });
    expect(inputs.rateActingDrugs).toEqual(classes);
  });
});

describe('what changed since the test', () => {
  const since = (record: Parameters<typeof facts>[0]) =>
    inputsOf({
      'exercise-tests': [test('2026-11-18')],
      'medication-reviews': [review()],
      ...record,
    }).inputs.test;

  it.each([
    ['started before', [drug('2026-11-17')], true],
    ['started that day', [drug('2026-11-18')], false],
    ['started after', [drug('2026-11-19')], false],
    ['stopped after', [drug('2026-01-01', '2026-11-20')], false],
    ['stopped before', [drug('2026-01-01', '2026-11-10')], true],
  ])('a rate-acting drug %s', (_, medications, same) => {
    expect(since({ medications })?.sameRateActingDrugs).toBe(same);
  });

  it('a drug that does not act on the rate changes nothing', () => {
    const statin = entry('medications', {
      name: 'atorvastatin',
      dose: '40 mg',
      schedule: 'at night',
      startedOn: '2026-11-25',
    });
    expect(since({ medications: [statin] })?.sameRateActingDrugs).toBe(true);
  });

  it('an unverified list cannot say that the drugs are the same', () => {
    expect(since({ 'medication-reviews': [] })?.sameRateActingDrugs).toBe(false);
  });

  const rhythmOn = (rhythm: 'sinus' | 'atrial-fibrillation', observedOn: string) =>
    entry('rhythms', { rhythm, observedOn });

  it.each([
    ['first seen after', [rhythmOn('sinus', today)], true],
    ['the same again', [rhythmOn('sinus', today), rhythmOn('sinus', '2026-10-01')], true],
    [
      'another since',
      [rhythmOn('atrial-fibrillation', today), rhythmOn('sinus', '2026-10-01')],
      false,
    ],
    [
      'another, and back',
      [
        rhythmOn('sinus', today),
        rhythmOn('atrial-fibrillation', '2026-11-20'),
        rhythmOn('sinus', '2026-10-01'),
      ],
      false,
    ],
    [
      'another before',
      [rhythmOn('atrial-fibrillation', '2026-11-01'), rhythmOn('sinus', '2026-10-01')],
      true,
    ],
  ])('rhythm %s', (_, rhythms, same) => {
    expect(since({ rhythms })?.sameRhythmAndDevice).toBe(same);
  });

  it.each([
    ['zones changed', [icd(today, 170), icd('2026-10-01', 180)], false],
    ['zones the same', [icd(today, 180), icd('2026-10-01', 180)], true],
    ['implanted', [icd(today, 180), icd('2026-10-01', null)], false],
    [
      'became known',
      [icd(today, 180), entry('devices', { icdStatus: 'unknown', checkedOn: '2026-10-01' })],
      true,
    ],
  ])('device %s', (_, devices, same) => {
    expect(since({ devices })?.sameRhythmAndDevice).toBe(same);
  });

  it.each([
    ['2026-11-17', false],
    ['2026-11-18', true],
    ['2026-11-30', true],
  ])('an event on %s', (occurredOn, expected) => {
    const event = entry('clinical-events', { kind: 'stent', description: '', occurredOn });
    expect(since({ 'clinical-events': [event] })?.eventSince).toBe(expected);
  });
});

describe('conditions', () => {
  it('follow from a diagnosis where nobody answered, never as absent', () => {
    const course = { firstSessionOn: null, qualifyingDiagnosis: 'transplant' as const };
    const diagnoses = [entry('diagnoses', { kind: 'heart-attack', description: 'Anterior' })];
    const { conditions } = inputsOf({ diagnoses }, { course }).inputs;
    expect(conditions).toMatchObject({ coronaryDisease: true, transplant: 'denervated' });
    expect(conditions.dissection).toBeNull();
  });

  it('take the latest answer before what a diagnosis implies', () => {
    const answer = (value: string, on: string) =>
      entry(
        'conditions',
        { kind: 'transplant', value, evidence: 'The rate fell by 24 bpm in a minute' },
        on,
      );
    const { conditions } = inputsOf({
      diagnoses: [entry('diagnoses', { kind: 'transplant', description: 'Heart' })],
      conditions: [answer('recovered', today), answer('denervated', '2026-10-01')],
    }).inputs;
    expect(conditions.transplant).toBe('recovered');
  });
});

it('keeps every active threshold, and none that ended', () => {
  const found = (heartRate: number) =>
    entry('thresholds', { kind: 'ischemia', heartRate, foundOn: '2026-11-18' });
  const by = { id: '00000000-0000-7000-8000-00000000000a', displayName: 'Ines Calder' };
  const ended = {
    status: 'retired' as const,
    at: `${today}T12:00:00+00:00`,
    by,
    reason: 'stented',
  };
  const { inputs } = inputsOf({ thresholds: [found(118), { ...found(110), ended }, found(112)] });
  expect(inputs.thresholds.map(({ heartRate }) => heartRate)).toEqual([118, 112]);
});

describe('observed work', () => {
  const reading = (
    session: number,
    localDate: string,
    heartRate: number,
    perceivedExertion = 12,
  ): ExerciseReading => ({
    sessionRecordId: `s${session}`,
    localDate,
    heartRate,
    perceivedExertion,
  });

  const two = [
    reading(1, '2026-11-24', 96, 11),
    reading(1, '2026-11-24', 100, 12),
    reading(2, '2026-11-26', 98, 13),
  ];

  it.each([
    ['no sessions', [], null],
    ['one session', two.slice(0, 2), null],
    [
      'two sessions',
      two,
      { medianHeartRate: 98, sessions: 2, perceivedExertion: { lower: 11, upper: 13 } },
    ],
    [
      'effort outside 9–13',
      [reading(1, '2026-11-24', 96, 8), reading(2, '2026-11-26', 120, 14)],
      null,
    ],
    [
      'a session that was not steady left out',
      [...two, reading(3, '2026-11-28', 90), reading(3, '2026-11-28', 101)],
      { medianHeartRate: 98, sessions: 2, perceivedExertion: { lower: 11, upper: 13 } },
    ],
    [
      'one effort, as a range',
      [reading(1, '2026-11-24', 96, 13), reading(2, '2026-11-26', 98, 13)],
      { medianHeartRate: 97, sessions: 2, perceivedExertion: { lower: 12, upper: 13 } },
    ],
    ['sessions of long ago', [reading(1, '2026-09-01', 96), reading(2, '2026-09-01', 98)], null],
  ])('%s', (_, readings, expected) => {
    expect(inputsOf({}, { readings }).inputs.observedWork).toEqual(expected);
  });

  it('counts no session on or before the day of a change of drugs', () => {
    expect(
      inputsOf({ medications: [drug('2026-11-24')] }, { readings: two }).inputs.observedWork,
    ).toBeNull();
    expect(
      inputsOf({ medications: [drug('2026-11-23')] }, { readings: two }).inputs.observedWork
        ?.sessions,
    ).toBe(2);
  });
});
