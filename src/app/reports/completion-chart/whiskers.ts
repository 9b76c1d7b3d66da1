import type { Chart, Plugin } from 'chart.js';

/** One end of an interval to the other, by the index of its bar. */
export interface Whisker {
  readonly low: number;
  readonly high: number;
}

function strokeWhisker(chart: Chart<'bar'>, index: number, { low, high }: Whisker): void {
  const bar = chart.getDatasetMeta(0).data[index];
  const scale = chart.scales['x'];
  if (!bar || !scale) return;
  const [from, to] = [scale.getPixelForValue(low * 100), scale.getPixelForValue(high * 100)];
  const cap = 5;
  chart.ctx.beginPath();
  chart.ctx.moveTo(from, bar.y);
  chart.ctx.lineTo(to, bar.y);
  for (const x of [from, to]) {
    chart.ctx.moveTo(x, bar.y - cap);
    chart.ctx.lineTo(x, bar.y + cap);
  }
  chart.ctx.stroke();
}

/** Draws the interval of each rate across its bar. */
export const whiskers = (of: readonly (Whisker | null)[], color: string): Plugin<'bar'> => ({
  id: 'whiskers',
  afterDatasetsDraw: (chart) => {
    chart.ctx.save();
    chart.ctx.strokeStyle = color;
    chart.ctx.lineWidth = 2;
    of.forEach((whisker, index) => whisker && strokeWhisker(chart, index, whisker));
    chart.ctx.restore();
  },
});
