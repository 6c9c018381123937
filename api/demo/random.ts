/**
 * Chance for the demo, from a seed: the same seed gives the same mill, so that a picture or a test can be made again.
 * The generator is mulberry32 (32 bits of state, public domain): plenty for a demonstration, unfit for secrets.
 */
export class Random {
  private state: number;

  constructor(seed: number) {
    this.state = seed >>> 0;
  }

  /** Uniform in [0, 1). */
  next(): number {
    this.state = (this.state + 0x6d2b79f5) >>> 0;
    let t = this.state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4_294_967_296;
  }

  /** Whole number from `low` to `high`, both included. */
  whole(low: number, high: number): number {
    return low + Math.floor(this.next() * (high - low + 1));
  }

  between(low: number, high: number): number {
    return low + this.next() * (high - low);
  }

  chance(probability: number): boolean {
    return this.next() < probability;
  }

  pick<T>(list: readonly T[]): T {
    const item = list[Math.floor(this.next() * list.length)];
    if (item === undefined) throw new Error('Nothing to pick from.');
    return item;
  }

  /** Time to the next event of a Poisson process; infinite where the rate is 0. */
  exponential(mean: number): number {
    return -Math.log(1 - this.next()) * mean;
  }

  normal(): number {
    return Math.sqrt(-2 * Math.log(1 - this.next())) * Math.cos(2 * Math.PI * this.next());
  }

  /** Gamma with mean 1 (Marsaglia and Tsang 2000); shape ≥ 1. A Poisson rate times this is over-dispersed. */
  gammaOfMeanOne(shape: number): number {
    const d = shape - 1 / 3;
    const c = 1 / Math.sqrt(9 * d);
    for (;;) {
      const x = this.normal();
      const v = (1 + c * x) ** 3;
      if (v <= 0) continue;
      if (Math.log(1 - this.next()) < x * x * 0.5 + d - d * v + d * Math.log(v)) return (d * v) / shape;
    }
  }

  /** A duration: skewed to the long side, with this median. `spread` is the standard deviation of its logarithm. */
  duration(median: number, spread: number): number {
    return median * Math.exp(spread * this.normal());
  }

  /** A UUID v7 (RFC 9562) of a moment, its random bits from the seed. */
  uuidV7(at: number): string {
    const time = Math.floor(at).toString(16).padStart(12, '0');
    const hex = (digits: number): string =>
      Math.floor(this.next() * 16 ** digits)
        .toString(16)
        .padStart(digits, '0');
    const variant = (8 + Math.floor(this.next() * 4)).toString(16);
    return `${time.slice(0, 8)}-${time.slice(8)}-7${hex(3)}-${variant}${hex(3)}-${hex(6)}${hex(6)}`;
  }
}
