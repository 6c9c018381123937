import { describe, expect, it } from 'vitest';
import { formatCount, formatMinutes, formatPercent, formatRate } from './format.js';

describe('figures as they are shown', () => {
  it.each([
    [0.96154216, '96.2%'],
    [0.85, '85.0%'],
    [1.0416, '104.2%'],
    [0, '0.0%'],
    [-0.0001, '0.0%'],
    [-0.034, '−3.4%'],
    [12.5, '1,250.0%'],
  ])('percentages to one decimal: %d', (share, text) => {
    expect(formatPercent(share)).toBe(text);
  });

  it.each([
    [4.04040404, '4.0'],
    [11.807775, '11.8'],
    [1234.56, '1,234.6'],
  ])('rates to one decimal: %d', (rate, text) => {
    expect(formatRate(rate)).toBe(text);
  });

  it.each([
    [74_250, '74,250'],
    [1_159_081.4, '1,159,081'],
    [0, '0'],
    [-0.4, '0'],
    [-1_200, '−1,200'],
  ])('counts with thousands separators: %d', (count, text) => {
    expect(formatCount(count)).toBe(text);
  });

  it.each([
    [4 + 1 / 6, '4 min 10 s'],
    [0.75, '45 s'],
    [4, '4 min'],
    [65, '1 h 5 min'],
    [65.4, '1 h 5 min'],
    [65.6, '1 h 6 min'],
    [59.999, '1 h'],
    [119.99, '2 h'],
    [60, '1 h'],
    [0, '0 min'],
    [0.004, '0 min'],
    [-4.5, '−4 min 30 s'],
    [-0.001, '0 min'],
    [60_065, '1,001 h 5 min'],
  ])('minutes in words: %d', (minutes, text) => {
    expect(formatMinutes(minutes)).toBe(text);
  });
});
