import type { MarkKind } from './mark-kind.js';
import { stripGeometry, type StripGap, type StripLine } from './strip-geometry.js';

/** Room above and below for the fell and the pern ticks. */
const OVERHANG = 2;
const REPEAT = 3;

/**
 * The cloth strip as an SVG, black on white: what paper shows. One path a mark, not an element a stop.
 *
 * @param width,height of the strip itself, in the drawing's own units; the picture is 4 units higher
 */
export function stripSvg(line: StripLine, width: number, height: number): string {
  const { fell, gaps, ticks, live } = stripGeometry(line, width);
  const top = OVERHANG;
  const parts = [
    rect(0, top, fell, height, 'fill="silver"'),
    stroke(weave(fell, top, height), 0.5),
    ...gaps.map((gap) => rect(gap.x, top, gap.width, height, 'fill="white"')),
    ...gaps
      .filter(({ mark }) => mark === 'planned')
      .map((gap) => rect(gap.x, top + 0.8, gap.width, height - 1.6, 'fill="gainsboro"')),
    ...(['warp', 'weft', 'tackler'] as const).map((mark) => stroke(marksOf(gaps, mark, top, height), 0.8)),
    filled(marksOf(gaps, 'pern', top, height) + marksOf(gaps, 'care', top, height)),
    stroke(marksOf(gaps, 'waiting', top, height), 0.6),
    stroke(
      gaps
        .filter((gap) => gap.estimated)
        .map((gap) => `M${n(gap.x)} ${n(top + height)}h${n(gap.width)}`)
        .join(''),
      0.8,
      '1.5 1',
    ),
    stroke(ticks.map((x) => `M${n(x)} ${n(top + height - 2.5)}v${n(2.5 + OVERHANG - 0.5)}`).join(''), 0.6),
    stroke(`M0 ${top}h${n(fell)}M0 ${n(top + height)}h${n(fell)}`, 0.8),
    live && !gaps.some((gap) => gap.open)
      ? rect(fell - 1, 0, 1.5, height + 2 * OVERHANG, 'fill="black"')
      : '',
    `<rect x="0.25" y="${top}" width="${n(width - 0.5)}" height="${height}" fill="none" stroke="black" stroke-width="0.3"/>`,
  ];
  const box = `0 0 ${width} ${height + 2 * OVERHANG}`;
  return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="${box}">${parts.filter(Boolean).join('')}</svg>`;
}

/** Level threads: a plain weave at this size. */
function weave(fell: number, top: number, height: number): string {
  const levels: string[] = [];
  for (let y = 2; y < height - 1; y += 2) levels.push(`M0 ${n(top + y)}h${n(fell)}`);
  return fell > 0 ? levels.join('') : '';
}

/** All gaps' marks of one kind: each drawn by its own geometry, inside its gap. */
function marksOf(gaps: readonly StripGap[], mark: MarkKind, top: number, height: number): string {
  return gaps
    .filter((gap) => gap.mark === mark)
    .map((gap) => DRAWN[mark](gap, top, height))
    .join('');
}

type Draw = (gap: StripGap, top: number, height: number) => string;

const steps = (from: number, length: number, step: number): number[] =>
  Array.from({ length: Math.max(1, Math.floor(length / step)) }, (_, i) => from + step / 2 + i * step).filter(
    (at) => at < from + length || at === from + step / 2,
  );

const DRAWN: Readonly<Record<MarkKind, Draw>> = {
  warp: ({ x, width }, top, height) =>
    steps(x, width, Math.min(REPEAT, width))
      .map((at) => `M${n(at)} ${n(top)}v${n(height)}`)
      .join(''),
  weft: ({ x, width }, top, height) =>
    steps(top, height, REPEAT)
      .map((y) => `M${n(x)} ${n(y)}h${n(width)}`)
      .join(''),
  pern: ({ x, width }, top, height) => {
    const half = Math.min(1.8, width / 2);
    const middle = top + height / 2;
    return steps(x, width, Math.min(2 * half + 0.6, width))
      .map((at) => `M${n(at)} ${n(middle - 2.5)}l${n(half)} 2.5l${n(-half)} 2.5l${n(-half)} -2.5z`)
      .join('');
  },
  tackler: ({ x, width }, top, height) => {
    // Hatch up to the right, each line cut where the gap ends.
    const lines: string[] = [];
    for (let at = x - height; at < x + width; at += REPEAT) {
      const from = Math.max(at, x);
      const to = Math.min(at + height, x + width);
      if (to > from)
        lines.push(`M${n(from)} ${n(top + height - (from - at))}L${n(to)} ${n(top + height - (to - at))}`);
    }
    return lines.join('');
  },
  waiting: ({ x, width }, top, height) =>
    `M${n(x + 0.3)} ${n(top + 0.3)}h${n(Math.max(0, width - 0.6))}v${n(height - 0.6)}h${n(-Math.max(0, width - 0.6))}z`,
  care: ({ x, width }, top, height) =>
    [0.28, 0.72]
      .flatMap((share) =>
        steps(x, width, Math.min(REPEAT, width)).map(
          (at) => `M${n(at - 0.6)} ${n(top + height * share - 0.6)}h1.2v1.2h-1.2z`,
        ),
      )
      .join(''),
  planned: () => '',
};

function stroke(path: string, width: number, dash = ''): string {
  if (path === '') return '';
  const dashed = dash ? ` stroke-dasharray="${dash}"` : '';
  return `<path d="${path}" fill="none" stroke="black" stroke-width="${width}"${dashed}/>`;
}

function filled(path: string): string {
  return path === '' ? '' : `<path d="${path}" fill="black"/>`;
}

function rect(x: number, y: number, width: number, height: number, more: string): string {
  return width > 0 ? `<rect x="${n(x)}" y="${n(y)}" width="${n(width)}" height="${n(height)}" ${more}/>` : '';
}

/** Two decimals are more than a printer can show. */
function n(value: number): string {
  return String(Math.round(value * 100) / 100);
}
