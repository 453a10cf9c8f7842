import { describe, expect, it } from 'vitest';
import { formatDuration, formatNumber } from './format';

describe('formatNumber', () => {
  it.each([
    [-21, { decimals: 2 }, '−21.00'],
    [0.07, { decimals: 2, signed: true }, '+0.07'],
    [-0.001, { decimals: 2 }, '0.00'],
    [71908.3, { decimals: 1 }, '71\u202f908.3'],
    [1234, { decimals: 0 }, '1234'],
    [3.83e12, {}, '3.830 × 10¹²'],
    [1.4953e-29, { significant: 3 }, '1.50 × 10⁻²⁹'],
    [0, {}, '0'],
    [5.2865, { significant: 3 }, '5.29'],
  ])('writes %d with %o as %s', (value, format, text) => {
    expect(formatNumber(value, format)).toBe(text);
  });
  it.each([null, undefined, NaN, Infinity])('draws an em dash for %s, never 0', (value) => {
    expect(formatNumber(value)).toBe('—');
  });
});

describe('formatDuration', () => {
  it.each([
    [45, '45 s'],
    [2.5, '2.5 s'],
    [720, '12 min'],
    [11364, '3 h 9 min'],
    [7200, '2 h'],
    [null, '—'],
  ])('says %s seconds as %s', (seconds, text) => {
    expect(formatDuration(seconds)).toBe(text);
  });
});
