import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { brotliCompressSync } from 'node:zlib';

/**
 * What a tablet downloads before Loomside can be used: the page, its styles, and every script that the start and the
 * Loomside route import statically, each compressed with brotli as a server would send it. Fails above the limit.
 * Fonts are fetched beside it, once, and are printed for themselves; the service worker's prefetch comes after.
 */
const LIMIT = 180_000;
const APP = process.argv[2] ?? 'dist/app';
/** Entry points of lazy chunks that opening /loomside loads. */
const LOOMSIDE = [
  'src/app/features/loomside/loomside.routes.ts',
  'src/app/features/loomside/loomside-page.ts',
];

interface Stats {
  readonly outputs: Readonly<
    Record<
      string,
      {
        readonly entryPoint?: string;
        readonly imports: readonly {
          readonly path: string;
          readonly kind: string;
          readonly external?: boolean;
        }[];
      }
    >
  >;
}

function fail(sentence: string): never {
  console.error(sentence);
  process.exit(1);
}

const statsFile = join(APP, 'stats.json');
if (!existsSync(statsFile)) fail(`${statsFile} is not there. Build the application first: npx ng build.`);
const stats = JSON.parse(readFileSync(statsFile, 'utf8')) as Stats;

/** An output and all that it imports statically. */
function withImports(output: string, seen: Set<string>): void {
  if (seen.has(output)) return;
  seen.add(output);
  for (const { path, kind, external } of stats.outputs[output]?.imports ?? [])
    if (kind === 'import-statement' && !external) withImports(path, seen);
}

function chunkOf(entryPoint: string): string {
  const found = Object.entries(stats.outputs).find(
    ([name, output]) => name.endsWith('.js') && output.entryPoint === entryPoint,
  );
  return (
    found?.[0] ??
    fail(`No chunk of the build begins at ${entryPoint}. Name Loomside’s chunks in this script anew.`)
  );
}

const page = readFileSync(join(APP, 'browser/index.html'), 'utf8');
const named = [...page.matchAll(/(?:src|href)="([^"]+\.(?:js|css))"/g)].map((match) => match[1] ?? '');
const files = new Set<string>(['index.html', ...named]);
for (const file of named) if (stats.outputs[file]) withImports(file, files);
const start = new Set(files);
for (const entryPoint of LOOMSIDE) withImports(chunkOf(entryPoint), files);

const sizeOf = (file: string) => brotliCompressSync(readFileSync(join(APP, 'browser', file))).length;
const sum = (list: Iterable<string>) => [...list].reduce((total, file) => total + sizeOf(file), 0);
const kB = (bytes: number) => `${(bytes / 1000).toFixed(1)} kB`;

const lazy = [...files].filter((file) => !start.has(file));
const total = sum(files);
const forbidden = [...files].filter((file) => {
  const text = readFileSync(join(APP, 'browser', file), 'utf8');
  return file.endsWith('.js') && /CategoryScale|chiSquareQuantile|jStat/.test(text);
});
console.log(
  `Loomside’s initial download: ${kB(total)} brotli in ${files.size} files ` +
    `(start ${kB(sum(start))}, Loomside ${kB(sum(lazy))}); the limit is ${kB(LIMIT)}.`,
);
const fonts = Object.keys(stats.outputs).filter((file) => /-latin-wght-normal.*\.woff2$/.test(file));
console.log(
  `Beside it, once: ${fonts.length} fonts, ${kB(fonts.reduce((total, file) => total + readFileSync(join(APP, 'browser', file)).length, 0))}.`,
);
if (forbidden.length > 0) fail(`Charts or statistics are in it: ${forbidden.join(', ')}. Load them lazily.`);
if (total > LIMIT) fail(`That is ${kB(total - LIMIT)} too much: load something lazily, or take it out.`);
