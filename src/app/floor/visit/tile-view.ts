import { nextReadingDue } from '@shared/clinical/reading-due';
import type { IconName } from '../../ui/icon/icon-names';
import type { Tone } from '../../ui/state-chip/state-chip';
import { clockText } from '../floor-time';
import { flagWords, rangeText } from './floor-words';
import {
  type Visit,
  type VisitReading,
  currentReadings,
  lastWith,
  minutesExercised,
} from './visit';

export interface Chip {
  readonly tone: Tone;
  readonly icon: IconName | null;
  readonly text: string;
}

/** One patient of the class at a glance. */
export interface TileView {
  readonly appointmentId: string;
  readonly name: string;
  /** The last rate of this visit, bpm. */
  readonly rate: number | null;
  /** The rate is past due: it is greyed. */
  readonly isOld: boolean;
  readonly isOver: boolean;
  readonly chip: Chip;
  /** What was read last and when: effort, pressure, minutes of exercise. */
  readonly last: readonly string[];
  /** What stands out about the patient. */
  readonly flags: readonly string[];
  /** Entries that the server has not acknowledged yet, or refused. */
  readonly unsent: 'none' | 'sending' | 'refused';
}

/** When the next reading of a visit is due, null when none is. */
export function dueAt(visit: Visit): Date | null {
  if (visit.status !== 'checked-in' || visit.record?.signedAt) return null;
  const last = currentReadings(visit.readings).at(-1);
  return nextReadingDue(
    visit.checkedInAt === null ? null : new Date(visit.checkedInAt),
    last ? { ...last, measuredAt: new Date(last.measuredAt) } : null,
  );
}

export function isDue(visit: Visit, now: Date): boolean {
  const due = dueAt(visit);
  return due !== null && due <= now;
}

const plain = (text: string): Chip => ({ tone: 'plain', icon: null, text });
const due = (text: string, icon: IconName | null = null): Chip => ({ tone: 'due', icon, text });

/** Where a reading at exercise lies relative to the effort that was asked for. */
function effortChip({ perceivedExertion: wanted }: Visit, effort: number | null): Chip {
  if (wanted === null) return plain('no range in force');
  const asked = rangeText(wanted);
  if (effort === null) return plain(`go by effort ${asked}`);
  if (effort > wanted.upper) return due(`effort ${effort}, above ${asked}`, 'arrow-up');
  if (effort < wanted.lower) return due(`effort ${effort}, below ${asked}`, 'arrow-down');
  return { tone: 'in', icon: null, text: `effort ${effort}, in ${asked}` };
}

/** Past the line at which the floor asks, where no ceiling is known. */
export const isPastAskLine = (visit: Visit, rate: number | null): boolean =>
  visit.ceiling === null && visit.askLine !== null && rate !== null && rate > visit.askLine;

function exerciseChip(
  visit: Visit,
  { placement, heartRate, perceivedExertion }: VisitReading,
): Chip {
  if (isPastAskLine(visit, heartRate)) return due(`past ${visit.askLine}: ask`, 'help');
  if (visit.target === null || placement === null) return effortChip(visit, perceivedExertion);
  const range = rangeText(visit.target);
  if (placement === 'below') return due(`below ${range}`, 'arrow-down');
  if (placement === 'above') return due(`above ${range}`, 'arrow-up');
  return { tone: 'in', icon: null, text: `in range ${range}` };
}

function readingChip(visit: Visit, last: VisitReading | undefined, now: Date): Chip {
  const late = isDue(visit, now);
  if (last?.placement === 'over-ceiling') {
    const text = `over ceiling ${visit.ceiling?.value ?? ''}${late ? ': recheck' : ''}`;
    return { tone: 'over', icon: null, text };
  }
  if (late) return due(last ? 'reading due' : 'first reading due');
  if (!last) return plain(visit.recordId === null ? 'confirm identity' : 'first reading');
  if (last.phase === 'exercise') return exerciseChip(visit, last);
  return plain(last.phase === 'resting' ? 'at rest' : 'recovering');
}

/** The reading that the tile's chip speaks of: the last with a rate, else the last with an effort. */
function leading(visit: Visit): VisitReading | undefined {
  const current = currentReadings(visit.readings);
  return lastWith(current, 'heartRate') ?? lastWith(current, 'perceivedExertion') ?? current.at(-1);
}

function chipOf(visit: Visit, now: Date): Chip {
  switch (visit.status) {
    case 'booked':
      return plain('not here yet');
    case 'arrived':
      return due('to check in');
    case 'noshow':
      return plain('no-show');
    case 'fulfilled':
      return { tone: 'in', icon: null, text: 'signed' };
    default:
      return readingChip(visit, leading(visit), now);
  }
}

function lastWords(visit: Visit, now: Date, timeZone: string): string[] {
  const at = (time: string): string => clockText(time, timeZone);
  if (visit.status === 'arrived' && visit.arrivedAt) return [`arrived ${at(visit.arrivedAt)}`];
  const current = currentReadings(visit.readings);
  const last = current.at(-1);
  if (!last) {
    if (visit.status !== 'checked-in') return [];
    return visit.checkedInAt ? [`checked in ${at(visit.checkedInAt)}`] : ['checked in'];
  }
  const effort = lastWith(current, 'perceivedExertion')?.perceivedExertion;
  const pressure = lastWith(current, 'systolic');
  const minutes = minutesExercised(current, now);
  return [
    `at ${at((lastWith(current, 'heartRate') ?? last).measuredAt)}`,
    ...(effort ? [`RPE ${effort}`] : []),
    ...(pressure ? [`${pressure.systolic}/${pressure.diastolic ?? '–'}`] : []),
    ...(minutes === null || visit.status === 'fulfilled' ? [] : [`${minutes} min`]),
  ];
}

/** What took the lead from the rate, or asks for a review, in two words: the pad tells the rest. */
function rangeFlagWords({ rangeFlags }: Visit): string[] {
  const has = (wanted: Visit['rangeFlags'][number]['effect']): boolean =>
    rangeFlags.some(({ effect }) => effect === wanted);
  return [
    ...(has('withdrawn') ? ['range withdrawn'] : []),
    ...(has('effort-today') ? ['dose missed'] : []),
    ...(has('review-due') ? ['review due'] : []),
  ];
}

function flagsOf(visit: Visit): string[] {
  const { icd, flags, restrictions, ceiling, leadBy } = visit;
  return [
    ...rangeFlagWords(visit),
    ...(leadBy === null ? [] : [ceiling === null ? 'no ceiling' : `ceiling ${ceiling.value}`]),
    ...(icd.lowestRate === null ? [] : [`ICD ${icd.lowestRate}`]),
    ...(icd.status === 'present' && icd.lowestRate === null ? ['ICD, zones unknown'] : []),
    ...flags.map((flag) => flagWords[flag]),
    ...restrictions.map(({ title }) => title.toLowerCase()),
  ];
}

function unsentOf({ readings, recordEntry, workEntry }: Visit): TileView['unsent'] {
  const entries = [recordEntry, workEntry, ...readings.map(({ entry }) => entry)];
  if (entries.some((entry) => entry?.state === 'refused')) return 'refused';
  return entries.some((entry) => entry !== null) ? 'sending' : 'none';
}

/** @param timeZone the site's, whose clock the tile tells times by */
export function tileOf(visit: Visit, now: Date, timeZone: string): TileView {
  const last = leading(visit);
  return {
    appointmentId: visit.appointmentId,
    name: visit.displayName,
    rate: last?.heartRate ?? null,
    isOld: last !== undefined && isDue(visit, now),
    isOver: last?.placement === 'over-ceiling' && visit.status === 'checked-in',
    chip: chipOf(visit, now),
    last: lastWords(visit, now, timeZone),
    flags: flagsOf(visit),
    unsent: unsentOf(visit),
  };
}
