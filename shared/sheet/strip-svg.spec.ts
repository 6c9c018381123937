import { describe, expect, it } from 'vitest';
import { MARK_KINDS } from './mark-kind.js';
import type { StripLine } from './strip-geometry.js';
import { stripSvg } from './strip-svg.js';

const HOUR = 3_600_000;
/** Eight hours, a stop of every mark, one an hour, twelve minutes each. */
const LINE: StripLine = {
  startsAt: 0,
  endsAt: 8 * HOUR,
  now: null,
  stops: MARK_KINDS.map((mark, i) => ({
    from: (i + 0.5) * HOUR,
    until: (i + 0.7) * HOUR,
    mark,
    estimated: mark === 'weft',
  })),
};

describe('the strip on paper', () => {
  it('is black, white and grey alone', () => {
    const colours = [...stripSvg(LINE, 160, 12).matchAll(/(?:fill|stroke)="([a-z]+)"/g)].map(
      ([, name]) => name,
    );
    expect(new Set(colours)).toEqual(new Set(['silver', 'gainsboro', 'white', 'black', 'none']));
  });

  it('keeps every mark inside its strip', () => {
    const svg = stripSvg(LINE, 160, 12);
    const moves = [...svg.matchAll(/M(-?[\d.]+) (-?[\d.]+)/g)].map(([, x, y]) => [Number(x), Number(y)]);
    expect(moves.length).toBeGreaterThan(20);
    for (const [x = NaN, y = NaN] of moves) {
      expect(x).toBeGreaterThanOrEqual(-0.01);
      expect(x).toBeLessThanOrEqual(160.01);
      expect(y).toBeGreaterThanOrEqual(0);
      expect(y).toBeLessThanOrEqual(16);
    }
  });

  it('leaves the cloth that is not woven yet white', () => {
    const half = stripSvg({ ...LINE, now: 4 * HOUR, stops: [] }, 160, 12);
    expect(half).toContain('<rect x="0" y="2" width="80" height="12" fill="silver"/>');
    expect(half).toContain('fill="black"');
    expect(stripSvg({ ...LINE, now: null, stops: [] }, 160, 12)).not.toContain('fill="black"');
  });

  it('draws a path a mark, however many stops', () => {
    const stops = Array.from({ length: 200 }, (_, i) => ({
      from: i * 144_000,
      until: i * 144_000 + 30_000,
      mark: 'warp' as const,
      estimated: false,
    }));
    const svg = stripSvg({ ...LINE, stops }, 1_600, 12);
    expect(svg.match(/<path/g)?.length).toBeLessThan(5);
  });

  it('is well-formed', () => {
    const svg = stripSvg(LINE, 160, 12);
    expect(svg).not.toMatch(/NaN|undefined|Infinity/);
    expect(svg.match(/<(\w+)[^>]*[^/]>/g)).toHaveLength(1);
  });
});
