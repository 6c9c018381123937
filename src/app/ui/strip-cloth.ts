import type { MarkKind } from './mark-kind';
import type { StripPalette } from './strip-painter';

/** What every strip of one height, palette and pixel ratio is cut from: drawn once, then only copied. */
export interface StripCloth {
  readonly weave: string | CanvasPattern;
  /** A gap with its mark, as wide as most gaps are; wider ones repeat it. */
  sheet(mark: MarkKind): HTMLCanvasElement;
}

/** At least this wide is a sheet, px, and always whole repeats of its mark. */
const SHEET = 120;
/** A mark's repeat, px. */
const REPEATS: Readonly<Record<MarkKind, number>> = {
  warp: 4,
  weft: 4,
  pern: 8,
  tackler: 7,
  waiting: 8,
  care: 6,
  planned: 8,
};
/** Heights × palettes × ratios in use at once are few; more than this means that somebody zooms. */
const KEPT = 24;
const kept = new Map<string, StripCloth>();

export function clothOf(
  context: CanvasRenderingContext2D,
  tall: number,
  ratio: number,
  palette: StripPalette,
): StripCloth {
  const key = `${tall} ${ratio} ${Object.values(palette).join(' ')}`;
  const found = kept.get(key);
  if (found) return found;
  if (kept.size >= KEPT) kept.clear();
  const sheets = new Map<MarkKind, HTMLCanvasElement>();
  const cloth: StripCloth = {
    weave: weave(context, ratio, palette),
    sheet: (mark) => {
      const drawn = sheets.get(mark) ?? sheetOf(context, mark, tall, ratio, palette);
      sheets.set(mark, drawn);
      return drawn;
    },
  };
  kept.set(key, cloth);
  return cloth;
}

function sheetOf(
  context: CanvasRenderingContext2D,
  mark: MarkKind,
  tall: number,
  ratio: number,
  palette: StripPalette,
): HTMLCanvasElement {
  const canvas = context.canvas.ownerDocument.createElement('canvas');
  const repeat = Math.max(3, Math.round(REPEATS[mark] * ratio));
  canvas.width = repeat * Math.ceil((SHEET * ratio) / repeat);
  canvas.height = tall;
  const drawing = canvas.getContext('2d');
  if (!drawing) return canvas;
  drawing.fillStyle = palette.gap;
  drawing.fillRect(0, 0, canvas.width, tall);
  drawing.fillStyle = markFill(drawing, mark, repeat, palette);
  drawing.fillRect(0, 0, canvas.width, tall);
  return canvas;
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

function markFill(
  context: CanvasRenderingContext2D,
  mark: MarkKind,
  repeat: number,
  palette: StripPalette,
): string | CanvasPattern {
  switch (mark) {
    case 'warp':
      return tile(context, repeat, (c, s) => {
        c.fillStyle = palette.warp;
        c.fillRect(Math.round(s * 0.25), 0, Math.max(1, Math.round(s * 0.45)), s);
      });
    case 'weft':
      return tile(context, repeat, (c, s) => {
        c.fillStyle = palette.weft;
        c.fillRect(0, Math.round(s * 0.25), s, Math.max(1, Math.round(s * 0.45)));
      });
    case 'pern':
      return tile(context, repeat, (c, s) => {
        c.fillStyle = palette.ink2;
        c.beginPath();
        c.moveTo(s / 2, s * 0.08);
        c.lineTo(s * 0.85, s / 2);
        c.lineTo(s / 2, s * 0.92);
        c.lineTo(s * 0.15, s / 2);
        c.fill();
      });
    case 'tackler':
      return tile(context, repeat, (c, s) => {
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
      return tile(context, repeat, (c, s) => {
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
