/**
 * Wrong figures made on purpose, each a slip that a person could make. `npm run mutants` puts them in one at a time and
 * runs the specs named: one of them must fail. A mutant that survives is a figure that no spec holds.
 */
export interface Mutant {
  /** Below shared/. */
  readonly file: string;
  /** Stands exactly once in the file. */
  readonly original: string;
  readonly mutated: string;
  /** What would be wrong. */
  readonly why: string;
  /** Spec files that should notice, as parts of their paths; unless said the one beside the file. */
  readonly specs?: readonly string[];
}

/** The specs that should notice a mutant. */
export function specsOf({ file, specs }: Mutant): readonly string[] {
  return specs ?? [`shared/${file.replace(/\.ts$/, '.spec')}`];
}

/** A file's text with the mutant in it; throws where the original does not stand in it exactly once. */
export function mutate(text: string, { file, original, mutated }: Mutant): string {
  const [before, after, ...more] = text.split(original);
  if (before === undefined || after === undefined || more.length > 0)
    throw new Error(
      `shared/${file}: stands there ${more.length + (after === undefined ? 0 : 1)} times: ${original}`,
    );
  return before + mutated + after;
}
