import { describe, expect, it } from 'vitest';
import { poissonInterval } from '../chance/poisson-interval.js';
import { lineFigures, lineTotals } from '../figures/loom-line.js';
import { aLineInput, at, entryBuilder } from '../testing/builders.js';
import { projectLine } from './projection.js';

describe('projectLine', () => {
  it('makes a whole line of a plain shift', () => {
    const { book } = entryBuilder();
    const line = projectLine(
      aLineInput({
        entries: [
          book('assign', 0, { weaverId: 'weaver-1', loomIds: ['loom-1'] }),
          book('reading', 0, { boundary: 'start', value: 990_000 }),
          book('stop', 60, { cause: 'warp-break', count: 2 }),
          book('standing', 120, { cause: 'weft-fork' }),
          book('resume', 150, { targetId: '019e8000-0000-7000-8000-000000000004' }),
          book('reading', 480, { boundary: 'end', value: 64_250 }),
        ],
      }),
    );
    expect(line.picks).toBe(74_250);
    expect(line.flags).toEqual([]);
    const totals = lineTotals(line, at(480));
    expect(totals).toMatchObject({ minutes: 480, measuredMinutes: 30, estimatedMinutes: 2, stopMinutes: 32 });
    const figures = lineFigures(line, at(480), poissonInterval);
    expect(figures.efficiency).toBeCloseTo(74_250 / 86_400, 12);
  });
});
