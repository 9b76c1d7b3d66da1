import type { CourseSession } from '@shared/contracts/progression-contract';

export const WIDTH = 720;
const left = 56;
const right = WIDTH - 12;
const gap = 30;
const rowHeight = 118;
const top = 18;

export interface Row {
  readonly label: string;
  readonly labelY: number;
  readonly ticks: readonly { readonly value: number; readonly y: number }[];
  readonly bands: readonly { x: number; width: number; y: number; height: number }[];
  /** Ceilings, over the sessions that had them. */
  readonly lines: readonly { x: number; width: number; y: number }[];
  readonly dots: readonly { x: number; y: number }[];
}

interface Measure {
  readonly label: string;
  readonly step: number;
  readonly value: (session: CourseSession) => number | null;
  readonly band: (
    session: CourseSession,
  ) => { readonly lower: number; readonly upper: number } | null;
  readonly line: (session: CourseSession) => number | null;
}

const measures: readonly Measure[] = [
  {
    label: 'Heart rate, bpm',
    step: 20,
    value: ({ medianHeartRate }) => medianHeartRate,
    band: ({ target }) => target,
    line: ({ ceiling }) => ceiling,
  },
  {
    label: 'Effort, RPE 6–20',
    step: 2,
    value: ({ medianExertion }) => medianExertion,
    band: ({ exertion }) => exertion,
    line: () => null,
  },
  {
    label: 'Work, METs',
    step: 1,
    value: ({ load }) => load?.mets ?? null,
    band: () => null,
    line: () => null,
  },
];

function drawRow(measure: Measure, sessions: readonly CourseSession[], index: number): Row {
  const { label, step, value, band, line } = measure;
  const labelY = top + index * (rowHeight + gap);
  const [upper, lower] = [labelY + 10, labelY + rowHeight];
  const all = sessions.flatMap((session) => {
    const range = band(session);
    return [value(session), line(session), range?.lower ?? null, range?.upper ?? null];
  });
  const known = all.filter((number) => number !== null);
  const low = known.length === 0 ? 0 : Math.floor(Math.min(...known) / step - 0.25) * step;
  const high = known.length === 0 ? step : Math.ceil(Math.max(...known) / step + 0.25) * step;
  const y = (number: number): number => lower - ((number - low) / (high - low)) * (lower - upper);
  const width = (right - left) / Math.max(1, sessions.length);
  const x = (at: number): number => left + at * width;
  const every = Math.max(1, Math.ceil((high - low) / step / 4)) * step;
  return {
    label,
    labelY,
    ticks: Array.from(
      { length: Math.floor((high - low) / every) + 1 },
      (_, at) => low + at * every,
    ).map((number) => ({ value: number, y: y(number) })),
    bands: sessions.flatMap((session, at) => {
      const range = band(session);
      return range
        ? [{ x: x(at), width, y: y(range.upper), height: y(range.lower) - y(range.upper) }]
        : [];
    }),
    lines: sessions.flatMap((session, at) => {
      const limit = line(session);
      return limit === null ? [] : [{ x: x(at), width, y: y(limit) }];
    }),
    dots: sessions.flatMap((session, at) => {
      const number = value(session);
      return number === null ? [] : [{ x: x(at) + width / 2, y: y(number) }];
    }),
  };
}

export interface CourseDrawing {
  readonly rows: readonly Row[];
  readonly left: number;
  readonly right: number;
  readonly height: number;
  readonly datesY: number;
}

/** Where rate, effort and work of each session stand against the range of its day. @param sessions the oldest first */
export function drawCourse(sessions: readonly CourseSession[]): CourseDrawing {
  const datesY = top + measures.length * (rowHeight + gap) + 2;
  return {
    rows: measures.map((measure, index) => drawRow(measure, sessions, index)),
    left,
    right,
    height: datesY + 14,
    datesY,
  };
}
