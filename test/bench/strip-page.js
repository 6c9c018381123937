/**
 * The browser's half of `npm run bench:strip`: draws stops by the cloth strip's own painter and, in turn with it, as
 * one SVG element a stop with the same marks as SVG patterns. Bundled with the application's sources.
 */
import { MARK_KINDS } from '../../src/app/ui/mark-kind';
import { stripGeometry } from '../../src/app/ui/strip-geometry';
import { OVERHANG, paintStrip, paletteOf } from '../../src/app/ui/strip-painter';

const { performance, requestAnimationFrame, MessageChannel } = globalThis;
const SVG = 'http://www.w3.org/2000/svg';
const SHIFT = 8 * 3_600_000;
const HEIGHT = 28;

/** Stops a strip's width apart, so that none merges: the most there is to draw. Every cause, every kind of edge. */
function shiftOf(stops, seed) {
  let state = seed;
  const next = () => (state = (state * 16_807) % 2_147_483_647) / 2_147_483_647;
  const step = SHIFT / stops;
  return {
    startsAt: 0,
    endsAt: SHIFT,
    now: SHIFT - 1,
    readTo: SHIFT / 2,
    stops: Array.from({ length: stops }, (_, i) => ({
      from: i * step,
      until: i === stops - 1 ? null : i * step + step * (0.2 + 0.5 * next()),
      mark: MARK_KINDS[i % MARK_KINDS.length],
      // A counted pern change would be a tick; here every stop is a gap.
      estimated: i % 3 === 0 && MARK_KINDS[i % MARK_KINDS.length] !== 'pern',
    })),
  };
}

function canvasOf(width, ratio) {
  const canvas = document.createElement('canvas');
  canvas.width = Math.round(width * ratio);
  canvas.height = Math.round((HEIGHT + 2 * OVERHANG) * ratio);
  canvas.style.cssText = `display:block;width:${width}px;height:${HEIGHT + 2 * OVERHANG}px`;
  document.body.append(canvas);
  return canvas;
}

/** All that the component does for a drawing. */
function drawStrip(canvas, line, width, ratio) {
  paintStrip(canvas.getContext('2d'), stripGeometry(line, width), HEIGHT, ratio, paletteOf(document.body));
}

function svgHost(width) {
  const svg = document.createElementNS(SVG, 'svg');
  svg.setAttribute('width', String(width));
  svg.setAttribute('height', String(HEIGHT + 2 * OVERHANG));
  svg.style.display = 'block';
  svg.innerHTML = `<defs>${MARK_KINDS.map(
    (mark) =>
      `<pattern id="mark-${mark}" width="6" height="6" patternUnits="userSpaceOnUse"><path d="M2 0v6M0 2h6" stroke="black"/></pattern>`,
  ).join('')}</defs><g></g>`;
  document.body.append(svg);
  return svg;
}

/** The same gaps, one element a stop. */
function drawSvg(svg, line, width) {
  const { gaps, fell } = stripGeometry(line, width);
  const cloth = rect(0, fell, 'var(--weave-a)');
  svg.lastElementChild.replaceChildren(
    cloth,
    ...gaps.map((gap) => {
      const element = rect(gap.x, gap.width, `url(#mark-${gap.mark})`);
      if (gap.estimated) element.setAttribute('stroke-dasharray', '2 2');
      return element;
    }),
  );
}

function rect(x, width, fill) {
  const element = document.createElementNS(SVG, 'rect');
  element.setAttribute('x', String(x));
  element.setAttribute('y', String(OVERHANG));
  element.setAttribute('width', String(width));
  element.setAttribute('height', String(HEIGHT));
  element.setAttribute('fill', fill);
  return element;
}

/**
 * One drawing, ms: `draw` until the call returns, `frame` until the browser has laid out, painted and handed over the
 * frame it is in.
 */
function timed(draw) {
  return new Promise((resolve) => {
    requestAnimationFrame(() => {
      const channel = new MessageChannel();
      const from = performance.now();
      draw();
      const drawn = performance.now() - from;
      channel.port1.onmessage = () => {
        channel.port1.close();
        resolve({ draw: drawn, frame: performance.now() - from });
      };
      channel.port2.postMessage(null);
    });
  });
}

function medians(times) {
  const median = (values) => values.sort((a, b) => a - b)[values.length >> 1];
  return { draw: median(times.map((t) => t.draw)), frame: median(times.map((t) => t.frame)) };
}

/** Strip and SVG in turn, so that both meet the machine in the same moods. */
async function compare({ stops, draws, width, ratio }) {
  document.body.replaceChildren();
  const canvas = canvasOf(width, ratio);
  const svg = svgHost(width);
  const lines = Array.from({ length: 8 }, (_, i) => shiftOf(stops, 7 + i));
  const gaps = stripGeometry(lines[0], width).gaps.length;
  const ours = [];
  const theirs = [];
  for (let i = 0; i < draws; i++) {
    const line = lines[i % lines.length];
    ours.push(await timed(() => drawStrip(canvas, line, width, ratio)));
    theirs.push(await timed(() => drawSvg(svg, line, width)));
  }
  return { gaps, strip: medians(ours), svg: medians(theirs) };
}

/** Many strips live at once, all drawn anew in one frame. */
async function live({ strips, stops, width, ratio, draws }) {
  document.body.replaceChildren();
  const canvases = Array.from({ length: strips }, () => canvasOf(width, ratio));
  const lines = canvases.map((_, i) => shiftOf(stops, 100 + i));
  const times = [];
  for (let i = 0; i < draws; i++)
    times.push(await timed(() => canvases.forEach((canvas, n) => drawStrip(canvas, lines[n], width, ratio))));
  return medians(times);
}

Object.assign(globalThis, { benchStrip: { compare, live } });
