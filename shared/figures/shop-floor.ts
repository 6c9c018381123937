import { isNoFigure, noFigure, type Figure } from './no-figure.js';

/** Times and quantities of a loom by the names of ISO 22400-2. Quantities in picks, or in metres throughout. */
export interface ShopFloorInput {
  /** PBT, planned busy time, minutes: the shift less planned stops. */
  readonly plannedBusyMinutes: number;
  /** APT, actual production time, minutes: the time that the loom ran. */
  readonly actualProductionMinutes: number;
  /** PRI, planned run time for one item, minutes: 1 ÷ ppm where items are picks. */
  readonly plannedMinutesPerItem: number;
  /** PQ, produced quantity. */
  readonly produced: number;
  /** GQ, good quantity: of these, without fault. */
  readonly good: number;
}

/** Each a ratio, 1 for 100%. Above 1 is shown, not hidden: a loom over its book speed, or a wrong entry. */
export interface ShopFloorFigures {
  /** APT ÷ PBT; `no-time` where nothing was planned. */
  readonly availability: Figure;
  /** PRI · PQ ÷ APT; `no-time` where the loom did not run. */
  readonly effectiveness: Figure;
  /** GQ ÷ PQ; `no-picks` where nothing was produced. */
  readonly quality: Figure;
  /** The product of the three, or the first reason why one is missing. */
  readonly oee: Figure;
}

/**
 * The shop-floor figures of ISO 22400-2: availability, effectiveness, quality rate and overall equipment
 * effectiveness index.
 *
 * @returns each figure or its reason; all of them `missing-input` for NaN, `out-of-range` for negative or
 *   infinite input or more good than produced
 */
export function shopFloorFigures(input: ShopFloorInput): ShopFloorFigures {
  const { plannedBusyMinutes, actualProductionMinutes, plannedMinutesPerItem, produced, good } = input;
  const all = [plannedBusyMinutes, actualProductionMinutes, plannedMinutesPerItem, produced, good];
  if (all.some(Number.isNaN)) return every('missing-input');
  if (!all.every((value) => value >= 0 && value < Infinity) || good > produced) return every('out-of-range');

  const availability =
    plannedBusyMinutes > 0 ? actualProductionMinutes / plannedBusyMinutes : noFigure('no-time');
  const effectiveness =
    actualProductionMinutes > 0
      ? (plannedMinutesPerItem * produced) / actualProductionMinutes
      : noFigure('no-time');
  const quality = produced > 0 ? good / produced : noFigure('no-picks');
  return { availability, effectiveness, quality, oee: product([availability, effectiveness, quality]) };
}

function every(reason: 'missing-input' | 'out-of-range'): ShopFloorFigures {
  const none = noFigure(reason);
  return { availability: none, effectiveness: none, quality: none, oee: none };
}

function product(figures: readonly Figure[]): Figure {
  return figures.reduce<Figure>((sofar, figure) => {
    if (isNoFigure(sofar)) return sofar;
    return isNoFigure(figure) ? figure : sofar * figure;
  }, 1);
}
