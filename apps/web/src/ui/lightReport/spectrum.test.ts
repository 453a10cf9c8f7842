import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { lightReport } from '../../testing/lightReportExample';
import {
  abMagnitude,
  clipCurve,
  fluxUnit,
  largestDifference,
  magnitudeDomain,
  wavelengthRange,
  wavelengthTicks,
} from './spectrum';

const { spectrum, bands, atmosphere } = lightReport;

describe('ranges', () => {
  it('a band shows its surroundings, all shows what bands and windows cover', () => {
    const [low, high] = wavelengthRange('band', spectrum!, bands, atmosphere, 'J');
    expect(low).toBeLessThan(1170);
    expect(high).toBeGreaterThan(1330);
    expect(wavelengthRange('all', spectrum!, bands, atmosphere, 'J')).toEqual([320, 2400]);
    expect(wavelengthRange('bands', spectrum!, bands, [{ lowNm: 4000, highNm: 5000 }], 'J')).toEqual([320, 2346]);
  });
  it('all never goes beyond what the spectrum says', () => {
    expect(wavelengthRange('all', { validLowNm: 500, validHighNm: 900 }, bands, atmosphere, null)).toEqual([500, 900]);
    expect(wavelengthRange('all', { validLowNm: 5000, validHighNm: 9000 }, bands, atmosphere, null)).toEqual([
      5000, 9000,
    ]);
  });
});

it('an AB magnitude of 3631 Jy is 0, and no flux has none', () => {
  expect(abMagnitude(3631)).toBeCloseTo(0, 12);
  expect(abMagnitude(0)).toBeNull();
});

it('cuts a curve at both edges and makes nothing up beyond its ends', () => {
  expect(clipCurve([1, 3, 5], [0, 2, 4], [2, 4])).toEqual([
    { x: 2, y: 1 },
    { x: 3, y: 2 },
    { x: 4, y: 3 },
  ]);
  expect(clipCurve([3, 4], [1, 1], [0, 9])).toEqual([
    { x: 3, y: 1 },
    { x: 4, y: 1 },
  ]);
  expect(clipCurve([1, 9], [1, 9], [4, 5])).toEqual([
    { x: 4, y: 4 },
    { x: 5, y: 5 },
  ]);
});

it('chooses a unit that gives ordinary numbers', () => {
  expect(fluxUnit(1.47e-7).unit).toBe('µJy');
  expect(fluxUnit(3e-8).unit).toBe('nJy');
  expect(fluxUnit(0.2).unit).toBe('Jy');
  expect(fluxUnit(0).unit).toBe('µJy');
});

it('turns magnitudes with the faint end below, and shows at most five below the brightest', () => {
  const [faint, bright] = magnitudeDomain([26, 24, 45, null]);
  expect(bright).toBeLessThan(24);
  expect(faint).toBeCloseTo(29.3);
  expect(magnitudeDomain([null])).toEqual([30, 20]);
});

it('keeps wavelength labels apart on any width', () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 250, max: 1300 }),
      fc.constantFrom('log' as const, 'linear' as const),
      fc.double({ min: 150, max: 2000, noNaN: true }),
      fc.double({ min: 1.1, max: 20, noNaN: true }),
      (width, kind, low, factor) => {
        const high = low * factor;
        const at = (nm: number) =>
          kind === 'log' ? (width * Math.log(nm / low)) / Math.log(factor) : (width * (nm - low)) / (high - low);
        const ticks = wavelengthTicks([low, high], kind, at);
        return (
          ticks.length > 0 &&
          ticks.every((tick, index) => index === 0 || at(tick) - at(ticks[index - 1]!) >= 36) &&
          ticks.every((tick) => tick >= low * 0.999 && tick <= high * 1.001)
        );
      },
    ),
  );
});

it('finds where absorption takes most, and nothing where it takes nothing', () => {
  const points = [1, 2, 3, 4].map((x) => ({ x, y: 10 }));
  expect(largestDifference(points, points)).toBeNull();
  const absorbed = points.map((point) => ({ ...point, y: point.x < 3 ? 0 : 10 }));
  expect(largestDifference(absorbed, points)!.x).toBeLessThan(3);
});
