import { lower } from './lower';

describe('lower', () => {
  it.each([
    ['Smash', 'smash'],
    ['Weft fork', 'weft fork'],
    ['PLC fault', 'PLC fault'],
    ['', ''],
  ])('%s is “%s” within a sentence', (name, said) => {
    expect(lower(name)).toBe(said);
  });
});
