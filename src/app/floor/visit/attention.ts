import { readingIntervals } from '@shared/clinical/reading-due';
import type { Visit, VisitReading } from './visit';
import { currentReadings, lastWith } from './visit';
import { symptomsText } from './floor-words';
import { isDue, isPastAskLine } from './tile-view';

/** What needs somebody now, most urgent first. */
export interface Attention {
  readonly appointmentId: string;
  readonly tone: 'over' | 'due';
  readonly text: string;
}

interface Findings {
  readonly visit: Visit;
  readonly current: readonly VisitReading[];
  readonly last: VisitReading | undefined;
  readonly late: boolean;
}

function overCeiling({ visit, current, late }: Findings): string | null {
  const last = lastWith(current, 'heartRate');
  if (last?.placement !== 'over-ceiling') return null;
  const what = `${last.heartRate}, over ${visit.ceiling?.value}`;
  return late
    ? `${what}: recheck now`
    : `${what}: slow down, recheck in ${readingIntervals.overCeiling} min`;
}

function overPressure({ visit: { pressureCeiling }, current }: Findings): string | null {
  const last = lastWith(current, 'systolic');
  if (!last || pressureCeiling === null) return null;
  const { systolic, diastolic } = last;
  const over =
    (systolic ?? 0) > pressureCeiling.systolic || (diastolic ?? 0) > pressureCeiling.diastolic;
  if (!over) return null;
  return `${systolic}/${diastolic ?? '–'}, over ${pressureCeiling.systolic}/${pressureCeiling.diastolic}: slow down, recheck`;
}

function underOxygen({ visit: { oxygenFloor }, current }: Findings): string | null {
  const oxygen = lastWith(current, 'oxygenSaturation')?.oxygenSaturation ?? null;
  if (oxygen === null || oxygenFloor === null || oxygen >= oxygenFloor) return null;
  return `oxygen ${oxygen} %, under ${oxygenFloor} %: stop and recheck`;
}

function symptoms({ last }: Findings): string | null {
  const words = symptomsText(last?.symptoms ?? []);
  return words === '' ? null : `${words.toLowerCase()}: see to the patient`;
}

function askLine({ visit, current }: Findings): string | null {
  const rate = lastWith(current, 'heartRate')?.heartRate ?? null;
  return isPastAskLine(visit, rate) ? `${rate}, no ceiling known: ask how they feel` : null;
}

const changed = ({ visit }: Findings): string | null =>
  visit.flags.includes('range-changed')
    ? 'range changed since the record began: see the chart'
    : null;

function waiting({ visit, last, late }: Findings): string | null {
  if (visit.status === 'arrived') return 'to check in';
  if (!late) return null;
  return last ? 'reading due' : 'first reading due';
}

function unsigned({ visit }: Findings, classIsOver: boolean): string | null {
  return classIsOver && visit.status === 'checked-in' && visit.recordId ? 'record to sign' : null;
}

/** Whether there are two of a family name, so that the given name is told too. */
const namesake = (visit: Visit, visits: readonly Visit[]): boolean =>
  visits.filter(({ familyName }) => familyName === visit.familyName).length > 1;

function attentionOf(visit: Visit, now: Date, classIsOver: boolean) {
  const current = currentReadings(visit.readings);
  const findings = { visit, current, last: current.at(-1), late: isDue(visit, now) };
  const open = visit.status === 'checked-in' || visit.status === 'arrived';
  if (!open) return { urgent: [], later: [] };
  const urgent = [
    overCeiling(findings),
    overPressure(findings),
    underOxygen(findings),
    symptoms(findings),
  ].filter((text) => text !== null);
  const told = urgent.length > 0;
  const later = [
    askLine(findings),
    changed(findings),
    told || classIsOver ? null : waiting(findings),
    unsigned(findings, classIsOver),
  ].filter((text) => text !== null);
  return { urgent, later };
}

/** What of a class needs attention: what may hurt first, then what is due, each in the order of the places. */
export function attentionIn(
  visits: readonly Visit[],
  now: Date,
  classIsOver: boolean,
): Attention[] {
  const told = visits.map((visit) => {
    const name = namesake(visit, visits) ? visit.displayName : visit.familyName;
    const { urgent, later } = attentionOf(visit, now, classIsOver);
    const item = (tone: Attention['tone']) => (text: string) => ({
      appointmentId: visit.appointmentId,
      tone,
      text: `${name} ${text}`,
    });
    return { urgent: urgent.map(item('over')), later: later.map(item('due')) };
  });
  return [...told.flatMap(({ urgent }) => urgent), ...told.flatMap(({ later }) => later)];
}
