import type { CauseVersion } from '../contract/reference.js';

type Row = readonly [
  id: string,
  name: string,
  group: CauseVersion['group'],
  attendedBy: CauseVersion['attendedBy'],
  allowanceS: number | null,
  breakOf?: 'warp' | 'weft',
];

/**
 * The causes a mill starts with; each is the mill's to edit. Allowances (seconds for a stop without duration) are
 * common practice, to be replaced by the mill's own time study; null: always timed.
 */
const ROWS: readonly Row[] = [
  ['warp-break', 'Warp break', 'warp', 'weaver', 60, 'warp'],
  ['smash', 'Smash', 'warp', 'weaver', null, 'warp'],
  ['slack-end', 'Slack or crossed end', 'warp', 'weaver', 60],
  ['weft-break', 'Weft break', 'weft', 'weaver', 30, 'weft'],
  ['mispick', 'Mispick and unweaving', 'weft', 'weaver', 60],
  ['pern-change', 'Pern change', 'weft', 'weaver', 15],
  ['transfer-failed', 'Transfer failed', 'weft', 'weaver', 45],
  ['battery-empty', 'Battery empty', 'weft', 'weaver', 60],
  ['shuttle-trapped', 'Shuttle trapped', 'loom', 'tackler', null],
  ['shuttle-flew', 'Shuttle flew', 'loom', 'tackler', null],
  ['shuttle-worn', 'Shuttle worn', 'loom', 'tackler', null],
  ['picking', 'Picking', 'loom', 'tackler', null],
  ['checking', 'Checking', 'loom', 'tackler', null],
  ['shedding', 'Shedding (tappets, dobby, jacquard)', 'loom', 'tackler', null],
  ['boxes', 'Boxes', 'loom', 'tackler', null],
  ['warp-protector', 'Warp protector', 'loom', 'tackler', null],
  ['let-off', 'Let-off', 'loom', 'tackler', null],
  ['take-up', 'Take-up', 'loom', 'tackler', null],
  ['temple', 'Temple', 'loom', 'tackler', null],
  ['weft-fork', 'Weft fork', 'loom', 'tackler', null],
  ['warp-stop-motion', 'Warp stop motion', 'loom', 'tackler', null],
  ['reed-or-heald', 'Reed or heald', 'loom', 'tackler', null],
  ['brake', 'Brake', 'loom', 'tackler', null],
  ['electrical', 'Electrical', 'loom', 'tackler', null],
  ['loom-other', 'Other loom fault', 'loom', 'tackler', null],
  ['wait-tackler', 'Waiting for tackler', 'waiting', 'nobody', null],
  ['wait-weaver', 'Waiting for weaver', 'waiting', 'nobody', null],
  ['wait-weft', 'Waiting for weft', 'waiting', 'nobody', null],
  ['wait-warp', 'Waiting for warp', 'waiting', 'nobody', null],
  ['no-weaver', 'No weaver', 'waiting', 'nobody', null],
  ['gaiting', 'Gaiting', 'warp-change', 'tackler', null],
  ['knotting', 'Knotting', 'warp-change', 'knotter', null],
  ['cut-off', 'Cut off', 'care', 'weaver', 180],
  ['cloth-check', 'Cloth check', 'care', 'weaver', null],
  ['faulty-cloth', 'Stopped for faulty cloth', 'care', 'weaver', null],
  ['cleaning', 'Cleaning and oiling', 'care', 'weaver', null],
  ['power', 'Power', 'shed', 'nobody', null],
  ['shed-other', 'Other shed stop', 'shed', 'nobody', null],
  ['no-order', 'No order', 'planned', 'nobody', null],
  ['holiday', 'Holiday', 'planned', 'nobody', null],
  ['maintenance', 'Maintenance', 'planned', 'nobody', null],
  ['trial', 'Trial', 'planned', 'nobody', null],
];

/** First versions of the shipped causes, in force from `effectiveAt` (ms since 1970). */
export function shippedCauses(effectiveAt: number): CauseVersion[] {
  return ROWS.map(([causeId, name, group, attendedBy, allowanceS, breakOf]) => ({
    id: `${causeId}.1`,
    causeId,
    effectiveAt,
    name,
    group,
    attendedBy,
    allowanceS,
    breakOf: breakOf ?? null,
  }));
}
