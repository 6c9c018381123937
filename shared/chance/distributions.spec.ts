import { describe, expect, it } from 'vitest';
import {
  betaQuantile,
  chiSquareQuantile,
  chiSquareUpperTail,
  fQuantile,
  fUpperTail,
  normalHalfWidth,
} from './distributions.js';

const relative = (actual: number, expected: number) => Math.abs(actual - expected) / expected;

// Values of scipy 1.17.1, outside this program, unless a closed form stands beside the line.
describe('the door to the statistics packages', () => {
  it('chi-square quantiles, small and large', () => {
    expect(relative(chiSquareQuantile(0.5, 2), 2 * Math.log(2))).toBeLessThan(1e-11);
    expect(relative(chiSquareQuantile(0.025, 6000) / 2, 2893.5986209846633)).toBeLessThan(1e-10);
    expect(relative(chiSquareQuantile(0.025, 200_000) / 2, 99_381.15266374472)).toBeLessThan(1e-10);
    expect(relative(chiSquareQuantile(0.025, 0.1) / 2, 1.32891547247859e-31 / 25)).toBeLessThan(1e-8);
  });

  it('chi-square upper tails, near and far', () => {
    // With 2 degrees the tail is e^(−x/2).
    for (const x of [0, 1, 10, 27, 28, 60, 100, 1000]) {
      expect(relative(chiSquareUpperTail(x, 2), Math.exp(-x / 2))).toBeLessThan(1e-9);
    }
  });

  // With an even number of degrees the tail is a sum of Poisson terms: P(fewer than degrees ÷ 2 at mean x ÷ 2).
  it.each([
    ['near', 1000, 1134, 1e-9],
    ['deep', 1000, 1990, 1e-11],
    ['deep, 1,500 degrees', 1500, 1938, 1e-11],
    ['beyond x 2,000, near', 1800, 2050, 1e-9],
    ['beyond x 2,000, deep', 1700, 2001, 7e-3],
    ['beyond x 2,000, very deep', 6000, 7753, 7e-3],
  ])('chi-square upper tails of many degrees: %s', (_, degrees, x, error) => {
    const logs = [-x / 2];
    for (let k = 1; k < degrees / 2; k++) logs.push(logs[k - 1] + Math.log(x / 2 / k));
    const top = Math.max(...logs);
    const exact = Math.exp(top) * logs.reduce((sum, log) => sum + Math.exp(log - top), 0);
    expect(relative(chiSquareUpperTail(x, degrees), exact)).toBeLessThan(error);
  });

  it('F upper tails, near and far, and quantiles', () => {
    // With 2 degrees above, the tail is (1 + 2x/d)^(−d/2).
    for (const x of [0.5, 3, 50, 1e4]) {
      expect(relative(fUpperTail(x, 2, 34), (1 + (2 * x) / 34) ** -17)).toBeLessThan(1e-10);
    }
    expect(fUpperTail(0, 1, 34)).toBe(1);
    expect(relative(fQuantile(0.95, 1, 34), 4.130017745652012)).toBeLessThan(1e-10);
    expect(fUpperTail(fQuantile(0.95, 1, 966), 1, 966)).toBeCloseTo(0.05, 12);
  });

  it('beta quantiles', () => {
    // With b = 1 the quantile is p^(1/a).
    expect(relative(betaQuantile(0.025, 11, 1), 0.025 ** (1 / 11))).toBeLessThan(1e-12);
    expect(relative(betaQuantile(0.025, 1, 5), 1 - 0.975 ** (1 / 5))).toBeLessThan(1e-10);
  });

  it('the normal half width', () => {
    expect(relative(normalHalfWidth(0.95), 1.959963984540054)).toBeLessThan(1e-9);
    expect(relative(normalHalfWidth(0.6), 0.8416212335729142)).toBeLessThan(1e-9);
  });
});
