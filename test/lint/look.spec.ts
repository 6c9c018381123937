import { readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const APP = fileURLToPath(new URL('../../src/app/', import.meta.url));
const STYLES = fileURLToPath(new URL('../../src/styles/', import.meta.url));

interface Source {
  readonly path: string;
  readonly text: string;
}

function sources(folder: string): Source[] {
  return readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((path) => /\.(ts|html|scss)$/.test(path) && !path.endsWith('.spec.ts'))
    .map((path) => ({ path, text: readFileSync(join(folder, path), 'utf8') }));
}

/** A colour by its number: `#1d222c`, `rgb(…)`, `hsl(…)`, not `&#8239;`, not a private `#field`. */
const LITERAL_COLOUR =
  /(?<![\w&'"(/])#(?:[0-9a-f]{3,4}|[0-9a-f]{6}|[0-9a-f]{8})\b(?!\s*[\]=({])|\b(?:rgb|hsl)a?\(/i;

const app = sources(APP);
const icons = app.find(({ path }) => path === 'ui/icons.ts')?.text ?? '';
const shipped = [...icons.matchAll(/^ {2}(\w+): '<path/gm)].map(([, name]) => name ?? '');

describe('the look', () => {
  it('names a colour nowhere but in the palette', () => {
    const others = sources(STYLES).filter(({ path }) => path !== '_tokens.scss');
    const found = [...app, ...others].flatMap(({ path, text }) =>
      text
        .split('\n')
        .flatMap((line, i) => (LITERAL_COLOUR.test(line) ? [`${path}:${i + 1} ${line.trim()}`] : [])),
    );
    expect(found).toEqual([]);
    // The same eye sees what it should.
    for (const line of ['color: #000;', 'border: 1px solid #fffdf8', 'background: rgb(13 16 21 / 40%);'])
      expect(line).toMatch(LITERAL_COLOUR);
  });

  it('ships the icons that are used and no others', () => {
    expect(shipped.length).toBeGreaterThan(10);
    const rest = app.filter(({ path }) => path !== 'ui/icons.ts').map(({ text }) => text);
    const used = (name: string): boolean =>
      rest.some(
        (text) =>
          text.includes(`svgIcon="${name}"`) || new RegExp(`[iI]con\\S* ?[:?=].*'${name}'`).test(text),
      );
    expect(shipped.filter((name) => !used(name))).toEqual([]);
    const asked = rest.flatMap((text) =>
      [...text.matchAll(/svgIcon="(\w+)"/g)].map(([, name]) => name ?? ''),
    );
    expect(asked.filter((name) => !shipped.includes(name))).toEqual([]);
  });
});
