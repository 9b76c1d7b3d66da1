import type { AttendedSession } from '@shared/contracts/my-progress-contract';

export const WIDTH = 320;
export const HEIGHT = 230;
/** Room for the numbers of the scale and for the dates below. */
const plot = { left: 44, right: WIDTH - 8, top: 10, bottom: HEIGHT - 34 } as const;

interface Band {
  readonly x: number;
  readonly width: number;
  readonly top: number;
  readonly bottom: number;
}

export interface RateDrawing {
  readonly dots: readonly { readonly x: number; readonly y: number }[];
  /** The ranges, each over the sessions that had it. */
  readonly bands: readonly Band[];
  readonly ticks: readonly { readonly rate: number; readonly y: number }[];
  readonly radius: number;
  readonly plot: typeof plot;
}

const STEP = 20;

/** Whole steps of the scale around everything that is drawn, bpm. */
function scaleOf(sessions: readonly AttendedSession[]): { low: number; high: number } {
  const rates = sessions.flatMap(({ heartRate, target }) => [
    ...(heartRate === null ? [] : [heartRate]),
    ...(target === null ? [] : [target.lower, target.upper]),
  ]);
  const low = Math.floor((Math.min(...rates) - 5) / STEP) * STEP;
  const high = Math.ceil((Math.max(...rates) + 5) / STEP) * STEP;
  return { low, high };
}

type Target = NonNullable<AttendedSession['target']>;

/** A range over the sessions next to each other that had it. */
interface Stretch {
  readonly target: Target;
  readonly from: number;
  readonly to: number;
}

function stretchesOf(sessions: readonly AttendedSession[]): Stretch[] {
  const stretches: Stretch[] = [];
  sessions.forEach(({ target }, index) => {
    if (target === null) return;
    const last = stretches.at(-1);
    const goesOn =
      last?.to === index &&
      last.target.lower === target.lower &&
      last.target.upper === target.upper;
    if (goesOn) stretches[stretches.length - 1] = { ...last, to: index + 1 };
    else stretches.push({ target, from: index, to: index + 1 });
  });
  return stretches;
}

/** Where everything stands, in the units of the picture. @param sessions in order, one with a rate at least */
export function drawRates(sessions: readonly AttendedSession[]): RateDrawing {
  const { low, high } = scaleOf(sessions);
  const y = (rate: number): number =>
    plot.bottom - ((rate - low) / (high - low)) * (plot.bottom - plot.top);
  const width = (plot.right - plot.left) / sessions.length;
  const left = (index: number): number => plot.left + index * width;
  return {
    dots: sessions.flatMap(({ heartRate }, index) =>
      heartRate === null ? [] : [{ x: left(index) + width / 2, y: y(heartRate) }],
    ),
    bands: stretchesOf(sessions).map(({ target, from, to }) => ({
      x: left(from),
      width: (to - from) * width,
      top: y(target.upper),
      bottom: y(target.lower),
    })),
    ticks: Array.from({ length: (high - low) / STEP + 1 }, (_, index) => low + index * STEP).map(
      (rate) => ({ rate, y: y(rate) }),
    ),
    radius: Math.max(2.5, Math.min(6, width / 2.4)),
    plot,
  };
}
