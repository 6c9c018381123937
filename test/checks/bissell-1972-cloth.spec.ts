import { describe, expect, it } from 'vitest';
import { laneyChart, pearsonWidening, uChart } from '../../shared/chance/control-charts.js';
import { total } from '../../shared/chance/count.js';
import { chiSquareUpperTail } from '../../shared/chance/distributions.js';
import { expectClose, given } from './close-to.js';

// A. F. Bissell, Biometrika 59 (1972): flaws in 32 rolls of cloth of varying length; R boot::cloth.
const FLAWS = [
  1, 4, 5, 14, 7, 9, 2, 8, 4, 7, 4, 7, 6, 9, 8, 6, 7, 10, 6, 4, 9, 14, 3, 17, 9, 10, 17, 9, 8, 28, 23, 9,
];
const LENGTHS = [
  1.22, 1.7, 2.71, 3.71, 3.72, 3.75, 4.17, 4.41, 4.58, 4.91, 4.92, 4.95, 5.22, 5.42, 5.43, 5.51, 6.3, 6.42,
  6.45, 6.51, 6.57, 7.15, 7.16, 7.35, 7.38, 7.49, 8.32, 8.42, 8.68, 8.95, 9.05, 9.52,
];
// Limits computed with R 4.2.2.
const LOW = [
  0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0.0414000542950024, 0.0551922525521851, 0.0585800205635147,
  0.0652851678118143, 0.071898252732788, 0.131470100500932, 0.132433262713267, 0.150358205613066,
  0.15312500081619, 0.163127299979614, 0.232085849404625, 0.239698488825854, 0.258871957741016,
  0.277891835417896, 0.284719282988051, 0.31535391610758,
];
const HIGH = [
  4.84806377091232, 4.3378452476769, 3.74977811775735, 3.42430216409379, 3.42172776410573, 3.4140664462018,
  3.31564615999961, 3.26583214789727, 3.2329420463374, 3.17404387926589, 3.17235215819795, 3.16730778990623,
  3.12388352574045, 3.09383160543402, 3.09237274288, 3.08084518602671, 2.97907322408841, 2.96528102583122,
  2.96189325781989, 2.95518811057159, 2.94857502565062, 2.88900317788248, 2.88804001567014, 2.87011507277034,
  2.86734827756722, 2.85734597840379, 2.78838742897878, 2.78077478955755, 2.76160132064239, 2.74258144296551,
  2.73575399539536, 2.70511936227583,
];

const ROLLS = FLAWS.map((count, at) => ({ count, exposure: LENGTHS[at] }));

describe('Bissell 1972, u chart of rolls of varying length', () => {
  it('has 284 flaws in 188.05, u 1.510236639, and each roll its own limits', () => {
    expect(total(ROLLS)).toEqual({ count: 284, exposure: expect.closeTo(188.05, 9) as number });
    const chart = given(uChart(ROLLS));
    expectClose(chart.centre, 1.5102366391917);
    chart.points.map(given).forEach((point, at) => {
      expectClose(point.low, LOW[at]);
      expectClose(point.high, HIGH[at]);
    });
  });

  it('puts rolls 4 and 30 out', () => {
    const out = given(uChart(ROLLS)).points.flatMap((point, at) => (given(point).out ? [at + 1] : []));
    expect(out).toEqual([4, 30]);
  });

  it('has none out with the widening of Laney, σz 1.498402', () => {
    const chart = given(laneyChart(ROLLS));
    expectClose(chart.widening, 1.498402, 1e-6);
    expect(chart.points.every((point) => given(point).out === null)).toBe(true);
  });

  it('differs from roll to roll more than Poisson: X² 68.0255 on 31 degrees, p .000138', () => {
    const widening = given(pearsonWidening(ROLLS));
    expectClose(widening ** 2 * 31, 68.0254897371644);
    expectClose(chiSquareUpperTail(widening ** 2 * 31, 31), 0.000137940844355144);
  });
});
