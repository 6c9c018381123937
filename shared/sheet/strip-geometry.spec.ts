import { describe, expect, it } from 'vitest';
import { SMALLEST_GAP, stripGeometry } from './strip-geometry.js';
import type { StripLine, StripStop } from './strip-geometry.js';

const HOUR = 3_600_000;
const MINUTE = 60_000;
/** 480 px for 8 h: a pixel a minute. */
const WIDTH = 480;

function line(stops: readonly StripStop[], now: number | null = null): StripLine {
  return { startsAt: 0, endsAt: 8 * HOUR, now, stops };
}
function stop(from: number, until: number | null, more: Partial<StripStop> = {}): StripStop {
  return {
    from: from * MINUTE,
    until: until === null ? null : until * MINUTE,
    mark: 'warp',
    estimated: false,
    ...more,
  };
}

describe('stripGeometry', () => {
  it('is true to time', () => {
    const { gaps, fell, live } = stripGeometry(line([stop(60, 90)]), WIDTH);
    expect(gaps).toEqual([{ x: 60, width: 30, mark: 'warp', estimated: false, open: false }]);
    expect(fell).toBe(WIDTH);
    expect(live).toBe(false);
  });

  it('shows the shortest stop three pixels wide', () => {
    const { gaps } = stripGeometry(line([stop(100, 100.5)]), WIDTH);
    expect(gaps[0]?.width).toBe(SMALLEST_GAP);
  });

  it('puts the fell at now and leaves what is not woven alone', () => {
    const geometry = stripGeometry(line([stop(300, 310)], 4 * HOUR), WIDTH);
    expect(geometry.fell).toBe(240);
    expect(geometry.live).toBe(true);
    expect(geometry.gaps).toEqual([]);
  });

  it('opens the live edge for a loom that stands', () => {
    const { gaps } = stripGeometry(line([stop(230, null)], 4 * HOUR), WIDTH);
    expect(gaps).toEqual([{ x: 230, width: 10, mark: 'warp', estimated: false, open: true }]);
  });

  it('keeps a stop of this very moment behind the fell', () => {
    const { gaps } = stripGeometry(line([stop(240, null)], 4 * HOUR), WIDTH);
    expect(gaps[0]).toMatchObject({ x: 237, width: 3 });
  });

  it('merges gaps that would touch under the longest cause', () => {
    const { gaps } = stripGeometry(
      line([stop(100, 102), stop(102.5, 103, { mark: 'weft' }), stop(103.5, 120, { mark: 'care' })]),
      WIDTH,
    );
    expect(gaps).toHaveLength(1);
    expect(gaps[0]).toMatchObject({ x: 100, width: 20, mark: 'care' });
  });

  it('adds up the causes of a merged gap before it names the longest', () => {
    const { gaps } = stripGeometry(
      line([stop(100, 102), stop(102, 105, { mark: 'weft' }), stop(105, 107)]),
      WIDTH,
    );
    expect(gaps[0]?.mark).toBe('warp');
  });

  it('keeps the wide phases of one stop apart', () => {
    const { gaps } = stripGeometry(
      line([stop(100, 120), stop(120, 150, { mark: 'waiting' }), stop(150, 190, { mark: 'tackler' })]),
      WIDTH,
    );
    expect(gaps.map((gap) => gap.mark)).toEqual(['warp', 'waiting', 'tackler']);
  });

  it('calls a merged gap estimated only where nothing of it was timed', () => {
    const taps = stripGeometry(
      line([stop(100, 101, { estimated: true }), stop(101, 102, { estimated: true })]),
      WIDTH,
    );
    const mixed = stripGeometry(line([stop(100, 101, { estimated: true }), stop(101, 102)]), WIDTH);
    expect([taps.gaps[0]?.estimated, mixed.gaps[0]?.estimated]).toEqual([true, false]);
  });

  it('sets counted pern changes as ticks on the selvedge, timed ones as gaps', () => {
    const geometry = stripGeometry(
      line([
        stop(20, 20.25, { mark: 'pern', estimated: true }),
        stop(10, 10.25, { mark: 'pern', estimated: true }),
        stop(60, 70, { mark: 'pern' }),
      ]),
      WIDTH,
    );
    expect(geometry.ticks).toEqual([10, 20]);
    expect(geometry.gaps.map((gap) => gap.mark)).toEqual(['pern']);
  });

  it('clips a stop that began before the shift, and leaves out what is not of it', () => {
    const { gaps } = stripGeometry(line([stop(-30, 15), stop(-60, -40), stop(500, 510)]), WIDTH);
    expect(gaps).toEqual([{ x: 0, width: 15, mark: 'warp', estimated: false, open: false }]);
  });

  it('says up to where readings prove the cloth', () => {
    const at = (readTo: number | null) => stripGeometry({ ...line([], 4 * HOUR), readTo }, WIDTH).proven;
    expect([at(2 * HOUR), at(null), at(0), at(6 * HOUR)]).toEqual([120, 240, 0, 240]);
  });

  it('lays out 500 stops in under two milliseconds', () => {
    const many = line(
      Array.from({ length: 500 }, (_, i) => stop((i * 7919) % 470, ((i * 7919) % 470) + (i % 5))),
    );
    const times: number[] = [];
    for (let i = 0; i < 30; i++) {
      const started = performance.now();
      stripGeometry(many, WIDTH);
      times.push(performance.now() - started);
    }
    times.sort((a, b) => a - b);
    expect(times[15]).toBeLessThan(2);
  });

  it('has no gap of no width or outside the cloth, whatever comes', () => {
    const odd = line([stop(0, 0), stop(479.9, 480), stop(480, null), stop(5, 4)]);
    for (const gap of stripGeometry(odd, WIDTH).gaps) {
      expect(gap.width).toBeGreaterThanOrEqual(SMALLEST_GAP - 1e-9);
      expect(gap.x).toBeGreaterThanOrEqual(0);
      expect(gap.x + gap.width).toBeLessThanOrEqual(WIDTH + 1e-9);
    }
  });
});
