import type { PrescriptionAnswer } from '@shared/clinical/prescribing';
import type { Chart } from './chart';

const metersPerMinuteByMph = 26.8224;
const down = (value: number, step: number) => (Math.floor(value / step + 1e-9) * step).toFixed(1);

type Workload = PrescriptionAnswer['workloads'][number];
type Point = Workload['point'];

function settingOf(
  answer: PrescriptionAnswer | null,
  point: Point,
): { mph: number; grade: number; watts: number | null } | null {
  const rows = answer?.workloads.filter((row) => row.point === point) ?? [];
  const walk = rows.find((row) => row.modality === 'treadmill-walk');
  const cycle = rows.find((row) => row.modality === 'cycle');
  if (walk?.modality !== 'treadmill-walk' || walk.speedMph === null) return null;
  const watts = cycle?.modality === 'cycle' ? cycle.powerWatts : null;
  return { mph: walk.speedMph, grade: walk.gradePercent ?? 0, watts };
}

/** A speed at which this person would begin without a prescription for it: most of the walking speed, mph. */
function easyMph({ facts }: Chart): number {
  const meters = facts.walkTest?.distanceMeters ?? 360;
  return (meters / 6 / metersPerMinuteByMph) * 0.72;
}

/** What the machine was set to: from the start towards the limit as the weeks pass, all told in the note. */
export function workNote(
  chart: Chart,
  answer: PrescriptionAnswer | null,
  progress: number,
  bout: number,
): string {
  const start = settingOf(answer, 'start') ?? { mph: easyMph(chart), grade: 0, watts: 25 };
  const limit = settingOf(answer, 'limit') ?? {
    mph: start.mph * 1.3,
    grade: start.grade + 1.5,
    watts: (start.watts ?? 25) + 30,
  };
  const along = (from: number, to: number) => from + (to - from) * progress;
  if (bout === 1) {
    const watts = Math.floor(along(start.watts ?? 20, limit.watts ?? 45) / 5) * 5;
    return `Cycle ${Math.max(10, watts)} W`;
  }
  const grade = Number(down(along(start.grade, limit.grade), 0.5));
  return `Treadmill ${down(along(start.mph, limit.mph), 0.1)} mph, ${grade} %`;
}
