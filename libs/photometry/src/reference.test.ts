/**
 * Check values of tests/reference/magnitudes.json and the photon part of snr.json (astropy 5.2.1 distances, closed
 * formulas in 40 digits). Tolerance 1e-9 relative, 1e-8 mag: both sides are closed formulas on the same distances.
 */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { photometryFiles } from '../../../tests/factories/photometry-files.js';
import * as photometry from './index.js';

interface KRow {
  cosmology: string;
  z: number;
  absolute_mag: number;
  distance_modulus: number;
  apparent_AB_flat_fnu: number;
  power_law_nu: { alpha: number; K: number; apparent_AB_same_band: number }[];
  uv_beta: { beta: number; alpha: number; apparent_AB_at_1500A_rest: number; apparent_AB_at_2000A_rest: number }[];
}
interface SfrRow {
  sfr_Msun_yr: number;
  L_Ha_kennicutt1998: number;
  L_Ha_kennicutt_evans2012: number;
  L_nu_UV_kennicutt1998: number;
  M_AB_UV_kennicutt1998: number;
  L_nu_1500_kennicutt_evans2012_FUV: number;
  M_AB_1500_kennicutt_evans2012: number;
  L_nu_UV_madau_dickinson2014: number;
  M_AB_UV_madau_dickinson2014: number;
  [key: string]: number;
}
interface Magnitudes {
  k_correction: KRow[];
  surface_brightness_dimming: Record<string, number>[];
  line_luminosity: ({ cosmology: string } & Record<string, number | string>)[];
  sfr: { rows: SfrRow[]; M_AB_to_L_nu: { M_AB: number; L_nu_erg_s_Hz: number }[]; M_AB_of_1_erg_s_Hz: number };
  angular_sizes: { cosmology: string; z: number; size_kpc: number; angle_arcsec: number }[];
  velocity: {
    redshift_difference: { dv_km_s: number; z: number; dz_exact_first_order: number }[];
    resolution: { R: number; fwhm_km_s: number; sigma_km_s: number; fwhm_A_at_9000A: number }[];
    special_relativistic_beta_for_local_velocities: { z: number; beta_relativistic_doppler: number }[];
  };
  lines: {
    line: string;
    vacuum_A: number;
    spread_A: number;
    air_ciddor1996_A?: number;
    air_morton1991_A?: number;
    air_morton2000_A?: number;
    air_quoted_in_public_lists_A?: number | null;
  }[];
  observed_lines: { line: string; z: number; observed_vacuum_A: number; observed_air_ciddor1996_A: number | null }[];
  air_vacuum_examples: { what: string; quoted: number; recomputed: number }[];
  box_band_k_correction: { alpha: number; z: number; K: number }[];
}

function read<T>(name: string): T {
  return JSON.parse(readFileSync(new URL(`../../../tests/reference/${name}`, import.meta.url), 'utf8')) as T;
}

const lines = photometry.createLines(photometryFiles().lines);
const vacuumWavelengthNm = (id: string): number => lines.find((line) => line.id === id)!.vacuumWavelengthNm;
const magnitudes = read<Magnitudes>('magnitudes.json');

function expectRelative(actual: number, expected: number, tolerance = 1e-9): void {
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(tolerance * Math.abs(expected));
}
function expectMag(actual: number, expected: number): void {
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(1e-8);
}
/** The distance that belongs to a modulus: the file gives moduli, not distances. */
function distanceMpc(modulus: number): number {
  return 10 ** (modulus / 5 - 5);
}
const modulusOf = new Map(magnitudes.k_correction.map((row) => [`${row.cosmology} ${row.z}`, row.distance_modulus]));

describe('apparent magnitudes from absolute ones', () => {
  it.each(magnitudes.k_correction)('agree for M = $absolute_mag at z = $z in $cosmology', (row) => {
    expectMag(
      photometry.apparentMagnitudeAtRestWavelength(row.absolute_mag, row.distance_modulus, row.z),
      row.apparent_AB_flat_fnu,
    );
    for (const each of row.power_law_nu) {
      expectMag(photometry.powerLawKCorrectionMag(each.alpha, row.z), each.K);
      const apparent = photometry.apparentMagnitudeInSameBand(
        row.absolute_mag,
        row.distance_modulus,
        each.alpha,
        row.z,
      );
      expectMag(apparent, each.apparent_AB_same_band);
    }
    for (const each of row.uv_beta) {
      const at1500 = photometry.apparentMagnitudeAtRestWavelength(row.absolute_mag, row.distance_modulus, row.z);
      expect(photometry.frequencySlopeFromWavelengthSlope(each.beta)).toBeCloseTo(each.alpha, 14);
      expectMag(at1500, each.apparent_AB_at_1500A_rest);
      expectMag(at1500 + photometry.powerLawMagnitudeChange(each.beta, 150, 200), each.apparent_AB_at_2000A_rest);
    }
  });

  it.each(magnitudes.box_band_k_correction)('K of alpha = $alpha at z = $z does not depend on the band', (row) => {
    expectMag(photometry.powerLawKCorrectionMag(row.alpha, row.z), row.K);
    // The same through the band integral: the band average of the observed spectrum minus that of the rest spectrum.
    const beta = photometry.wavelengthSlopeFromFrequencySlope(row.alpha);
    const [lowNm, highNm, referenceNm] = [550, 700, 600];
    const observed = photometry.powerLawColourMag(beta, referenceNm * (1 + row.z), lowNm, highNm);
    const rest = photometry.powerLawColourMag(beta, referenceNm, lowNm, highNm);
    expectMag(observed + photometry.redshiftBandwidthMag(row.z) - rest, row.K);
  });
});

describe('surface-brightness dimming', () => {
  it.each(magnitudes.surface_brightness_dimming)('agrees in its four conventions at z = $z', (row) => {
    const at = (convention: photometry.DimmingConvention): number =>
      photometry.surfaceBrightnessDimmingMag(row['z'] ?? NaN, convention);
    expectMag(at('bolometric'), row['bolometric_mag'] ?? NaN);
    expectMag(at('perUnitFrequency'), row['per_unit_frequency_mag'] ?? NaN);
    expectMag(at('perUnitWavelength'), row['per_unit_wavelength_mag'] ?? NaN);
    expectMag(at('photonRate'), row['photon_rate_bolometric_mag'] ?? NaN);
  });
});

describe('lines', () => {
  it.each(magnitudes.line_luminosity)('flux $flux_cgs at z = $z in $cosmology has the right luminosity', (row) => {
    const distance = distanceMpc(modulusOf.get(`${row.cosmology} ${row['z']}`) ?? NaN);
    const luminosity = photometry.lineLuminosityFromFlux(Number(row['flux_cgs']), distance);
    expectRelative(luminosity, Number(row['luminosity_erg_s']));
    expectRelative(photometry.lineFluxFromLuminosity(luminosity, distance), Number(row['flux_cgs']));
    expectRelative(Math.log10(luminosity), Number(row['log10_luminosity']));
    expectRelative(
      photometry.starFormationFromHydrogenAlpha(luminosity, 'kennicutt1998'),
      Number(row['sfr_if_Ha_kennicutt1998']),
    );
    expectRelative(
      photometry.starFormationFromHydrogenAlpha(luminosity, 'kennicuttEvans2012'),
      Number(row['sfr_if_Ha_kennicutt_evans2012']),
    );
    expectRelative(
      photometry.starFormationFromHydrogenAlpha(
        luminosity / photometry.LYMAN_ALPHA_OVER_H_ALPHA.value,
        'kennicutt1998',
      ),
      Number(row['sfr_if_Lya_caseB_8.7_kennicutt1998']),
    );
  });

  it.each(magnitudes.lines)('$line has the listed rest wavelength', (row) => {
    const vacuumNm = vacuumWavelengthNm(row.line);
    expect(Math.abs(vacuumNm * 10 - row.vacuum_A)).toBeLessThanOrEqual(row.spread_A);
    if (row.air_ciddor1996_A === undefined) return;
    expectRelative(photometry.airFromVacuumNm(row.vacuum_A / 10, 'ciddor1996') * 10, row.air_ciddor1996_A, 1e-12);
    expectRelative(
      photometry.airFromVacuumNm(row.vacuum_A / 10, 'morton1991') * 10,
      row.air_morton1991_A ?? NaN,
      1e-12,
    );
    expectRelative(
      photometry.airFromVacuumNm(row.vacuum_A / 10, 'morton2000') * 10,
      row.air_morton2000_A ?? NaN,
      1e-12,
    );
    if (row.air_quoted_in_public_lists_A == null) return;
    // The lists print two decimals, and differ among each other by the spread.
    const offset = Math.abs(photometry.airFromVacuumNm(vacuumNm) * 10 - row.air_quoted_in_public_lists_A);
    expect(offset).toBeLessThanOrEqual(row.spread_A + 0.006);
  });

  it('lists every line of the reference and no other', () => {
    expect(lines.map((line) => line.id).sort()).toEqual(magnitudes.lines.map((row) => row.line).sort());
  });

  it.each(magnitudes.observed_lines)('$line at z = $z is observed where it should be', (row) => {
    const observedNm = photometry.observedWavelengthNm(vacuumWavelengthNm(row.line), row.z);
    expectRelative(observedNm * 10, row.observed_vacuum_A);
    if (row.observed_air_ciddor1996_A !== null) {
      expectRelative(photometry.airFromVacuumNm(observedNm) * 10, row.observed_air_ciddor1996_A, 1e-11);
    }
  });

  it.each(magnitudes.air_vacuum_examples)('$what', (row) => {
    const recomputed = row.what.startsWith('vacuum')
      ? photometry.airFromVacuumNm(200) * 10
      : photometry.vacuumFromAirNm(605.6125) * 10;
    expectRelative(recomputed, row.recomputed, 1e-12);
    // The documentation quoted here prints three and four decimals.
    expect(Math.abs(recomputed - row.quoted)).toBeLessThan(5.5e-4);
  });
});

describe('star-formation rates', () => {
  it.each(magnitudes.sfr.rows)('light of $sfr_Msun_yr solar masses a year', (row) => {
    const rate = row.sfr_Msun_yr;
    expectRelative(photometry.hydrogenAlphaFromStarFormation(rate, 'kennicutt1998'), row.L_Ha_kennicutt1998);
    expectRelative(photometry.hydrogenAlphaFromStarFormation(rate, 'kennicuttEvans2012'), row.L_Ha_kennicutt_evans2012);
    const lyman =
      photometry.LYMAN_ALPHA_OVER_H_ALPHA.value * photometry.hydrogenAlphaFromStarFormation(rate, 'kennicutt1998');
    expectRelative(lyman, row['L_Lya_caseB_8.7_kennicutt1998'] ?? NaN);
    const cases = [
      ['kennicutt1998', row.L_nu_UV_kennicutt1998, row.M_AB_UV_kennicutt1998],
      ['kennicuttEvans2012', row.L_nu_1500_kennicutt_evans2012_FUV, row.M_AB_1500_kennicutt_evans2012],
      ['madauDickinson2014', row.L_nu_UV_madau_dickinson2014, row.M_AB_UV_madau_dickinson2014],
    ] as const;
    for (const [calibration, luminosity, magnitude] of cases) {
      const computed = photometry.ultravioletFromStarFormation(rate, calibration);
      expectRelative(computed, luminosity);
      expectMag(photometry.absoluteMagnitudeFromLuminosityDensity(computed), magnitude);
      expectRelative(photometry.starFormationFromUltraviolet(computed, calibration), rate);
    }
  });

  it.each(magnitudes.sfr.M_AB_to_L_nu)('M = $M_AB is a luminosity density', (row) => {
    expectRelative(photometry.luminosityDensityFromAbsoluteMagnitude(row.M_AB), row.L_nu_erg_s_Hz);
  });

  it('puts 1 erg/s/Hz at the right absolute magnitude', () => {
    expectMag(photometry.absoluteMagnitudeFromLuminosityDensity(1), magnitudes.sfr.M_AB_of_1_erg_s_Hz);
  });
});

describe('sizes and velocities', () => {
  it.each(magnitudes.angular_sizes)('$size_kpc kpc at z = $z in $cosmology', (row) => {
    const distance = distanceMpc(modulusOf.get(`${row.cosmology} ${row.z}`) ?? NaN) / (1 + row.z) ** 2;
    const kpcPerArcsec = distance * 1000 * (Math.PI / 648_000);
    expectRelative(photometry.arcsecFromKpc(row.size_kpc, kpcPerArcsec), row.angle_arcsec);
    expectRelative(photometry.kpcFromArcsec(row.angle_arcsec, kpcPerArcsec), row.size_kpc);
  });

  it.each(magnitudes.velocity.redshift_difference)('$dv_km_s km/s at z = $z', (row) => {
    expectRelative(photometry.redshiftDifferenceOfVelocity(row.dv_km_s, row.z), row.dz_exact_first_order);
  });

  it.each(magnitudes.velocity.resolution)('resolving power $R', (row) => {
    const fwhm = photometry.resolutionFwhmKmS(row.R);
    expectRelative(fwhm, row.fwhm_km_s);
    expectRelative(photometry.gaussianSigmaFromFwhm(fwhm), row.sigma_km_s);
  });

  it.each(magnitudes.velocity.special_relativistic_beta_for_local_velocities)('Doppler shift $z', (row) => {
    expectRelative(photometry.velocityFractionOfDopplerRedshift(row.z), row.beta_relativistic_doppler);
  });
});

interface PhotonReference {
  photons: {
    numbers: { what: string; value: number }[];
    box_bands: {
      mag_AB: number;
      lambda1_A: number;
      lambda2_A: number;
      photons_s_cm2_exact_box: number;
      approximation_f_nu_dlambda_over_h_lambda_mid: number;
      pivot_A: number;
    }[];
    shaped_bands: {
      mag_AB: number;
      centre_A: number;
      width_A: number;
      triangle_full_base_2w_peak_1: number;
      gaussian_fwhm_w_peak_1_cut_at_6_sigma: number;
    }[];
    AB_to_uJy: { from_AB: number; to_flux_density_uJy: number }[];
  };
}

describe('photons', () => {
  const { photons } = read<PhotonReference>('snr.json');
  const number = (start: string): number => photons.numbers.find((row) => row.what.startsWith(start))?.value ?? NaN;

  it('AB = 0 in every unit', () => {
    expectRelative(photometry.fluxDensityCgsFromAbMagnitude(0), number('AB = 0 in erg'));
    expectRelative(photometry.AB_ZERO_FLUX_DENSITY_JY, number('the same in Jy'));
    expectMag(photometry.abMagnitudeFromFluxDensityJy(3631), -number('magnitude difference if 3631 Jy'));
    expectRelative(photometry.abMagnitudeFromFluxDensityJy(1e-6), number('AB magnitude of 1 uJy'));
    expectRelative(photometry.abMagnitudeFromFluxDensityJy(1e-9), number('AB magnitude of 1 nJy'));
    expectRelative(photometry.fluxPerAngstromFromAbMagnitude(0, 550), number('f_lambda of AB = 0 at 5500 A'));
    expectRelative(photometry.photonRatePerM2PerNm(0, 550) / 1e5, number('photons s^-1 cm^-2 A^-1 of AB = 0 at 5500'));
    expectRelative(
      photometry.photonRatePerM2PerNm(0, 1000) / 1e5,
      number('photons s^-1 cm^-2 A^-1 of AB = 0 at 10000'),
    );
    const perJansky = photometry.AB_ZERO_PHOTONS_PER_M2_S / photometry.AB_ZERO_FLUX_DENSITY_JY;
    expectRelative(perJansky, number('photons s^-1 m^-2 of 1 Jy'));
    expectRelative(photometry.magnitudeErrorFromSignalToNoise(1), number('1.0857'));
    // 1 erg/s/cm² of photons of 1 Å = 0.1 nm, per m².
    expectRelative(1e4 / photometry.photonRateOfLinePerM2(1, 0.1), number('hc in erg A'));
  });

  it.each(photons.box_bands)('box band $lambda1_A–$lambda2_A Å', (row) => {
    const [low, high] = [row.lambda1_A / 10, row.lambda2_A / 10];
    expectRelative(photometry.photonRateBoxBandPerM2(row.mag_AB, low, high) / 1e4, row.photons_s_cm2_exact_box);
    expectRelative(
      photometry.photonRateNarrowBandPerM2(row.mag_AB, low, high) / 1e4,
      row.approximation_f_nu_dlambda_over_h_lambda_mid,
    );
    expectRelative(photometry.pivotWavelengthOfBoxNm(low, high) * 10, row.pivot_A);
  });

  it.each(photons.shaped_bands)('shaped bands at $centre_A Å', (row) => {
    const rate = (response: (wavelengthAngstrom: number) => number, halfBase: number): number => {
      const nodes = 40_001;
      const wavelengths = Float64Array.from(
        { length: nodes },
        (_, i) => row.centre_A + halfBase * ((2 * i) / (nodes - 1) - 1),
      );
      return (
        photometry.photonRateThroughResponsePerM2(
          row.mag_AB,
          wavelengths.map((each) => each / 10),
          wavelengths.map(response),
        ) / 1e4
      );
    };
    const sigma = photometry.gaussianSigmaFromFwhm(row.width_A);
    // Trapezoids on 40,000 intervals: (Δλ/λ)²/12 of curvature, some 1e-9.
    const triangle = rate((l) => Math.max(0, 1 - Math.abs(l - row.centre_A) / row.width_A), row.width_A);
    expectRelative(triangle, row.triangle_full_base_2w_peak_1, 1e-8);
    const gaussian = rate((l) => Math.exp(-0.5 * ((l - row.centre_A) / sigma) ** 2), 6 * sigma);
    expectRelative(gaussian, row.gaussian_fwhm_w_peak_1_cut_at_6_sigma, 1e-8);
  });

  it.each(photons.AB_to_uJy)('AB = $from_AB in µJy', (row) => {
    expectRelative(photometry.fluxDensityJyFromAbMagnitude(row.from_AB) * 1e6, row.to_flux_density_uJy);
    expectMag(photometry.abMagnitudeFromFluxDensityJy(row.to_flux_density_uJy / 1e6), row.from_AB);
  });
});
