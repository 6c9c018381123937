import type { MarkKind } from './mark-kind';
import type { StripGap, StripGeometry } from './strip-geometry';

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
 * threads stay sharp.
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
  context.clearRect(0, 0, px(geometry.width), tall + 2 * top);

  context.fillStyle = palette.rest;
  context.fillRect(fell, top, px(geometry.width) - fell, tall);
  context.fillStyle = weave(context, ratio, palette);
  context.fillRect(0, top, fell, tall);
  selvedges(context, geometry, top, tall, ratio, palette);
  for (const gap of geometry.gaps) paintGap(context, gap, top, tall, ratio, palette);
  context.fillStyle = palette.ink;
  for (const tick of geometry.ticks)
    context.fillRect(px(tick), top + tall - px(4), Math.max(1, px(1)), px(4) + px(OVERHANG - 1));
  if (geometry.live) {
    const open = geometry.gaps.some((gap) => gap.open);
    if (!open) context.fillRect(fell - px(1.5), 0, px(3), tall + 2 * top);
  }
}

function weave(context: CanvasRenderingContext2D, ratio: number, palette: StripPalette) {
  const size = Math.max(4, Math.round(6 * ratio));
  const half = size / 2;
  const thread = Math.max(1, Math.round(2.4 * ratio));
  return tile(context, size, (c) => {
    c.fillStyle = palette.weaveB;
    c.fillRect(0, 0, size, size);
    c.fillStyle = palette.weaveA;
    c.fillRect(0, 0, thread, thread);
    c.fillRect(half, half, thread, thread);
    c.globalAlpha = 0.72;
    c.fillRect(half, 0, thread, thread);
    c.fillRect(0, half, thread, thread);
  });
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

function paintGap(
  context: CanvasRenderingContext2D,
  gap: StripGap,
  top: number,
  tall: number,
  ratio: number,
  palette: StripPalette,
): void {
  const x = Math.round(gap.x * ratio);
  const wide = Math.max(1, Math.round(gap.width * ratio));
  context.fillStyle = palette.gap;
  context.fillRect(x, top, wide, tall);
  context.save();
  context.beginPath();
  context.rect(x, top, wide, tall);
  context.clip();
  context.translate(x, top);
  context.fillStyle = markFill(context, gap.mark, ratio, palette);
  context.fillRect(0, 0, wide, tall);
  context.restore();
  context.lineWidth = Math.max(1, Math.round(1.2 * ratio));
  if (gap.mark === 'waiting') {
    context.strokeStyle = palette.ink2;
    const inset = context.lineWidth / 2;
    context.strokeRect(x + inset, top + inset, Math.max(0, wide - 2 * inset), tall - 2 * inset);
  }
  if (gap.estimated) {
    context.strokeStyle = palette.ink;
    context.lineWidth = Math.max(1, Math.round(1.5 * ratio));
    context.setLineDash([2 * ratio, 2 * ratio]);
    context.beginPath();
    context.moveTo(x, top + tall - context.lineWidth / 2);
    context.lineTo(x + wide, top + tall - context.lineWidth / 2);
    context.stroke();
    context.setLineDash([]);
  }
}

function markFill(
  context: CanvasRenderingContext2D,
  mark: MarkKind,
  ratio: number,
  palette: StripPalette,
): string | CanvasPattern {
  const size = (css: number) => Math.max(3, Math.round(css * ratio));
  switch (mark) {
    case 'warp':
      return tile(context, size(4), (c, s) => {
        c.fillStyle = palette.warp;
        c.fillRect(Math.round(s * 0.25), 0, Math.max(1, Math.round(s * 0.45)), s);
      });
    case 'weft':
      return tile(context, size(4), (c, s) => {
        c.fillStyle = palette.weft;
        c.fillRect(0, Math.round(s * 0.25), s, Math.max(1, Math.round(s * 0.45)));
      });
    case 'pern':
      return tile(context, size(8), (c, s) => {
        c.fillStyle = palette.ink2;
        c.beginPath();
        c.moveTo(s / 2, s * 0.08);
        c.lineTo(s * 0.85, s / 2);
        c.lineTo(s / 2, s * 0.92);
        c.lineTo(s * 0.15, s / 2);
        c.fill();
      });
    case 'tackler':
      return tile(context, size(7), (c, s) => {
        c.strokeStyle = palette.ink;
        c.lineWidth = s * 0.36;
        c.beginPath();
        for (const shift of [-s, 0, s]) {
          c.moveTo(shift - s * 0.25, s * 1.25);
          c.lineTo(shift + s * 1.25, -s * 0.25);
        }
        c.stroke();
      });
    case 'care':
      return tile(context, size(6), (c, s) => {
        c.fillStyle = palette.ink2;
        c.beginPath();
        c.arc(s / 2, s / 2, s * 0.22, 0, 2 * Math.PI);
        c.fill();
      });
    case 'planned':
      return palette.ground;
    case 'waiting':
      return palette.gap;
  }
}

/** A small repeating drawing; transparent where nothing was drawn. */
function tile(
  context: CanvasRenderingContext2D,
  size: number,
  draw: (c: CanvasRenderingContext2D, size: number) => void,
): string | CanvasPattern {
  const canvas = context.canvas.ownerDocument.createElement('canvas');
  canvas.width = size;
  canvas.height = size;
  const drawing = canvas.getContext('2d');
  if (drawing) draw(drawing, size);
  return context.createPattern(canvas, 'repeat') ?? 'transparent';
}
