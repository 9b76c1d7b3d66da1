import type { Reading, RosterItem } from '@shared/contracts/floor-contract';

const id = (number: number): string =>
  `019ae2f0-7e55-7000-8000-${String(number).padStart(12, '0')}`;

/** A reading of the specs, of 9:00 at the site unless told otherwise. */
export function sampleReading(number: number, given: Partial<Reading> = {}): Reading {
  return {
    id: id(number),
    sessionRecordId: id(900),
    phase: 'exercise',
    measuredAt: '2026-12-01T14:00:00.000Z',
    heartRate: 104,
    systolic: null,
    diastolic: null,
    oxygenSaturation: null,
    perceivedExertion: null,
    symptoms: [],
    note: null,
    placement: 'in',
    status: 'final',
    amends: null,
    amendmentReason: null,
    receivedAt: '2026-12-01T14:00:01.000Z',
    recordedBy: 'P. Halloran',
    ...given,
  };
}

/** A patient of the specs: checked in at 8:55, target 91–108, ceiling 112 for ischemia, the record begun. */
export function sampleItem(given: Partial<RosterItem> = {}): RosterItem {
  return {
    appointmentId: id(1),
    patientId: id(2),
    displayName: 'Odalys Verne',
    familyName: 'Verne',
    recordNumber: 'HL-1001',
    birthDate: '1961-04-17',
    status: 'checked-in',
    version: 3,
    monitored: true,
    arrivedAt: '2026-12-01T13:50:00.000Z',
    checkedInAt: '2026-12-01T13:55:00.000Z',
    prescriptionId: id(3),
    leadBy: 'heart-rate',
    target: { lower: 91, upper: 108 },
    guide: null,
    ceiling: { value: 112, bindingLimits: ['ischemia'] },
    askLine: null,
    perceivedExertion: { scale: 'borg-6-20', lower: 11, upper: 14 },
    pressureCeiling: null,
    oxygenFloor: null,
    restingHeartRate: 62,
    withdrawn: [],
    rangeFlags: [],
    nextStart: null,
    work: null,
    icd: { status: 'none', lowestRate: null },
    flags: [],
    restrictions: [],
    record: {
      id: id(900),
      startedAt: '2026-12-01T13:56:00.000Z',
      identityConfirmedWith: ['name', 'birth-date'],
      recordedBy: 'P. Halloran',
      signedAt: null,
      signedBy: null,
    },
    readings: [],
    ...given,
  };
}
