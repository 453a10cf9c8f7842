import { altitudeDeg } from '@faintward/astronomy';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { gaussianSlitFraction } from '../point-spread.js';
import {
  angleToVerticalDeg,
  parallacticAdvice,
  parallacticAngleDeg,
  slitLightAt,
  type DispersedSlit,
} from './dispersion-slit.js';

const slit: DispersedSlit = {
  guidedNm: 500,
  airmass: 1.5,
  air: { pressureHpa: 800, temperatureCelsius: 7, waterVapourHpa: 5 },
  angleToVerticalDeg: 90,
  slitWidthArcsec: 1,
  imageFwhmArcsec: 0.8,
};

describe('the parallactic angle', () => {
  it.each([
    // On the meridian the vertical is north–south: zero or 180°. At the equator a target on it sets straight down in the west.
    [0, -20, 30, 0],
    [0, 60, 30, 180],
    [90, 0, 0, 90],
    [-90, 0, 0, -90],
    // tan q = sin 45° / tan 30°: 50.768°.
    [45, 0, 30, 50.768],
  ])('at hour angle %d°, declination %d°, latitude %d° is %d°', (hour, declination, latitude, angle) => {
    expect(parallacticAngleDeg(hour, declination, latitude)).toBeCloseTo(angle, 3);
  });

  it('is the direction in which altitude grows fastest', () => {
    const degrees = (min: number, max: number) => fc.double({ min, max, noNaN: true });
    fc.assert(
      fc.property(degrees(5, 90), degrees(-60, 60), degrees(-60, 60), (hour, declination, latitude) => {
        const altitude = (h: number, d: number) => altitudeDeg(h, d, latitude);
        fc.pre(altitude(hour, declination) > 10 && altitude(hour, declination) < 80);
        const step = 1e-3;
        const north = (altitude(hour, declination + step) - altitude(hour, declination - step)) / (2 * step);
        // East is towards smaller hour angles, and a degree of it on the sky is 1/cos δ of hour angle.
        const hourStep = step / Math.cos((declination * Math.PI) / 180);
        const east = (altitude(hour - hourStep, declination) - altitude(hour + hourStep, declination)) / (2 * step);
        const angle = (Math.atan2(east, north) * 180) / Math.PI;
        const apart = Math.abs(parallacticAngleDeg(hour, declination, latitude) - angle);
        expect(Math.min(apart, 360 - apart)).toBeLessThan(1e-4);
      }),
    );
  });

  it('is met by a slit turned by half a turn as well', () => {
    expect(angleToVerticalDeg(30, 30)).toBe(0);
    expect(angleToVerticalDeg(210, 30)).toBe(0);
    expect(angleToVerticalDeg(-60, 30)).toBe(90);
    expect(angleToVerticalDeg(10, 170)).toBe(20);
  });
});

describe('light in a slit', () => {
  it('is that of a centred image at the guided wavelength, and at any with the slit along the vertical', () => {
    const centred = gaussianSlitFraction(1 / 0.8);
    expect(slitLightAt(slit, 500)).toEqual({ slitFraction: centred, offsetArcsec: 0, dispersionLossMag: 0 });
    expect(slitLightAt({ ...slit, angleToVerticalDeg: 0 }, 350).slitFraction).toBe(centred);
  });

  it('is half when the image lies on the edge of a wide slit', () => {
    const { offsetArcsec } = slitLightAt(slit, 350);
    const edge = { ...slit, slitWidthArcsec: 2 * offsetArcsec, imageFwhmArcsec: 0.1 };
    expect(slitLightAt(edge, 350).slitFraction).toBeCloseTo(0.5, 9);
    expect(slitLightAt(edge, 350).dispersionLossMag).toBeCloseTo(2.5 * Math.log10(2), 9);
  });

  it('is less further from the vertical, further down, and further from the guided wavelength', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 310, max: 1500, noNaN: true }),
        fc.double({ min: 0, max: 89, noNaN: true }),
        fc.double({ min: 1, max: 3, noNaN: true }),
        (nm, angle, airmass) => {
          const here = { ...slit, angleToVerticalDeg: angle, airmass };
          const { slitFraction } = slitLightAt(here, nm);
          const away = nm < 500 ? nm - 10 : nm + 10;
          // 1e-12 for rounding where nothing changes.
          expect(slitLightAt({ ...here, angleToVerticalDeg: angle + 1 }, nm).slitFraction).toBeLessThan(
            slitFraction + 1e-12,
          );
          expect(slitLightAt({ ...here, airmass: airmass + 0.1 }, nm).slitFraction).toBeLessThan(slitFraction + 1e-12);
          expect(slitLightAt(here, away).slitFraction).toBeLessThan(slitFraction + 1e-12);
        },
      ),
    );
  });

  it('has no magnitude where nothing is left', () => {
    const lost = { ...slit, airmass: 5, imageFwhmArcsec: 0.1, slitWidthArcsec: 0.1 };
    expect(slitLightAt(lost, 320)).toMatchObject({ slitFraction: 0, dispersionLossMag: null });
  });
});

describe('advice', () => {
  it('asks for the vertical when the ends lie a quarter of the slit apart', () => {
    const blue = parallacticAdvice(slit, [350, 600]);
    // 1.34 + 0.37 at airmass 1.5 on a mountain like that of the publication.
    expect(Math.abs(blue.shiftArcsec - 1.71)).toBeLessThan(0.02);
    expect(blue.shouldAlign).toBe(true);
    expect(blue.asGiven[0].dispersionLossMag).toBeGreaterThan(blue.asGiven[1].dispersionLossMag!);
    expect(parallacticAdvice(slit, [1500, 1800]).shouldAlign).toBe(false);
    expect(parallacticAdvice({ ...slit, airmass: 1 }, [350, 600])).toMatchObject({
      shiftArcsec: 0,
      shouldAlign: false,
    });
  });
});
