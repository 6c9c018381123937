import type {
  CauseVersion,
  Cloth,
  ClothVersion,
  Loom,
  LoomVersion,
  Mill,
  Shed,
} from '../../shared/contract/reference.js';
import { shippedCauses } from '../../shared/entries/causes.js';

/** The invented mill: one shed, 24 looms in four rows of six, alleys between rows 1 and 2, 3 and 4; five cloths. */
export const DEMO_SHED = 'long-shed';
export const DEMO_ZONE = 'Europe/London';
export const LOOM_COUNT = 24;

export function demoLoomId(number: number): string {
  return `loom-${number}`;
}

export interface DemoMill {
  readonly mill: Mill;
  readonly sheds: readonly Shed[];
  readonly looms: readonly Loom[];
  readonly loomVersions: readonly LoomVersion[];
  readonly cloths: readonly Cloth[];
  readonly clothVersions: readonly ClothVersion[];
  readonly causeVersions: readonly CauseVersion[];
}

interface ClothRow {
  id: string;
  name: string;
  ends: number;
  onLoom: number;
  loomState: number;
  reedWidthCm: number;
  crimp: number;
  wefts: ClothVersion['wefts'];
}

const weft = (name: string, tex: number, share = 1): ClothVersion['wefts'][number] => ({
  name,
  tex,
  share,
  waste: 0.03,
  pernMassG: 26,
});

const CLOTHS: readonly ClothRow[] = [
  {
    id: 'glebe-42',
    name: 'Glebe 42',
    ends: 2_520,
    onLoom: 20,
    loomState: 20.6,
    reedWidthCm: 105,
    crimp: 0.06,
    wefts: [weft('Cotton 20', 30)],
  },
  {
    id: 'larch-twill',
    name: 'Larch twill',
    ends: 3_120,
    onLoom: 22,
    loomState: 22.8,
    reedWidthCm: 112,
    crimp: 0.075,
    wefts: [weft('Cotton 16', 37)],
  },
  {
    id: 'mere-sheeting',
    name: 'Mere sheeting',
    ends: 2_880,
    onLoom: 24,
    loomState: 24.7,
    reedWidthCm: 118,
    crimp: 0.07,
    wefts: [weft('Cotton 24', 24.6)],
  },
  {
    id: 'sorrel-stripe',
    name: 'Sorrel stripe',
    ends: 2_640,
    onLoom: 21,
    loomState: 21.6,
    reedWidthCm: 108,
    crimp: 0.065,
    wefts: [weft('Cotton 20 ecru', 30, 0.75), weft('Cotton 20 russet', 30, 0.25)],
  },
  {
    id: 'tarn-linen',
    name: 'Tarn linen',
    ends: 1_980,
    onLoom: 17,
    loomState: 17.5,
    reedWidthCm: 110,
    crimp: 0.05,
    wefts: [weft('Linen 40 lea', 41.3)],
  },
];
export const CLOTH_IDS: readonly string[] = CLOTHS.map((cloth) => cloth.id);

/** Book speed by row, picks a minute, and the pick clock fitted there: some roll over within the twelve weeks. */
const ROWS = [
  { ppm: 192, unit: 100, digits: 5 },
  { ppm: 188, unit: 100, digits: 5 },
  { ppm: 180, unit: 1, digits: 6 },
  { ppm: 200, unit: 1_000, digits: 4 },
] as const;

/** Everything of the mill, in force from `from` (ms since 1970). */
export function demoMill(from: number): DemoMill {
  const looms: Loom[] = [];
  const loomVersions: LoomVersion[] = [];
  ROWS.forEach(({ ppm, unit, digits }, r) => {
    for (let position = 1; position <= 6; position++) {
      const number = r * 6 + position;
      const id = demoLoomId(number);
      looms.push({
        id,
        shedId: DEMO_SHED,
        number,
        row: r + 1,
        position,
        alley: r < 2 ? 'A' : 'B',
        from,
        until: null,
      });
      loomVersions.push({
        id: `${id}.1`,
        loomId: id,
        effectiveAt: from,
        ppm: ppm - (position % 3) * 2,
        reedSpaceCm: 127,
        clock: { kind: 'continuous', unit, digits },
        shuttles: 1,
        battery: false,
      });
    }
  });
  return {
    mill: { name: 'Wendlebeck Mill (demo)', timeZone: DEMO_ZONE, units: 'metric' },
    sheds: [{ id: DEMO_SHED, name: 'Long shed' }],
    looms,
    loomVersions,
    cloths: CLOTHS.map(({ id, name }) => ({ id, name })),
    clothVersions: CLOTHS.map((c) => ({
      id: `${c.id}.1`,
      clothId: c.id,
      effectiveAt: from,
      ends: c.ends,
      picksPerCmOnLoom: c.onLoom,
      picksPerCmLoomState: c.loomState,
      reedWidthCm: c.reedWidthCm,
      crimp: c.crimp,
      abreast: 1,
      wefts: c.wefts,
    })),
    causeVersions: shippedCauses(from),
  };
}
