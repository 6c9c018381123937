import { fitted } from './photo-shrink';

describe('a photo’s size', () => {
  it.each([
    [4_000, 3_000, 1_600, 1_200],
    [3_000, 4_000, 1_200, 1_600],
    [1_600, 900, 1_600, 900],
    [640, 480, 640, 480],
    [16_000, 3, 1_600, 1],
  ])('%s × %s becomes %s × %s', (width, height, w, h) => {
    expect(fitted({ width, height }, 1_600)).toEqual({ width: w, height: h });
  });
});
