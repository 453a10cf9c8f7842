import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { moonClassOf, USUAL_MOON_CLASS_THRESHOLDS } from './moon-class.js';

describe('the class of the sky', () => {
  it.each([
    [0, 0, 'dark', 'dark'],
    [0, 1, 'dark', 'bright'],
    [0.19, 0.39, 'dark', 'dark'],
    [0.2, 0.4, 'grey', 'grey'],
    [0.99, 0.69, 'grey', 'grey'],
    [1, 0.7, 'bright', 'bright'],
    [3.5, 1, 'bright', 'bright'],
  ] as const)('brighter by %d mag with %d of the Moon lit: %s, labelled %s', (brightening, lit, moonClass, label) => {
    expect(moonClassOf(brightening, lit)).toEqual({ moonClass, label });
  });

  it('follows the observatory’s own thresholds', () => {
    const thresholds = { ...USUAL_MOON_CLASS_THRESHOLDS, darkBelowMag: 0.1, brightFromFraction: 0.9 };
    expect(moonClassOf(0.15, 0.8, thresholds)).toEqual({ moonClass: 'grey', label: 'grey' });
  });

  it('never becomes darker with more light', () => {
    const order = ['dark', 'grey', 'bright'];
    const amount = fc.double({ min: 0, max: 5, noNaN: true });
    fc.assert(
      fc.property(amount, amount, (a, b) => {
        const [less, more] = [Math.min(a, b), Math.max(a, b)].map((mag) => moonClassOf(mag, 0.5).moonClass);
        expect(order.indexOf(more!)).toBeGreaterThanOrEqual(order.indexOf(less!));
      }),
    );
  });

  it('refuses thresholds out of order and light that cannot be', () => {
    expect(() => moonClassOf(0, 0, { ...USUAL_MOON_CLASS_THRESHOLDS, darkBelowMag: 2 })).toThrow('darkBelowMag');
    expect(() => moonClassOf(-0.1, 0)).toThrow('brighteningMag');
    expect(() => moonClassOf(0, 1.01)).toThrow('illuminatedFraction');
  });
});
