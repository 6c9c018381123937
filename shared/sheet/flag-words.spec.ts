import { describe, expect, it } from 'vitest';
import { flagsInWords } from './flag-words.js';

describe('flagsInWords', () => {
  it('says once what both ends of a shift would say, and first what needs a look', () => {
    const flags = [
      { code: 'estimated-split' },
      { code: 'reading-off-boundary', value: 7 },
      { code: 'reading-off-boundary', value: 7 },
      { code: 'no-weaver' },
    ] as const;
    const said = flagsInWords(flags, false);
    expect(said.map(({ words }) => words).sort()).toEqual(
      ['no weaver', 'picks shared by running time', 'read off the shift’s ends: held against 7 min'].sort(),
    );
    const looks = said.map(({ look }) => look);
    expect(looks).toEqual([...looks].sort((a, b) => Number(b) - Number(a)));
    expect(looks).toContain(true);
  });

  it('keeps apart what differs', () => {
    const said = flagsInWords(
      [
        { code: 'reading-off-boundary', value: 7 },
        { code: 'reading-off-boundary', value: 9 },
      ],
      false,
    );
    expect(said).toHaveLength(2);
  });
});
