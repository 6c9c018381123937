import { describe, expect, it } from 'vitest';
import { aLineInput, at, entryBuilder } from '../testing/builders.js';
import { projectLine } from '../entries/projection.js';
import { stripLineOf, stripWords } from './strip-line.js';

describe('a loom line as a strip', () => {
  it('sets a tap’s allowance before the tap, and a standing stop up to the fell', () => {
    const { book } = entryBuilder();
    const tap = book('stop', 60, { cause: 'warp-break', count: 1 });
    const standing = book('standing', 100, { cause: 'picking' });
    const line = projectLine(aLineInput({ entries: [tap, standing] }));
    const strip = stripLineOf(line, at(110));
    expect(strip.stops).toEqual([
      { from: at(59), until: at(60), mark: 'warp', estimated: true },
      { from: at(100), until: null, mark: 'tackler', estimated: false },
    ]);
    expect(strip.now).toBe(at(110));
  });

  it('says in words what it shows', () => {
    const words = stripWords({
      startsAt: at(0),
      endsAt: at(480),
      now: at(250),
      stops: [
        { from: at(10), until: at(12), mark: 'warp', estimated: true },
        { from: at(20), until: at(22), mark: 'warp', estimated: true },
        { from: at(246), until: null, mark: 'weft', estimated: false },
      ],
    });
    expect(words).toBe('4 h 10 min of 8 h; stops: 2 warp, 1 weft; stands for 4 min, weft');
  });

  it('is over once the shift is', () => {
    const line = projectLine(aLineInput());
    expect(stripLineOf(line, at(481)).now).toBeNull();
    expect(stripWords(stripLineOf(line, null))).toBe('the whole shift of 8 h; no stops');
  });
});
