/** Trouble with one exchange: what it was, and how soon the server wants to be asked again. */
export interface Trouble {
  readonly why: 'offline' | 'busy' | 'refused';
  /** From Retry-After, ms; null: not said. */
  readonly retryAfter: number | null;
}

/** One answer that got lost says little of the next; a server that is busy or says no is left alone for longer. */
const FIRST: Readonly<Record<Trouble['why'], number>> = { offline: 500, busy: 1_000, refused: 1_000 };
/** A network comes back any moment; a server that is busy or says no is asked more seldom. */
const LONGEST: Readonly<Record<Trouble['why'], number>> = {
  offline: 30_000,
  busy: 5 * 60_000,
  refused: 5 * 60_000,
};

/**
 * How long to wait before the next try, ms: doubled with each failure in a row, between half and the whole of it by
 * chance, so that a shed's tablets do not come back all at once; never sooner than the server asked for.
 *
 * @param failures in a row, from 1
 * @param random in [0, 1)
 */
export function backOff(failures: number, trouble: Trouble, random: number): number {
  const whole = Math.min(LONGEST[trouble.why], FIRST[trouble.why] * 2 ** Math.min(failures - 1, 20));
  const asked = trouble.retryAfter === null ? 0 : trouble.retryAfter * (1 + random / 4);
  return Math.round(Math.max(asked, whole * (0.5 + random / 2)));
}
