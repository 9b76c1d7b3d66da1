import type { ToldRange } from '@shared/contracts/my-range-contract';
import type { SheetPaper } from './sheet-paper';

interface Place {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

const colors = {
  ink: '#16233b',
  muted: '#5a6270',
  hull: '#efe9dc',
  lagoon: '#1f6f6b',
  oxide: '#a8432f',
};
const step = 20;
const barWidth = 42;
const scaleWidth = 40;

/** Ends of the scale, beats a minute: every rate with room around it. */
function scaleOf({ resting, target, stayUnder }: ToldRange): readonly [number, number] {
  const rates = [resting, target?.lower, target?.upper, stayUnder].filter(
    (rate) => rate !== null && rate !== undefined,
  );
  const least = Math.floor((Math.min(55, ...rates) - 5) / 10) * 10;
  return [least, Math.ceil((Math.max(125, ...rates) + 12) / 10) * 10];
}

/** Middles of labels in order from the top, moved apart where they would meet; they stay within the bar. */
function spread(wanted: readonly number[], gap: number, bottom: number): number[] {
  const middles = [...wanted];
  for (let index = 1; index < middles.length; index += 1) {
    middles[index] = Math.max(middles[index] ?? 0, (middles[index - 1] ?? 0) + gap);
  }
  let below = bottom;
  for (let index = middles.length - 1; index >= 0; index -= 1) {
    middles[index] = Math.min(middles[index] ?? 0, below);
    below = (middles[index] ?? 0) - gap;
  }
  return middles;
}

/** Draws the load line: rest at its foot, the range as a band, and a heavy line to stay under. */
export function drawLoadLine({ doc, size }: SheetPaper, range: ToldRange, place: Place): void {
  const [least, most] = scaleOf(range);
  const { target, stayUnder, resting } = range;
  const at = (rate: number): number =>
    place.y + place.height * (1 - (rate - least) / (most - least));
  const left = place.x + scaleWidth;
  const right = left + barWidth;
  const small = size * 0.8;
  doc.save();
  doc.roundedRect(left, place.y, barWidth, place.height, 6).fill(colors.hull);
  if (target)
    doc
      .rect(left, at(target.upper), barWidth, at(target.lower) - at(target.upper))
      .fill(colors.lagoon);
  doc.font('plain-latin').fontSize(small);
  for (let rate = Math.ceil(least / step) * step; rate <= most; rate += step) {
    doc
      .moveTo(left - 8, at(rate))
      .lineTo(left - 2, at(rate))
      .lineWidth(1)
      .stroke(colors.muted);
    const options = { width: scaleWidth - 12, align: 'right', lineBreak: false } as const;
    doc.fillColor(colors.muted).text(String(rate), place.x, at(rate) - small * 0.6, options);
  }
  doc
    .moveTo(left, at(resting))
    .lineTo(right, at(resting))
    .lineWidth(1.5)
    .dash(3, { space: 2 })
    .stroke(colors.ink)
    .undash();
  if (stayUnder !== null) {
    doc
      .moveTo(left - 4, at(stayUnder))
      .lineTo(right + 10, at(stayUnder))
      .lineWidth(5)
      .stroke(colors.oxide);
  }
  const labels = [
    stayUnder !== null && {
      y: at(stayUnder),
      text: `Stay under ${stayUnder}`,
      color: colors.oxide,
    },
    target && {
      y: (at(target.lower) + at(target.upper)) / 2,
      text: `${target.lower}–${target.upper}`,
      color: colors.lagoon,
    },
    { y: at(resting), text: `At rest ${resting}`, color: colors.ink },
  ].filter((label) => label !== false && label !== null);
  const middles = spread(
    labels.map(({ y }) => y),
    size * 1.3,
    place.y + place.height,
  );
  doc.font('bold-latin').fontSize(size * 0.95);
  for (const [index, { text, color }] of labels.entries()) {
    const y = (middles[index] ?? 0) - size * 0.6;
    doc
      .fillColor(color)
      .text(text, right + 14, y, { width: place.x + place.width - right - 14, lineBreak: false });
  }
  doc.restore();
}
