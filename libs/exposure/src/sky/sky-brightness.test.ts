import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { darkSkyAirmassFactor } from './dark-sky.js';
import { extinctionAt } from './extinction.js';
import { moonlitSkyMag, nanolambertsOfVMag } from './moonlight.js';
import type { SkyBrightness, SkyPartId } from './sky-brightness.js';
import { bands, extinction, sky } from '../../../../tests/factories/sky.js';

const dark = { zenithDarkAbMag: 21.92, airmass: 1, extinction };
const partOf = ({ parts }: SkyBrightness, id: SkyPartId) => parts.find((part) => part.id === id)!;
const light = (mag: number | null) => (mag === null ? 0 : 10 ** (-0.4 * mag));

describe('the sky of a wavelength', () => {
  it('is at the zenith, in a dark night like the measured one, what was measured', () => {
    const wavelength = fc.double({ min: 300, max: 2500, noNaN: true });
    const measured = fc.double({ min: 10, max: 26, noNaN: true });
    fc.assert(
      fc.property(wavelength, measured, (at, zenithDarkAbMag) => {
        const answer = sky.brightness({ ...dark, at, zenithDarkAbMag });
        expect(answer.abMagPerArcsec2).toBeCloseTo(zenithDarkAbMag, 9);
        expect(answer.darkAbMagPerArcsec2).toBe(answer.abMagPerArcsec2);
        expect(answer.moonBrighteningMag).toBe(0);
      }),
    );
  });

  it('has in V the parts of the model: 145, 60 and 15 of 220 S10', () => {
    const answer = sky.brightness({ ...dark, at: 'V', zenithDarkAbMag: 27.78 - 2.5 * Math.log10(220) + 0.02 });
    expect(partOf(answer, 'airglow').share).toBeCloseTo(145 / 220, 9);
    expect(partOf(answer, 'zodiacal').share).toBeCloseTo(60 / 220, 9);
    expect(partOf(answer, 'starlight').share).toBeCloseTo(15 / 220, 9);
    expect(partOf(answer, 'moon')).toMatchObject({ abMagPerArcsec2: null, share: 0 });
  });

  it('grows downwards by the published form, with the share of airglow found', () => {
    const [zenith, low] = [1, 1.8].map((airmass) => sky.brightness({ ...dark, at: 'V', airmass }));
    const { magPerAirmass } = extinctionAt(extinction, bands.V.pivotWavelengthNm);
    const factor = darkSkyAirmassFactor(partOf(zenith!, 'airglow').share, magPerAirmass, 1.8);
    expect(zenith!.abMagPerArcsec2 - low!.abMagPerArcsec2).toBeCloseTo(2.5 * Math.log10(factor), 9);
  });

  it('has the moonlight of the published model in V', () => {
    const moon = { phaseAngleDeg: 60, zenithDistanceDeg: 40, separationDeg: 70 };
    const answer = sky.brightness({ ...dark, at: 'V', moon });
    const extinctionMag = extinctionAt(extinction, bands.V.pivotWavelengthNm).magPerAirmass;
    const published = moonlitSkyMag({
      darkZenithMag: 21.9,
      extinctionMag,
      phaseAngleDeg: 60,
      moonZenithDistanceDeg: 40,
      targetZenithDistanceDeg: 0,
      separationDeg: 70,
    });
    const moonVega = partOf(answer, 'moon').abMagPerArcsec2! - bands.V.vegaToAbMag!;
    expect(nanolambertsOfVMag(moonVega) / published.moonNanolamberts).toBeCloseTo(1, 9);
    // The dark sky is the same here, so the brightening is too; 4e-5 mag between 0.92104 and 0.4 ln 10 of the publication.
    expect(answer.moonBrighteningMag).toBeCloseTo(published.brighteningMag, 3);
  });

  const anyInput = fc.record({
    at: fc.double({ min: 320, max: 2400, noNaN: true }),
    zenithDarkAbMag: fc.double({ min: 14, max: 23, noNaN: true }),
    airmass: fc.double({ min: 1, max: 3, noNaN: true }),
    extinction: fc.constant(extinction),
    moon: fc.record({
      phaseAngleDeg: fc.double({ min: 0, max: 170, noNaN: true }),
      zenithDistanceDeg: fc.double({ min: 0, max: 89, noNaN: true }),
      separationDeg: fc.double({ min: 10, max: 89, noNaN: true }),
    }),
    sunAltitudeDeg: fc.double({ min: -30, max: -6, noNaN: true }),
    solarFluxMjy: fc.double({ min: 0.8, max: 2, noNaN: true }),
    eclipticLatitudeDeg: fc.double({ min: -90, max: 90, noNaN: true }),
  });

  it('is the sum of its parts, and shares add to 1', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        const answer = sky.brightness(input);
        const sum = answer.parts.reduce((all, part) => all + light(part.abMagPerArcsec2), 0);
        expect(sum / light(answer.abMagPerArcsec2)).toBeCloseTo(1, 9);
        expect(answer.parts.reduce((all, { share }) => all + share, 0)).toBeCloseTo(1, 9);
      }),
    );
  });

  it('is never brighter when the Moon sets, the Sun sinks, or the Sun calms down', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        const here = sky.brightness(input).abMagPerArcsec2;
        const { moon, ...moonless } = input;
        const fainter = [
          moonless,
          { ...input, moon: { ...moon, zenithDistanceDeg: 95 } },
          { ...input, moon: { ...moon, phaseAngleDeg: moon.phaseAngleDeg + 5 } },
          { ...input, sunAltitudeDeg: input.sunAltitudeDeg - 1 },
          { ...input, solarFluxMjy: 0.8 },
          { ...input, eclipticLatitudeDeg: 90 },
        ];
        // 1e-12 mag for the rounding of sums.
        for (const each of fainter) expect(sky.brightness(each).abMagPerArcsec2).toBeGreaterThan(here - 1e-12);
      }),
    );
  });

  it('follows the Sun’s activity in V, and not where OH makes the airglow', () => {
    const change = (at: number) =>
      sky.brightness({ ...dark, at }).abMagPerArcsec2 -
      sky.brightness({ ...dark, at, solarFluxMjy: 1.8 }).abMagPerArcsec2;
    expect(change(550)).toBeGreaterThan(0.3);
    expect(change(1250)).toBe(0);
  });

  it('says what lies outside its sources', () => {
    const moon = { phaseAngleDeg: 0, zenithDistanceDeg: 45, separationDeg: 60 };
    const extendedAt = (at: number) =>
      sky
        .brightness({ ...dark, at, moon, sunAltitudeDeg: -12 })
        .parts.filter((part) => part.isExtended)
        .map(({ id, provenance }) => [id, provenance]);
    expect(extendedAt(bands.V.pivotWavelengthNm)).toEqual([]);
    expect(extendedAt(700)).toEqual([['moon', 'commonPractice']]);
    expect(extendedAt(1250)).toEqual([
      ['moon', 'commonPractice'],
      ['twilight', 'commonPractice'],
    ]);
  });

  it('refuses what it cannot compute', () => {
    expect(() => sky.brightness({ ...dark, at: 2600 })).toThrow('at must be between 300 and 2500 nm');
    expect(() => sky.brightness({ ...dark, at: 'V', airmass: 0.5 })).toThrow('airmass');
    expect(() => sky.brightness({ ...dark, at: 'V', sunAltitudeDeg: 3 })).toThrow('sunAltitudeDeg');
    expect(() => sky.brightness({ ...dark, at: 'V', zenithDarkAbMag: NaN })).toThrow('zenithDarkAbMag');
  });
});
