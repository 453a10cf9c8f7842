import { AB_ZERO_PHOTONS_PER_M2_S, responseOf } from '@faintward/photometry';
import { describe, expect, it } from 'vitest';
import { bands, files } from '../../../../tests/factories/sky.js';
import { createInfraredSky, USUAL_LINE_SHARE } from './infrared-sky.js';
import { createOhLines } from './oh-lines.js';

const [J, H, Ks] = [bands.J, bands.H, bands.Ks].map(({ curve }) => responseOf(curve)) as [
  ReturnType<typeof responseOf>,
  ReturnType<typeof responseOf>,
  ReturnType<typeof responseOf>,
];
const ofJ = { response: J, abMagPerArcsec2: 16.86, lineShare: USUAL_LINE_SHARE.J };
const ofH = { response: H, abMagPerArcsec2: 15.38, lineShare: USUAL_LINE_SHARE.H };
const lines = createOhLines(files.ohLines);
const sky = createInfraredSky(lines, { J: ofJ, H: ofH });
const light = (mag: number) => 10 ** (-0.4 * mag);

describe('the near-infrared sky', () => {
  it.each([
    ['J', J, ofJ],
    ['H', H, ofH],
  ] as const)('has in %s the brightness it was scaled to, with the share of lines asked for', (_, response, band) => {
    const ofLines = light(sky.linesAbMag(response)!);
    const ofContinuum = light(sky.continuumAbMag(response.pivotWavelengthNm));
    expect(-2.5 * Math.log10(ofLines + ofContinuum)).toBeCloseTo(band.abMagPerArcsec2, 9);
    expect(ofLines / (ofLines + ofContinuum)).toBeCloseTo(band.lineShare, 9);
  });

  it('leaves in Ks room for heat: lines at the scale of H are fainter than the measured sky, 14.24 AB', () => {
    expect(sky.linesAbMag(Ks)!).toBeGreaterThan(14.24);
  });

  it('has between the lines of H what dark-sky spectra show, some 600 photons s⁻¹ m⁻² arcsec⁻² µm⁻¹, within a factor of 2.5', () => {
    // Maihara et al. 1993, PASP 105, 940: 590, from memory.
    const photons = (AB_ZERO_PHOTONS_PER_M2_S * light(sky.continuumAbMag(1650))) / 1.65;
    expect(photons).toBeGreaterThan(590 / 2.5);
    expect(photons).toBeLessThan(590 * 2.5);
  });

  it('keeps all photons of the lines in the spectrum, at any resolving power', () => {
    // Integral over a range whose ends are free of lines; steps of 0.01 nm, a tenth of the finest width.
    for (const resolvingPower of [3000, 15_000]) {
      let photons = 0;
      for (let nm = 1600; nm < 1615; nm += 0.01) {
        const excess = light(sky.spectrumAbMag(nm, resolvingPower)) - light(sky.continuumAbMag(nm));
        photons += (excess * AB_ZERO_PHOTONS_PER_M2_S * 0.01) / nm;
      }
      const inside = sky.lines.filter(({ wavelengthNm }) => wavelengthNm > 1600 && wavelengthNm < 1615);
      const expected = inside.reduce((sum, line) => sum + line.photonRate, 0);
      expect(inside.length).toBeGreaterThan(2);
      expect(Math.abs(photons / expected - 1)).toBeLessThan(1e-3);
    }
  });

  it('is the continuum away from lines and far above it on one', () => {
    expect(sky.spectrumAbMag(1657.5, 10_000)).toBeCloseTo(sky.continuumAbMag(1657.5), 6);
    expect(sky.spectrumAbMag(1669.21, 4000)).toBeLessThan(sky.continuumAbMag(1669.21) - 4);
  });

  it('is dimmer when the sky is', () => {
    const dimmer = createInfraredSky(lines, { J: ofJ, H: { ...ofH, abMagPerArcsec2: ofH.abMagPerArcsec2 + 1 } });
    expect(dimmer.linesAbMag(H)! - sky.linesAbMag(H)!).toBeCloseTo(1, 9);
    expect(dimmer.linesAbMag(J)).toBe(sky.linesAbMag(J));
  });

  it('refuses a share that leaves no continuum, a band without lines, and wavelengths beyond the list', () => {
    expect(() => createInfraredSky(lines, { J: { ...ofJ, lineShare: 1 }, H: ofH })).toThrow('J.lineShare');
    expect(() => createInfraredSky(lines, { J: ofJ, H: { ...ofH, response: responseOf(bands.V.curve) } })).toThrow(
      'H.response',
    );
    expect(() => sky.continuumAbMag(1000)).toThrow('wavelengthNm');
    expect(sky.linesAbMag(responseOf(bands.V.curve))).toBeNull();
  });
});
