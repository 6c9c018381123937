import type { ClothFacts } from '@shared/contract/set-up';
import { warpUsed } from '@shared/figures/cloth';
import { formatCount } from '@shared/figures/format';
import { isNoFigure, type Figure } from '@shared/figures/no-figure';
import { METRES_PER_YARD } from '@shared/figures/units';
import { picksPerPern, weftUsed } from '@shared/figures/weft';
import type { Units } from '../common/quantity';
import { massPerLength } from './cloth-quantities';

export interface ClothFigure {
  readonly label: string;
  readonly value: string;
  readonly unit: string;
  /** What it is made of. */
  readonly from: string;
}

const number = (digits: number) => new Intl.NumberFormat('en-GB', { maximumSignificantDigits: digits });
const four = number(4);

/** What a construction comes to, shown while it is typed: from the same arithmetic as sheets and reports. */
export function clothFigures(facts: ClothFacts, units: Units): ClothFigure[] {
  const figures: ClothFigure[] = [];
  const add = (label: string, figure: Figure, unit: string, from: string, say = four) => {
    if (!isNoFigure(figure)) figures.push({ label, value: say.format(figure), unit, from });
  };
  const length = units === 'metric' ? 'm' : 'yd';
  const picksPerMetre = facts.picksPerCmLoomState * 100;
  // A ratio of lengths: the same number in metres and in yards.
  add(`Warp for 100 ${length} of cloth`, warpUsed(100, facts.crimp), length, 'the cloth and its crimp');
  const used = weftUsed(picksPerMetre, facts);
  if (!isNoFigure(used)) {
    const grams = used.reduce((sum, weft) => sum + weft.kilograms * 1000, 0);
    const mass = massPerLength(grams, units);
    add('Weft in the cloth', mass.value, mass.unit, weftFrom(facts));
  }
  const picks = units === 'metric' ? picksPerMetre : picksPerMetre * METRES_PER_YARD;
  figures.push({
    label: `Picks in 1 ${length} of cloth`,
    value: formatCount(picks),
    unit: 'picks',
    from: 'the setting in loom state',
  });
  for (const weft of facts.wefts)
    add(
      facts.wefts.length === 1 ? 'A full pern lasts' : `A full pern of ${weft.name} lasts`,
      picksPerPern(weft, facts.reedWidthCm),
      'picks',
      'mass, count, reed width and waste',
      number(3),
    );
  return figures;
}

function weftFrom({ abreast }: ClothFacts): string {
  return abreast === 1 ? 'waste included' : `all ${abreast} widths together, waste included`;
}
