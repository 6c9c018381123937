import { existsSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { mutate } from './mutant.js';
import { MUTANTS } from './mutants.js';

const shared = (file: string) => fileURLToPath(new URL(`../../shared/${file}`, import.meta.url));

describe('the mutants', () => {
  it.each(MUTANTS.map((one) => [one.file, one.why, one] as const))('of %s: %s', (file, _, mutant) => {
    const text = readFileSync(shared(file), 'utf8');
    expect(mutate(text, mutant)).not.toBe(text);
    expect(existsSync(shared(file.replace(/\.ts$/, '.spec.ts'))) || mutant.specs !== undefined).toBe(true);
  });

  it('are made where the text stands once, and nowhere else', () => {
    const mutant = {
      file: 'figures/x.ts',
      original: 'a + b',
      mutated: 'a - b',
      why: 'a sum is a difference',
    };
    expect(mutate('return a + b;', mutant)).toBe('return a - b;');
    expect(() => mutate('return a * b;', mutant)).toThrow('stands there 0 times');
    expect(() => mutate('return a + b + (a + b);', mutant)).toThrow('stands there 2 times');
  });
});
