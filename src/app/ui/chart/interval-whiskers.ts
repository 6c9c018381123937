import type { Chart, Plugin } from 'chart.js';

/** The limits of each point, on the dataset that carries them. */
export interface Whiskers {
  readonly low: readonly (number | null)[];
  readonly high: readonly (number | null)[];
}

const CAP = 4;

/** Draws each point's interval as an upright with caps, behind the points. */
export function intervalWhiskers(of: (datasetIndex: number) => Whiskers | null): Plugin<'line'> {
  return {
    id: 'intervalWhiskers',
    beforeDatasetDraw: (chart: Chart<'line'>, { index, meta }) => {
      const whiskers = of(index);
      const scale = chart.scales['y'];
      if (!whiskers || !scale) return;
      const context = chart.ctx;
      context.save();
      context.strokeStyle = String(chart.data.datasets[index]?.borderColor ?? '');
      context.lineWidth = 1.25;
      context.beginPath();
      meta.data.forEach((point, at) => {
        const low = whiskers.low[at];
        const high = whiskers.high[at];
        if (low == null || high == null) return;
        const [from, to] = [scale.getPixelForValue(low), scale.getPixelForValue(high)];
        context.moveTo(point.x, from);
        context.lineTo(point.x, to);
        for (const y of [from, to]) {
          context.moveTo(point.x - CAP, y);
          context.lineTo(point.x + CAP, y);
        }
      });
      context.stroke();
      context.restore();
    },
  };
}
