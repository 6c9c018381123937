import { beamChoice } from './beam-choice';

const BEAMS = [{ id: 'beam-3' }, { id: 'beam-2' }, { id: 'beam-1' }];
const FITTED = new Set(['beam-3']);
const ids = (all: boolean, chosen?: string) =>
  beamChoice(BEAMS, FITTED, all, chosen).shown.map(({ id }) => id);

describe('beamChoice', () => {
  it('leaves out what lies in another loom, and says how many that are', () => {
    expect(ids(false)).toEqual(['beam-2', 'beam-1']);
    expect(beamChoice(BEAMS, FITTED, false).hidden).toBe(1);
  });

  it('shows all at a wish, the free ones first', () => {
    expect(ids(true)).toEqual(['beam-2', 'beam-1', 'beam-3']);
    expect(beamChoice(BEAMS, FITTED, true).hidden).toBe(0);
  });

  it('keeps the one that is chosen', () => {
    expect(ids(false, 'beam-3')).toContain('beam-3');
  });
});
