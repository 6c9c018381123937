/** Beams to choose from, and how many more there are behind "Show all". */
export interface BeamChoice<B> {
  readonly shown: readonly B[];
  readonly hidden: number;
}

/** Those that may be free: a beam known to lie in another loom is shown last, and only where all are wanted or it is chosen. */
export function beamChoice<B extends { readonly id: string }>(
  beams: readonly B[],
  fittedElsewhere: ReadonlySet<string>,
  all: boolean,
  chosen = '',
): BeamChoice<B> {
  const free = beams.filter(({ id }) => !fittedElsewhere.has(id));
  const fitted = beams.filter(({ id }) => fittedElsewhere.has(id));
  const shown = [...free, ...fitted.filter(({ id }) => all || id === chosen)];
  return { shown, hidden: beams.length - shown.length };
}
