// Draws the PNG icons from assets/icons/*.svg with Chromium. Run by hand when the mark changes: the PNGs are checked in.
import { Buffer } from 'node:buffer';
import { readFile, writeFile } from 'node:fs/promises';
import { chromium } from '@playwright/test';

const folder = new URL('../assets/icons/', import.meta.url);
const browser = await chromium.launch({
  executablePath: process.env['CHROMIUM'] ?? '/usr/bin/chromium',
  args: ['--no-sandbox'],
});
const page = await browser.newPage();

async function draw(svg, size, name) {
  await page.setViewportSize({ width: size, height: size });
  await page.setContent(
    `<style>*{margin:0}svg{display:block;width:${size}px;height:${size}px}</style>${svg}`,
  );
  await writeFile(new URL(name, folder), await page.screenshot({ omitBackground: true }));
}

const mark = await readFile(new URL('mark.svg', folder), 'utf8');
for (const size of [72, 96, 128, 144, 152, 192, 384, 512]) await draw(mark, size, `icon-${size}x${size}.png`);
await draw(await readFile(new URL('mark-maskable.svg', folder), 'utf8'), 512, 'maskable-512x512.png');
await draw(mark, 32, 'icon-32x32.png');
await browser.close();

// A favicon.ico may hold a PNG: a header, one directory entry, the picture.
const png = await readFile(new URL('icon-32x32.png', folder));
const head = Buffer.alloc(22);
head.writeUInt16LE(1, 2);
head.writeUInt16LE(1, 4);
head.writeUInt8(32, 6);
head.writeUInt8(32, 7);
head.writeUInt16LE(1, 10);
head.writeUInt16LE(32, 12);
head.writeUInt32LE(png.length, 14);
head.writeUInt32LE(22, 18);
await writeFile(new URL('../favicon.ico', folder), Buffer.concat([head, png]));
