import { describe, it } from 'vitest';
import { countFromTex, TEX_TIMES, texFrom } from '../../shared/figures/yarn.js';
import { expectClose, given } from './close-to.js';

// The tex system, ISO 1144; constants exact from 1 lb = 453.59237 g, hank 840 yd, lea 300 yd, 1 yd = .9144 m
// (ASTM D2260 prints the same rounded).
describe('yarn counts', () => {
  it('tex × Ne, tex × linen lea, tex × Nm', () => {
    expectClose(TEX_TIMES.Ne, 590.541247448, 1e-12);
    expectClose(TEX_TIMES.lea, 1653.51549286, 5e-12);
    expectClose(TEX_TIMES.Nm, 1000, 0);
  });

  it('30s cotton is 19.6847 tex, 40 lea linen 41.3379 tex, 1 tex 9 denier', () => {
    expectClose(texFrom(30, 'Ne'), 19.6847082);
    expectClose(texFrom(40, 'lea'), 41.3378873);
    expectClose(texFrom(40, 'Nm'), 25, 0);
    expectClose(countFromTex(25, 'denier'), 225, 0);
    expectClose(texFrom(225, 'denier'), 25, 0);
  });

  it('the linen lea is 2.8 × Ne for the same yarn', () => {
    expectClose(given(countFromTex(25, 'lea')) / given(countFromTex(25, 'Ne')), 2.8, 1e-14);
  });
});
