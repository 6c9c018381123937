import type { Entry } from '../../../shared/entries/entry.js';
import { correctedMoments } from './corrected-moment.js';

const DAWN = Date.parse('2026-12-01T06:00Z');
/** An entry whose moment was typed by the mill's clock, on a device that took itself to be `offset` behind. */
const typed = (offset: number): Entry => ({
  id: '01a2329e-3ea3-712d-a0df-664595795742',
  schema: 1,
  deviceSeq: 1,
  source: 'tap',
  kind: 'warp-change',
  how: 'as-found',
  loomId: 'loom-1',
  warpId: null,
  clothId: 'cloth-1',
  at: DAWN - offset,
  recordedAt: DAWN - offset,
  shedId: 'north',
  by: 'ada',
  grantId: 'grant',
  deviceId: 'desk',
  clock: { offset, measuredAt: DAWN - offset },
});

it.each([
  ['a moment typed comes out as typed, whatever the network’s delay', 140, 260, DAWN],
  [
    'a clock that ran off since it was measured is set right by what this request measured',
    140,
    9_140,
    DAWN + 9_000,
  ],
  ['a clock that was set since keeps the measure that it had', 140, 3_600_140, DAWN],
])('%s', (_, then, measured, at) => {
  expect(correctedMoments(typed(then), measured).at).toBe(at);
});
