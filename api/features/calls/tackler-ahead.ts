import type { EntityManager } from 'typeorm';
import { picksLeft, warpOut, type ShiftAhead } from '../../../shared/ahead/warp-out.js';
import type { TacklerAhead } from '../../../shared/contract/calls.js';
import { inForceAt, type ClothVersion } from '../../../shared/contract/reference.js';
import { isNoFigure, noFigure, type Figure } from '../../../shared/figures/no-figure.js';
import { ClothVersionRow, LoomRow, type ShiftRow } from '../../database/entities/index.js';
import { HISTORY_DAYS } from './loom-history.js';
import { jobsByPicks } from './jobs-by-picks.js';
import { tacklingSince } from './tackling-entries.js';
import { warpsInLooms, type WarpInLoom } from './warps-in-looms.js';

type Beam = TacklerAhead['beams'][number];
type Place = Pick<Beam, 'loomId' | 'loomNumber' | 'alley'>;

const DAY = 86_400_000;
const HOUR = 3_600_000;
/** A job is shown from this share of its picks on. */
const DUE = 1;

/** What comes up in a shed: warps that run out, jobs that are due by picks. */
export async function tacklerAhead(
  from: EntityManager,
  { shedId, asOf }: { readonly shedId: string; readonly asOf: number },
): Promise<TacklerAhead> {
  const looms = (await from.find(LoomRow, { where: { shedId }, order: { number: 'ASC', id: 'ASC' } })).filter(
    (loom) => loom.from <= asOf && (loom.until === null || loom.until > asOf),
  );
  const places = new Map(
    looms.map(({ id, number, alley }): [string, Place] => [id, { loomId: id, loomNumber: number, alley }]),
  );
  const ids = [...places.keys()];
  const warps = [...(await warpsInLooms(from, ids, asOf)).values()];
  const cloths = (await from.find(ClothVersionRow)).map((row): ClothVersion => ({ ...row }));
  const shifts = await shiftsAhead(from, shedId, Math.min(asOf, ...warps.map(({ known }) => known)));
  const beams = warps.flatMap((warp) => {
    const place = places.get(warp.loomId);
    const cloth = inForceAt(
      cloths.filter(({ clothId }) => clothId === warp.clothId),
      asOf,
    );
    return place ? [beamOf(warp, place, cloth, shifts)] : [];
  });
  const since = asOf - HISTORY_DAYS * DAY;
  const { cares } = await tacklingSince(from, { shedId }, since);
  const jobs = await jobsByPicks(from, ids, cares, since);
  return {
    asOf,
    beams: beams.sort((a, b) => soonness(a) - soonness(b) || a.loomNumber - b.loomNumber),
    jobs: [...places.values()]
      .flatMap((place) => (jobs.get(place.loomId) ?? []).map((job) => ({ ...place, ...job })))
      .filter(({ picks, everyPicks }) => picks >= DUE * everyPicks)
      .sort((a, b) => b.picks / b.everyPicks - a.picks / a.everyPicks || a.loomNumber - b.loomNumber),
  };
}

function beamOf(
  warp: WarpInLoom,
  place: Place,
  cloth: ClothVersion | undefined,
  shifts: readonly ShiftAhead[],
): Beam {
  const left = leftOf(warp, cloth);
  const out = isNoFigure(left.picks) ? left.picks : warpOut(left.picks, warp.recent, warp.known, shifts);
  const moments = isNoFigure(out) ? { expected: out, earliest: out, latest: out } : out;
  const { warpId, warpName, clothId, clothName, since, picks, known } = warp;
  return {
    ...place,
    warpId,
    warpName,
    clothId,
    clothName,
    since,
    picks,
    known,
    picksLeft: rounded(left.picks),
    metresLeft: left.metres,
    expected: rounded(moments.expected),
    earliest: rounded(moments.earliest),
    latest: rounded(moments.latest),
  };
}

/** What can still be woven: picks, and the warp that they take, metres. */
function leftOf(warp: WarpInLoom, cloth: ClothVersion | undefined): { picks: Figure; metres: Figure } {
  if (!cloth) return { picks: noFigure('no-cloth'), metres: noFigure('no-cloth') };
  if (warp.lengthM === null) return { picks: noFigure('missing-input'), metres: noFigure('missing-input') };
  const used = (warp.picks / (cloth.picksPerCmLoomState * 100)) * (1 + cloth.crimp);
  const left = warp.lengthM - used;
  const picks = picksLeft({
    left,
    thrum: warp.thrumM,
    crimp: cloth.crimp,
    picksPerCm: cloth.picksPerCmLoomState,
  });
  return { picks, metres: Math.max(0, left - warp.thrumM) };
}

async function shiftsAhead(from: EntityManager, shedId: string, since: number): Promise<ShiftAhead[]> {
  const rows = await from.query<ShiftRow[]>(
    `SELECT * FROM "shift" WHERE "shedId" = ? AND "startsAt" > ? ORDER BY "startsAt"`,
    [shedId, since - DAY],
  );
  return rows.map(({ startsAt, endsAt, mealStartsAt, mealEndsAt, mealLooms }) => {
    const stands = mealLooms === 'stopped' ? (mealEndsAt ?? 0) - (mealStartsAt ?? 0) : 0;
    return { start: startsAt, end: endsAt, hours: (endsAt - startsAt - stands) / HOUR };
  });
}

function soonness({ expected }: Beam): number {
  return isNoFigure(expected) ? Infinity : expected;
}

function rounded(figure: Figure): Figure {
  return isNoFigure(figure) ? figure : Math.round(figure);
}
