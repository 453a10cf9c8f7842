/**
 * Check values of tests/reference/snr.json: closed formulas evaluated with mpmath in 40 digits, profiles compared there with
 * an independent modelling library. Tolerance 1e-9 relative, because both sides are closed formulas.
 */
import { readFileSync } from 'node:fs';
import {
  photonRateBoxBandPerM2,
  photonRateOfLinePerM2,
  photonRatePerM2PerNm,
  resolutionFwhmKmS,
} from '@faintward/photometry';
import { describe, expect, it } from 'vitest';
import {
  collectingAreaM2,
  effectivePixelCount,
  exposureCountFor,
  limitingMagnitude,
  openShutterSecondsFor,
  readVariance,
  signalToNoise,
  wholeExposures,
  type NoiseBudget,
} from './ccd-equation.js';
import { OPTIMUM_RADIUS_OVER_FWHM } from './constants.js';
import {
  GAUSSIAN_NOISE_EQUIVALENT_AREA_OVER_FWHM2,
  GAUSSIAN_SIGMA_OVER_FWHM,
  gaussianEncircledFraction,
  gaussianPeakPixelFraction,
  gaussianRectangleFraction,
  gaussianSlitFraction,
  moffatAlphaOverFwhm,
  moffatEncircledFraction,
  moffatSlitFraction,
  optimumRadiusOverFwhm,
} from './point-spread.js';

interface Profile {
  gaussian: number;
  'moffat_2.5': number;
  'moffat_4.765': number;
}
type Numbers = Record<string, number>;
interface Chain {
  id: string;
  input: Numbers & { kind: string };
  [key: string]: unknown;
}
interface Reference {
  ccd_equation: (Numbers & { id: string; input: Numbers })[];
  imaging: Chain[];
  spectra: Chain[];
  profiles: {
    encircled_energy: (Profile & { r_over_fwhm: number })[];
    slit_fraction: (Profile & { slit_width_over_fwhm: number; offset_over_fwhm: number })[];
    rectangular_aperture: { width_over_fwhm: number; height_over_fwhm: number; gaussian: number }[];
    peak_pixel_fraction: { pixel_over_fwhm: number; gaussian_centred_pixel: number }[];
    optimum_radius_over_fwhm: Record<keyof Profile, { r_over_fwhm: number; encircled_energy: number }>;
    gaussian_sigma_over_fwhm: number;
    gaussian_noise_equivalent_area_over_fwhm2: number;
    moffat_alpha_over_fwhm: { 'moffat_2.5': number; 'moffat_4.765': number };
  };
  published_example: { case: string; quoted_snr: number };
}

const reference = JSON.parse(
  readFileSync(new URL('../../../tests/reference/snr.json', import.meta.url), 'utf8'),
) as Reference;

function expectRelative(actual: number, expected: unknown, tolerance = 1e-9): void {
  expect(typeof expected).toBe('number');
  expect(Math.abs(actual - Number(expected))).toBeLessThanOrEqual(tolerance * Math.abs(Number(expected)));
}
function field(record: Numbers, name: string): number {
  const value = record[name];
  if (value === undefined) throw new Error(`the reference has no ${name}`);
  return value;
}

describe('CCD equation', () => {
  it.each(reference.ccd_equation)('$id', (row) => {
    const input = row.input;
    const pixels = effectivePixelCount(field(input, 'npix'), input['n_background_pixels']);
    const budget: NoiseBudget = {
      sourceElectronsPerSecond: field(input, 'source_e_s'),
      backgroundElectronsPerSecondPerPixel: field(input, 'sky_e_s_pix') + field(input, 'dark_e_s_pix'),
      readVarianceElectrons2: readVariance(field(input, 'read_noise_e'), input['gain_e_adu'], input['sigma_f_adu']),
      effectivePixelCount: pixels,
    };
    const [seconds, count] = [field(input, 'time_s'), field(input, 'nexp')];
    const wanted = field(input, 'target_snr');
    expectRelative(pixels, row['effective_npix']);
    expectRelative(signalToNoise(budget, seconds, count), row['snr']);
    expectRelative(openShutterSecondsFor(budget, wanted, count), row['time_for_target_snr_s_quadratic']);
    expectRelative(openShutterSecondsFor(budget, wanted, count), row['time_for_target_snr_s_rootfinding'], 1e-6);
    expectRelative(signalToNoise(budget, seconds / count, 1), row['snr_one_exposure']);
    expectRelative(signalToNoise(budget, seconds / count, 1) * Math.sqrt(count), row['snr_from_sqrt_nexp']);
    expect(wholeExposures(exposureCountFor(budget, wanted, seconds / count))).toBe(
      row['exposures_of_same_length_for_target_snr'],
    );
  });

  it('reproduces the worked example of the Handbook of CCD Astronomy, S/N = 342', () => {
    const row = reference.ccd_equation.find((each) => each.id === reference.published_example.case);
    expect(Math.round(Number(row?.['snr']))).toBe(reference.published_example.quoted_snr);
  });

  it('needs no time for S/N = 0 and never gets there without a source', () => {
    const budget = { backgroundElectronsPerSecondPerPixel: 1, readVarianceElectrons2: 9, effectivePixelCount: 10 };
    expect(openShutterSecondsFor({ ...budget, sourceElectronsPerSecond: 1 }, 0, 1)).toBe(0);
    expect(openShutterSecondsFor({ ...budget, sourceElectronsPerSecond: 0 }, 5, 1)).toBe(Infinity);
    expect(signalToNoise({ ...budget, sourceElectronsPerSecond: 0 }, 100, 1)).toBe(0);
  });
});

describe('image profiles', () => {
  const { profiles } = reference;

  it.each(profiles.encircled_energy)('encircled fraction at $r_over_fwhm FWHM', (row) => {
    expectRelative(gaussianEncircledFraction(row.r_over_fwhm), row.gaussian);
    expectRelative(moffatEncircledFraction(row.r_over_fwhm, 2.5), row['moffat_2.5']);
    expectRelative(moffatEncircledFraction(row.r_over_fwhm, 4.765), row['moffat_4.765']);
  });

  it.each(profiles.slit_fraction)('slit of $slit_width_over_fwhm, off by $offset_over_fwhm', (row) => {
    const [width, offset] = [row.slit_width_over_fwhm, row.offset_over_fwhm];
    expectRelative(gaussianSlitFraction(width, offset), row.gaussian);
    expectRelative(moffatSlitFraction(width, 2.5, offset), row['moffat_2.5']);
    expectRelative(moffatSlitFraction(width, 4.765, offset), row['moffat_4.765']);
  });

  it.each(profiles.rectangular_aperture)('rectangle $width_over_fwhm × $height_over_fwhm', (row) => {
    expectRelative(gaussianRectangleFraction(row.width_over_fwhm, row.height_over_fwhm), row.gaussian);
  });

  it.each(profiles.peak_pixel_fraction)('central pixel of $pixel_over_fwhm FWHM', (row) => {
    expectRelative(gaussianPeakPixelFraction(row.pixel_over_fwhm), row.gaussian_centred_pixel);
  });

  it('has its best radii where they belong', () => {
    const best = profiles.optimum_radius_over_fwhm;
    expectRelative(OPTIMUM_RADIUS_OVER_FWHM, best.gaussian.r_over_fwhm);
    expectRelative(optimumRadiusOverFwhm(gaussianEncircledFraction), best.gaussian.r_over_fwhm);
    expectRelative(gaussianEncircledFraction(OPTIMUM_RADIUS_OVER_FWHM), best.gaussian.encircled_energy);
    for (const [beta, row] of [
      [2.5, best['moffat_2.5']],
      [4.765, best['moffat_4.765']],
    ] as const) {
      const radius = optimumRadiusOverFwhm((x) => moffatEncircledFraction(x, beta));
      expectRelative(radius, row.r_over_fwhm);
      expectRelative(moffatEncircledFraction(radius, beta), row.encircled_energy);
    }
  });

  it('has the right width constants', () => {
    expectRelative(GAUSSIAN_SIGMA_OVER_FWHM, profiles.gaussian_sigma_over_fwhm);
    expectRelative(GAUSSIAN_NOISE_EQUIVALENT_AREA_OVER_FWHM2, profiles.gaussian_noise_equivalent_area_over_fwhm2);
    expectRelative(moffatAlphaOverFwhm(2.5), profiles.moffat_alpha_over_fwhm['moffat_2.5']);
    expectRelative(moffatAlphaOverFwhm(4.765), profiles.moffat_alpha_over_fwhm['moffat_4.765']);
  });
});

describe('imaging chains', () => {
  it.each(reference.imaging)('$id', (row) => {
    const { input } = row;
    const at = (name: string): number => field(input, name);
    const areaM2 = collectingAreaM2(at('diameter_m'), at('obstruction_m'));
    const atmosphere = 10 ** (-0.4 * at('extinction_mag_airmass') * at('airmass'));
    const [low, high] = [at('lambda1_A') / 10, at('lambda2_A') / 10];
    const pixelArea = at('pixel_arcsec') ** 2;
    const sky = photonRateBoxBandPerM2(at('sky_AB_arcsec2'), low, high) * areaM2 * at('throughput') * pixelArea;
    const isPoint = input.kind === 'point';
    const magnitude = isPoint ? at('mag_AB') : at('mag_AB_arcsec2') - 2.5 * Math.log10(at('area_arcsec2'));
    const total = photonRateBoxBandPerM2(magnitude, low, high) * areaM2 * at('throughput') * atmosphere;
    const apertureArea = isPoint ? Math.PI * at('aperture_radius_arcsec') ** 2 : at('area_arcsec2');
    const pixels = apertureArea / pixelArea;
    const fraction = isPoint ? gaussianEncircledFraction(at('aperture_radius_arcsec') / at('fwhm_arcsec')) : 1;
    const peak = isPoint ? total * gaussianPeakPixelFraction(at('pixel_arcsec') / at('fwhm_arcsec')) : total / pixels;
    const budget: NoiseBudget = {
      sourceElectronsPerSecond: total * fraction,
      backgroundElectronsPerSecondPerPixel: sky + at('dark_e_s_pix'),
      readVarianceElectrons2: readVariance(at('read_noise_e')),
      effectivePixelCount: pixels,
    };
    expectRelative(areaM2 * 1e4, row['collecting_area_cm2']);
    expectRelative(total, row['source_e_s_total']);
    expectRelative(fraction, row['aperture_fraction']);
    expectRelative(pixels, row['npix']);
    expectRelative(sky, row['sky_e_s_pix']);
    expectRelative(peak + sky + at('dark_e_s_pix'), row['peak_pixel_e_s_with_sky']);
    expectRelative(signalToNoise(budget, at('time_s'), at('nexp')), row['snr']);
    expectRelative(openShutterSecondsFor(budget, at('target_snr'), at('nexp')), row['time_for_target_snr_s']);
    if (isPoint) {
      const limit = limitingMagnitude(at('mag_AB'), budget, 5, at('time_s'), at('nexp'));
      expectRelative(limit, row['limiting_mag_AB_5sigma']);
    }
  });
});

describe('spectroscopic chains', () => {
  it.each(reference.spectra)('$id', (row) => {
    const { input } = row;
    const at = (name: string): number => field(input, name);
    const areaM2 = collectingAreaM2(at('diameter_m'), at('obstruction_m'));
    const collected = areaM2 * at('throughput');
    const atmosphere = 10 ** (-0.4 * at('extinction_mag_airmass') * at('airmass'));
    const wavelengthNm = at('lambda_A') / 10;
    const elementNm = wavelengthNm / at('R');
    const slit = gaussianSlitFraction(at('slit_arcsec') / at('fwhm_arcsec'));
    const extraction = gaussianSlitFraction(at('extraction_arcsec') / at('fwhm_arcsec'));
    const isLine = input.kind === 'line';
    const elements = isLine ? Math.hypot(1, at('line_fwhm_km_s') / resolutionFwhmKmS(at('R'))) : 1;
    const photons = isLine
      ? photonRateOfLinePerM2(at('flux_cgs'), wavelengthNm)
      : photonRatePerM2PerNm(at('mag_AB'), wavelengthNm) * elementNm;
    const source = photons * collected * atmosphere * slit * extraction;
    const pixelsPerElement = (at('extraction_arcsec') / at('pixel_arcsec')) * at('pixels_per_resolution_element');
    const skyPerElement =
      photonRatePerM2PerNm(at('sky_AB_arcsec2'), wavelengthNm) *
      elementNm *
      collected *
      at('slit_arcsec') *
      at('extraction_arcsec');
    const budget: NoiseBudget = {
      sourceElectronsPerSecond: source,
      backgroundElectronsPerSecondPerPixel: skyPerElement / pixelsPerElement + at('dark_e_s_pix'),
      readVarianceElectrons2: readVariance(at('read_noise_e')),
      effectivePixelCount: pixelsPerElement * elements,
    };
    expectRelative(elementNm * 10, row['resolution_element_A']);
    expectRelative(areaM2 * 1e4, row['collecting_area_cm2']);
    expectRelative(slit, row['slit_fraction']);
    expectRelative(extraction, row['extraction_fraction']);
    expectRelative(pixelsPerElement * elements, row['pixels_in_sum']);
    expectRelative(elements, row['resolution_elements_in_sum']);
    expectRelative(source, row['source_e_s']);
    expectRelative(skyPerElement * elements, row['sky_e_s_in_sum']);
    const snr = signalToNoise(budget, at('time_s'), at('nexp'));
    expectRelative(snr, row['snr']);
    expectRelative(openShutterSecondsFor(budget, at('target_snr'), at('nexp')), row['time_for_target_snr_s']);
    if (!isLine) expectRelative(snr / Math.sqrt(at('pixels_per_resolution_element')), row['snr_per_pixel_column']);
  });
});
