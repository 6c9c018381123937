/**
 * npm run bench:strip: the median of 200 draws of 500 stops by the cloth strip's painter against drawing one SVG
 * element a stop, in the same run of a real Chromium, at device pixel ratio 1 and 2; and 200 strips drawn anew at once.
 * Prints one line of JSON, ms. Ends with 1 if the strip is not faster than the SVG; how fast either is depends on the
 * machine and decides nothing.
 */
import { createServer } from 'node:http';
import path from 'node:path';
import { chromium } from '@playwright/test';
import { build } from 'esbuild';
import { ensureChromium } from '../../scripts/lib/chromium.mjs';
import { ROOT } from '../../scripts/lib/run.mjs';
import { main } from '../../scripts/lib/say.mjs';

const DRAWS = 200;
const STOPS = 500;
const STRIPS = 200;
/** Wide enough that 500 stops stay 500 gaps. */
const WIDTH = 3_000;
const TOKENS = `<style>:root{--weave-a:navy;--weave-b:lightblue;--gap:white;--rest:beige;--sunk:wheat;--ink:black;--ink-2:dimgray;--madder:maroon;--weld:olive}</style>`;

await main(async () => {
  const { outputFiles } = await build({
    entryPoints: [path.join(ROOT, 'test/bench/strip-page.js')],
    bundle: true,
    write: false,
    minify: true,
    tsconfig: path.join(ROOT, 'tsconfig.json'),
  });
  const page = `<!doctype html>${TOKENS}<body><script>${outputFiles[0].text}</script>`;
  const server = createServer((_, response) => response.setHeader('content-type', 'text/html').end(page));
  await new Promise((resolve) => server.listen(0, '127.0.0.1', resolve));
  const browser = await chromium.launch({
    executablePath: await ensureChromium(),
    args: process.getuid?.() === 0 ? ['--no-sandbox'] : [],
  });
  try {
    const figures = { stops: STOPS, draws: DRAWS, unit: 'ms' };
    for (const ratio of [1, 2]) {
      const context = await browser.newContext({
        viewport: { width: WIDTH, height: 900 },
        deviceScaleFactor: ratio,
      });
      const screen = await context.newPage();
      await screen.goto(`http://127.0.0.1:${server.address().port}/`);
      figures[`at${ratio}x`] = await measure(screen, ratio);
      await context.close();
    }
    console.log(JSON.stringify(figures));
    for (const { ratio } of [figures.at1x, figures.at2x]) if (!(ratio < 1)) process.exitCode = 1;
    if (process.exitCode) console.error('The strip is not faster than one SVG element a stop.');
    if (figures.at1x.strip.draw >= 2) console.error('For information: 500 stops took 2 ms or more here.');
  } finally {
    await browser.close();
    server.close();
  }
});

async function measure(screen, ratio) {
  const compared = await screen.evaluate((options) => globalThis.benchStrip.compare(options), {
    stops: STOPS,
    draws: DRAWS,
    width: WIDTH,
    ratio,
  });
  const live = await screen.evaluate((options) => globalThis.benchStrip.live(options), {
    strips: STRIPS,
    stops: 40,
    width: 280,
    ratio,
    draws: 20,
  });
  const round = ({ draw, frame }) => ({ draw: Number(draw.toFixed(3)), frame: Number(frame.toFixed(3)) });
  return {
    gaps: compared.gaps,
    strip: round(compared.strip),
    svg: round(compared.svg),
    // Of whole frames: an SVG element costs little until the browser lays it out and paints it.
    ratio: Number((compared.strip.frame / compared.svg.frame).toFixed(3)),
    live200: round(live),
  };
}
