import type { MarkKind } from './mark-kind';
import { clothOf } from './strip-cloth';
import type { StripCloth } from './strip-cloth';
import type { StripGeometry } from './strip-geometry';

/** The strip's colours, read from the theme's tokens. */
export interface StripPalette {
  readonly weaveA: string;
  readonly weaveB: string;
  readonly gap: string;
  readonly rest: string;
  readonly ground: string;
  readonly ink: string;
  readonly ink2: string;
  readonly warp: string;
  readonly weft: string;
}

/** Black on white, whatever the screen shows. */
export const PRINT_PALETTE: StripPalette = {
  weaveA: 'black',
  weaveB: 'silver',
  gap: 'white',
  rest: 'white',
  ground: 'silver',
  ink: 'black',
  ink2: 'black',
  warp: 'black',
  weft: 'black',
};

/** The fell stands out of the cloth by this much, px, above and below. */
export const OVERHANG = 3;

export function paletteOf(host: Element): StripPalette {
  const style = getComputedStyle(host);
  const token = (name: string) => style.getPropertyValue(name).trim();
  return {
    weaveA: token('--weave-a'),
    weaveB: token('--weave-b'),
    gap: token('--gap'),
    rest: token('--rest'),
    ground: token('--sunk'),
    ink: token('--strip-ink') || token('--ink'),
    ink2: token('--strip-ink-2') || token('--ink-2'),
    warp: token('--madder'),
    weft: token('--weld'),
  };
}

/**
 * Paints a strip `height` px high. `ratio` is the device pixel ratio: everything is drawn in device pixels, so that
 * threads stay sharp. A gap is one copy out of its mark's sheet, edges are one path for all gaps: a strip of 500 stops
 * costs under 2 ms, so that 200 can be live at once (`npm run bench:strip`).
 */
export function paintStrip(
  context: CanvasRenderingContext2D,
  geometry: StripGeometry,
  height: number,
  ratio: number,
  palette: StripPalette,
): void {
  const px = (value: number) => Math.round(value * ratio);
  const top = px(OVERHANG);
  const tall = px(height);
  const fell = px(geometry.fell);
  const cloth = clothOf(context, tall, ratio, palette);
  context.clearRect(0, 0, px(geometry.width), tall + 2 * top);

  context.fillStyle = palette.rest;
  context.fillRect(fell, top, px(geometry.width) - fell, tall);
  context.fillStyle = cloth.weave;
  context.fillRect(0, top, fell, tall);
  selvedges(context, geometry, top, tall, ratio, palette);
  for (const gap of geometry.gaps) {
    const x = px(gap.x);
    copyMark(context, cloth, gap.mark, x, Math.max(1, px(gap.width)), top, tall);
  }
  edges(context, geometry, top, tall, ratio, palette);
  context.fillStyle = palette.ink;
  for (const tick of geometry.ticks)
    context.fillRect(px(tick), top + tall - px(4), Math.max(1, px(1)), px(4) + px(OVERHANG - 1));
  if (geometry.live) {
    const open = geometry.gaps.some((gap) => gap.open);
    // Beside the last pick, not over it: a stop of this minute is three pixels wide.
    if (!open) context.fillRect(Math.min(fell, px(geometry.width) - px(3)), 0, px(3), tall + 2 * top);
  }
}

function selvedges(
  context: CanvasRenderingContext2D,
  geometry: StripGeometry,
  top: number,
  tall: number,
  ratio: number,
  palette: StripPalette,
): void {
  const thick = Math.max(1, Math.round(1.5 * ratio));
  context.strokeStyle = palette.weaveA;
  context.lineWidth = thick;
  for (const [from, to, dash] of [
    [0, geometry.proven, []],
    [geometry.proven, geometry.fell, [4 * ratio, 3 * ratio]],
  ] as const) {
    if (to <= from) continue;
    context.setLineDash([...dash]);
    context.beginPath();
    for (const y of [top + thick / 2, top + tall - thick / 2]) {
      context.moveTo(from * ratio, y);
      context.lineTo(to * ratio, y);
    }
    context.stroke();
  }
  context.setLineDash([]);
}

/** A gap is cut out of its mark's sheet from the sheet's left, so that a narrow one shows its mark's beginning. */
function copyMark(
  context: CanvasRenderingContext2D,
  cloth: StripCloth,
  mark: MarkKind,
  x: number,
  wide: number,
  top: number,
  tall: number,
): void {
  const sheet = cloth.sheet(mark);
  for (let done = 0; done < wide; done += sheet.width) {
    const part = Math.min(sheet.width, wide - done);
    context.drawImage(sheet, 0, 0, part, tall, x + done, top, part, tall);
  }
}

/** Waiting has an outline; a gap nobody timed has a broken edge below. */
function edges(
  context: CanvasRenderingContext2D,
  geometry: StripGeometry,
  top: number,
  tall: number,
  ratio: number,
  palette: StripPalette,
): void {
  const outline = Math.max(1, Math.round(1.2 * ratio));
  const broken = Math.max(1, Math.round(1.5 * ratio));
  const outlines = new Path2D();
  const brokens = new Path2D();
  let any = false;
  for (const gap of geometry.gaps) {
    if (gap.mark !== 'waiting' && !gap.estimated) continue;
    any = true;
    const x = Math.round(gap.x * ratio);
    const wide = Math.max(1, Math.round(gap.width * ratio));
    if (gap.mark === 'waiting')
      outlines.rect(x + outline / 2, top + outline / 2, Math.max(0, wide - outline), tall - outline);
    if (gap.estimated) {
      brokens.moveTo(x, top + tall - broken / 2);
      brokens.lineTo(x + wide, top + tall - broken / 2);
    }
  }
  if (!any) return;
  context.strokeStyle = palette.ink2;
  context.lineWidth = outline;
  context.stroke(outlines);
  context.strokeStyle = palette.ink;
  context.lineWidth = broken;
  context.setLineDash([2 * ratio, 2 * ratio]);
  context.stroke(brokens);
  context.setLineDash([]);
}
