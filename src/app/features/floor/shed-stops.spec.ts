import { entryBuilder } from '@shared/testing/builders';
import { openShedStops } from './shed-stops';
import { aFloorLoom } from './testing/a-floor-loom';

describe('open shed stops', () => {
  const { book } = entryBuilder();
  const power = book('shed-stop', 30, { cause: 'power', scope: { of: 'shed' } });
  const runs = book('resume', 50, { targetId: power.entry.id });

  it('name the looms that still stand, until each is ticked off', () => {
    const [stop, ...others] = openShedStops([aFloorLoom([power], 40)]);
    expect(others).toEqual([]);
    expect(stop).toMatchObject({ id: power.entry.id, cause: 'power', looms: [{ number: 14 }] });
    expect(openShedStops([aFloorLoom([power, runs], 60)])).toEqual([]);
  });

  it('are none before they begin, and none of a loom’s own stops', () => {
    expect(openShedStops([aFloorLoom([power], 20)])).toEqual([]);
    const own = book('standing', 30, { cause: 'smash' });
    expect(openShedStops([aFloorLoom([own], 40)])).toEqual([]);
  });
});
