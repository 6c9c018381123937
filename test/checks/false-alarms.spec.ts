import { describe, expect, it } from 'vitest';
import { compareTwoRates } from '../../shared/chance/two-rates.js';
import { adjust } from '../../shared/chance/false-discovery.js';
import { compareTwoWeeks, type LoomWeeks, type WovenShift } from '../../shared/chance/two-weeks.js';
import { given } from './close-to.js';
import { print } from './print.js';
import { seeded } from '../../shared/testing/seeded.js';

// A simulation, the project's own: pages of 24 looms, 21 shifts in each of two weeks, 3 breaks a shift on
// average. Over-dispersed shifts are gamma-Poisson, variance = dispersion × mean. Beside the page stands the
// plain exact Poisson test with the same Benjamini–Hochberg.
const PAGES = 2000;
const LOOMS = 24;
const SHIFTS = 21;
const MEAN = 3;
const PICKS = 60_000;

/** Draws counts by their cumulative distribution: Poisson at dispersion 1, negative binomial above. */
function counter(mean: number, dispersion: number, random: () => number): () => number {
  const size = mean / (dispersion - 1);
  let p = dispersion === 1 ? Math.exp(-mean) : dispersion ** -size;
  const cumulative = [p];
  for (let k = 1; cumulative[k - 1] < 1 - 1e-15 && k < 1000; k++) {
    p *= dispersion === 1 ? mean / k : ((size + k - 1) / k) * (1 - 1 / dispersion);
    cumulative.push(cumulative[k - 1] + p);
  }
  return () => {
    const u = random();
    let k = 0;
    while (k < cumulative.length - 1 && cumulative[k] < u) k++;
    return k;
  };
}

function week(draw: () => number): WovenShift[] {
  return Array.from({ length: SHIFTS }, () => ({ count: draw(), exposure: PICKS, cloth: 'a', beam: '1' }));
}

interface Named {
  readonly page: ReadonlySet<string>;
  readonly deviance: ReadonlySet<string>;
  readonly plain: ReadonlySet<string>;
}

function name(looms: readonly LoomWeeks[]): Named {
  const { looms: verdicts } = given(compareTwoWeeks(looms));
  const page = new Set(verdicts.filter((one) => one.verdict === 'changed').map((one) => one.loom));
  const devianceP = adjust(verdicts.map((one) => given(one.comparison).deviance.p));
  const deviance = new Set(verdicts.filter((_, at) => devianceP[at] <= 0.05).map((one) => one.loom));
  const plainP = adjust(verdicts.map((one) => given(compareTwoRates(one.after, one.before)).p));
  const plain = new Set(verdicts.filter((_, at) => plainP[at] <= 0.05).map((one) => one.loom));
  return { page, deviance, plain };
}

/** Shares of pages: without change, those that name a loom; with loom 0 doubled, those that name it. */
function simulate(dispersion: number) {
  const random = seeded(1892 + dispersion);
  const usual = counter(MEAN, dispersion, random);
  const doubled = counter(2 * MEAN, dispersion, random);
  const shares = { alarmed: 0, alarmedDeviance: 0, alarmedPlain: 0, found: 0, foundPlain: 0 };
  for (let page = 0; page < PAGES; page++) {
    const looms = Array.from({ length: LOOMS }, (_, at) => ({
      loom: String(at),
      before: week(usual),
      after: week(usual),
    }));
    const still = name(looms);
    shares.alarmed += Number(still.page.size > 0) / PAGES;
    shares.alarmedDeviance += Number(still.deviance.size > 0) / PAGES;
    shares.alarmedPlain += Number(still.plain.size > 0) / PAGES;
    const changed = name([{ ...looms[0], after: week(doubled) }, ...looms.slice(1)]);
    shares.found += Number(changed.page.has('0')) / PAGES;
    shares.foundPlain += Number(changed.plain.has('0')) / PAGES;
  }
  return shares;
}

/** 5%, and two standard errors of a share found on so many pages. */
const ALLOWED = 0.05 + 2 * Math.sqrt((0.05 * 0.95) / PAGES);

describe('pages that compare two weeks, simulated', () => {
  for (const { dispersion, leastFound, leastPlain } of [
    { dispersion: 1, leastFound: 0.9, leastPlain: 0.02 },
    { dispersion: 2, leastFound: 0.55, leastPlain: 0.4 },
    { dispersion: 4, leastFound: 0.2, leastPlain: 0.9 },
  ]) {
    it(`at dispersion ${dispersion}`, () => {
      const { alarmed, alarmedDeviance, alarmedPlain, found, foundPlain } = simulate(dispersion);
      const percent = (share: number) => `${(100 * share).toFixed(1)}%`;
      print(
        `dispersion ${dispersion}, ${PAGES} pages of ${LOOMS} looms × ${SHIFTS} shifts × ${MEAN} breaks: ` +
          `no change, a loom named on ${percent(alarmed)} (by the deviance ${percent(alarmedDeviance)}, ` +
          `plain Poisson test ${percent(alarmedPlain)}); ` +
          `one loom doubled, found on ${percent(found)} (plain ${percent(foundPlain)})`,
      );
      expect(alarmed).toBeLessThanOrEqual(ALLOWED);
      expect(alarmed).toBeLessThan(alarmedDeviance);
      expect(found).toBeGreaterThan(leastFound);
      expect(alarmedPlain).toBeGreaterThan(leastPlain);
    });
  }
});
