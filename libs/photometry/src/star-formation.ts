import { SPEED_OF_LIGHT, type Constant } from './constants.js';
import { requirePositive } from './domain.js';

/** A published calibration, by author and year. */
export type StarFormationCalibrationId = 'kennicutt1998' | 'kennicuttEvans2012' | 'madauDickinson2014';

/** A relation between a star-formation rate and its light. */
export interface StarFormationCalibration {
  readonly id: StarFormationCalibrationId;
  /** The star-formation rate means nothing without the initial mass function it was derived with. */
  readonly initialMassFunction: 'Salpeter' | 'Kroupa';
  /** Hα luminosity in erg s⁻¹ of 1 solar mass per year; absent: not calibrated by this source. */
  readonly hydrogenAlphaErgSPerSolarMassYr?: number;
  /** Far-ultraviolet luminosity in erg s⁻¹ Hz⁻¹ at 1500 Å of 1 solar mass per year. */
  readonly ultravioletErgSHzPerSolarMassYr: number;
  readonly reference: string;
}

/** Frequency of 1500 Å. */
const ULTRAVIOLET_FREQUENCY_HZ = SPEED_OF_LIGHT.value / 150e-9;

/** Linear relations between star-formation rate and light, without dust. Population averages, good to about 0.2–0.3 dex. */
export const STAR_FORMATION_CALIBRATIONS: Readonly<Record<StarFormationCalibrationId, StarFormationCalibration>> = {
  kennicutt1998: {
    id: 'kennicutt1998',
    initialMassFunction: 'Salpeter',
    hydrogenAlphaErgSPerSolarMassYr: 1 / 7.9e-42,
    ultravioletErgSHzPerSolarMassYr: 1 / 1.4e-28,
    reference: 'Kennicutt 1998, ARA&A 36, 189',
  },
  kennicuttEvans2012: {
    id: 'kennicuttEvans2012',
    initialMassFunction: 'Kroupa',
    hydrogenAlphaErgSPerSolarMassYr: 10 ** 41.27,
    ultravioletErgSHzPerSolarMassYr: 10 ** 43.35 / ULTRAVIOLET_FREQUENCY_HZ,
    reference: 'Kennicutt & Evans 2012, ARA&A 50, 531, Table 1 (log νL_ν = 43.35, taken at 1500 Å)',
  },
  madauDickinson2014: {
    id: 'madauDickinson2014',
    initialMassFunction: 'Salpeter',
    ultravioletErgSHzPerSolarMassYr: 1 / 1.15e-28,
    reference: 'Madau & Dickinson 2014, ARA&A 52, 415',
  },
};

/** Lyα over Hα in case B recombination, before any escape fraction or intergalactic absorption. */
export const LYMAN_ALPHA_OVER_H_ALPHA: Constant = {
  name: 'Lyα/Hα, case B',
  symbol: '',
  value: 8.7,
  unit: '',
  reference: 'as commonly used after Brocklehurst 1971, MNRAS 153, 471 (cited from memory)',
};

/** Hα luminosity in erg s⁻¹ of a star-formation rate in solar masses per year. */
export function hydrogenAlphaFromStarFormation(
  starFormationSolarMassYr: number,
  calibrationId: 'kennicutt1998' | 'kennicuttEvans2012',
): number {
  return starFormationSolarMassYr * hydrogenAlphaPerSolarMassYr(calibrationId);
}

/** Star-formation rate in solar masses per year of an Hα luminosity in erg s⁻¹. */
export function starFormationFromHydrogenAlpha(
  lineLuminosityErgS: number,
  calibrationId: 'kennicutt1998' | 'kennicuttEvans2012',
): number {
  return lineLuminosityErgS / hydrogenAlphaPerSolarMassYr(calibrationId);
}

function hydrogenAlphaPerSolarMassYr(calibrationId: 'kennicutt1998' | 'kennicuttEvans2012'): number {
  const value = STAR_FORMATION_CALIBRATIONS[calibrationId].hydrogenAlphaErgSPerSolarMassYr ?? NaN;
  requirePositive('hydrogenAlphaErgSPerSolarMassYr', value);
  return value;
}

/** Far-ultraviolet luminosity in erg s⁻¹ Hz⁻¹ of a star-formation rate, without dust. */
export function ultravioletFromStarFormation(
  starFormationSolarMassYr: number,
  calibrationId: StarFormationCalibrationId,
): number {
  return starFormationSolarMassYr * STAR_FORMATION_CALIBRATIONS[calibrationId].ultravioletErgSHzPerSolarMassYr;
}

/** Star-formation rate of a far-ultraviolet luminosity in erg s⁻¹ Hz⁻¹, without dust. */
export function starFormationFromUltraviolet(
  luminosityErgSHz: number,
  calibrationId: StarFormationCalibrationId,
): number {
  return luminosityErgSHz / STAR_FORMATION_CALIBRATIONS[calibrationId].ultravioletErgSHzPerSolarMassYr;
}
