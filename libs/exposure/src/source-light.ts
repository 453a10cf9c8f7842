/** From what the investigator knows to the light that arrives above the atmosphere. */
import {
  AB_ZERO_PHOTONS_PER_M2_S,
  CM_PER_MPC,
  LYMAN_ALPHA_NM,
  LYMAN_LIMIT_NM,
  lensingMag,
  photonRateOfLinePerM2,
  powerLawColourMag,
  redshiftBandwidthMag,
} from '@faintward/photometry';
import { OPAQUE_FOREST_REDSHIFT } from './constants.js';
import { stepInput, type LightBudget } from './light-budget.js';
import type { TargetDistance } from './distances.js';
import type { EstimateWarning, InfeasibleReason, InstrumentMode, Target } from './types.js';

/** What is counted together: the band when imaging, one resolution element when taking a spectrum. */
export interface CountedRange {
  /** Middle of the range in ln λ; of a line: the line. */
  wavelengthNm: number;
  lowNm: number;
  highNm: number;
  /** Δ ln λ: photons of a flat f_ν are uniform in it. */
  logWidth: number;
}

const FLAT_SLOPE_BETA = -2;
/** Rest wavelength of the Balmer jump; one power law does not describe both sides of it. */
const BALMER_JUMP_NM = 364.6;
const TEN_PARSEC_MPC = 1e-5;

/**
 * Wavelength range that the goal's sum covers.
 *
 * @returns a reason when the wanted line or wavelength lies outside the mode's range
 */
export function countedRange(
  target: Target,
  mode: InstrumentMode,
  wantedWavelengthNm: number | undefined,
): CountedRange | InfeasibleReason {
  const { wavelengthLowNm, wavelengthHighNm } = mode;
  const middleNm = Math.sqrt(wavelengthLowNm * wavelengthHighNm);
  const { light } = target;
  let wavelengthNm = middleNm;
  if (light.kind === 'lineFlux' || light.kind === 'lineLuminosity') {
    wavelengthNm = light.restWavelengthNm * (1 + target.redshift);
    if (wavelengthNm < wavelengthLowNm || wavelengthNm > wavelengthHighNm) {
      return {
        code: 'lineOutsideBand',
        message: `The line falls at ${wavelengthNm.toFixed(1)} nm, outside ${wavelengthLowNm} to ${wavelengthHighNm} nm.`,
      };
    }
  } else if (mode.kind === 'slitSpectroscopy' && wantedWavelengthNm !== undefined) {
    wavelengthNm = wantedWavelengthNm;
    if (wavelengthNm < wavelengthLowNm || wavelengthNm > wavelengthHighNm) {
      return {
        code: 'wavelengthOutsideBand',
        message: `${wavelengthNm} nm is outside the mode's ${wavelengthLowNm} to ${wavelengthHighNm} nm.`,
      };
    }
  }
  if (mode.kind === 'imaging') {
    return {
      wavelengthNm,
      lowNm: wavelengthLowNm,
      highNm: wavelengthHighNm,
      logWidth: Math.log(wavelengthHighNm / wavelengthLowNm),
    };
  }
  const halfElement = Math.exp(0.5 / mode.resolvingPower);
  return {
    wavelengthNm,
    lowNm: wavelengthNm / halfElement,
    highNm: wavelengthNm * halfElement,
    logWidth: 1 / mode.resolvingPower,
  };
}

/**
 * Adds the steps from the given light to the light above the atmosphere.
 *
 * @param distanceOf  asked only where a luminosity is given
 * @returns a reason when no light is left, else undefined
 */
export function addSourceSteps(
  budget: LightBudget,
  target: Target,
  distanceOf: () => TargetDistance,
  mode: InstrumentMode,
  range: CountedRange,
  warnings: EstimateWarning[],
): InfeasibleReason | undefined {
  const { light, redshift } = target;
  let reason: InfeasibleReason | undefined;
  switch (light.kind) {
    case 'apparentMagnitude': {
      budget.add('apparent-magnitude', light.magnitudeAb, [stepInput('magnitudeAb', light.magnitudeAb, 'mag')]);
      const slopeBeta = light.slopeBeta ?? FLAT_SLOPE_BETA;
      if (light.wavelengthNm === undefined) {
        if (mode.kind === 'slitSpectroscopy' && slopeBeta !== FLAT_SLOPE_BETA) {
          const reference = range.wavelengthNm;
          addSlope(
            budget,
            powerLawColourMag(slopeBeta, reference, range.lowNm, range.highNm) -
              powerLawColourMag(slopeBeta, reference, mode.wavelengthLowNm, mode.wavelengthHighNm),
            slopeBeta,
            reference,
          );
        }
        // A magnitude measured in this very band already contains whatever hydrogen takes from it.
        reason = redshift > 0 ? checkHydrogenOfMeasuredBand(redshift, range, warnings) : undefined;
      } else {
        addSlope(
          budget,
          powerLawColourMag(slopeBeta, light.wavelengthNm, range.lowNm, range.highNm),
          slopeBeta,
          light.wavelengthNm,
        );
        reason = redshift > 0 ? addHydrogen(budget, redshift, slopeBeta, range, warnings) : undefined;
      }
      break;
    }
    case 'absoluteMagnitude': {
      const slopeBeta = light.slopeBeta ?? FLAT_SLOPE_BETA;
      const { absoluteMagnitudeAb, restWavelengthNm } = light;
      budget.add('absolute-magnitude', absoluteMagnitudeAb, [
        stepInput('absoluteMagnitudeAb', absoluteMagnitudeAb, 'mag'),
        stepInput('restWavelengthNm', restWavelengthNm, 'nm'),
      ]);
      addDistanceModulus(budget, redshift, distanceOf());
      budget.add('redshift-bandwidth', redshiftBandwidthMag(redshift), [stepInput('redshift', redshift)]);
      const givenAtNm = restWavelengthNm * (1 + redshift);
      addSlope(budget, powerLawColourMag(slopeBeta, givenAtNm, range.lowNm, range.highNm), slopeBeta, givenAtNm);
      warnOfExtrapolation(restWavelengthNm, redshift, range, warnings);
      reason = addHydrogen(budget, redshift, slopeBeta, range, warnings);
      break;
    }
    case 'lineFlux':
      budget.add('line-flux', lineMagnitude(light.lineFluxErgSCm2, range), [
        stepInput('lineFluxErgSCm2', light.lineFluxErgSCm2, 'erg/s/cm²'),
        stepInput('wavelengthNm', range.wavelengthNm, 'nm'),
        stepInput('logWidth', range.logWidth),
      ]);
      reason = checkHydrogenOfLine(light.restWavelengthNm, redshift, warnings);
      break;
    case 'lineLuminosity': {
      const sphereCm2 = 4 * Math.PI * (TEN_PARSEC_MPC * CM_PER_MPC) ** 2;
      budget.add('line-luminosity', lineMagnitude(light.lineLuminosityErgS / sphereCm2, range), [
        stepInput('lineLuminosityErgS', light.lineLuminosityErgS, 'erg/s'),
        stepInput('wavelengthNm', range.wavelengthNm, 'nm'),
        stepInput('logWidth', range.logWidth),
      ]);
      addDistanceModulus(budget, redshift, distanceOf());
      reason = checkHydrogenOfLine(light.restWavelengthNm, redshift, warnings);
      break;
    }
  }
  // Lensing conserves surface brightness, so a patch given per arcsec² is not brightened.
  if (reason === undefined && target.magnification !== undefined && target.extent.kind !== 'uniform') {
    budget.add('lensing', lensingMag(target.magnification), [stepInput('magnification', target.magnification)]);
  }
  return reason;
}

function addDistanceModulus(budget: LightBudget, redshift: number, distance: TargetDistance): void {
  budget.add('distance-modulus', distance.distanceModulusMag, [
    stepInput('redshift', redshift),
    stepInput('luminosityDistanceMpc', distance.luminosityDistanceMpc, 'Mpc'),
  ]);
}

function addSlope(budget: LightBudget, deltaMag: number, slopeBeta: number, givenAtNm: number): void {
  budget.add('spectral-slope', deltaMag, [stepInput('slopeBeta', slopeBeta), stepInput('givenAtNm', givenAtNm, 'nm')]);
}

/** AB magnitude of a flat spectrum with as many photons in the range as the line has. */
function lineMagnitude(lineFluxErgSCm2: number, range: CountedRange): number {
  const photons = photonRateOfLinePerM2(lineFluxErgSCm2, range.wavelengthNm);
  return -2.5 * Math.log10(photons / (AB_ZERO_PHOTONS_PER_M2_S * range.logWidth));
}

/** Rest wavelength below which no light is let through at a redshift. */
function opaqueBelowRestNm(redshift: number): number {
  return redshift >= OPAQUE_FOREST_REDSHIFT.value ? LYMAN_ALPHA_NM : LYMAN_LIMIT_NM;
}

function noFlux(edgeNm: number): InfeasibleReason {
  return {
    code: 'noFluxInBand',
    message: `Neutral hydrogen takes all light below ${edgeNm.toFixed(1)} nm at this redshift: nothing is left here.`,
  };
}

/**
 * First approximation of intergalactic hydrogen: nothing below the Lyman limit, nothing below Lyα from z = 6 on, all
 * of the light elsewhere. Below z = 6 this is optimistic between the Lyman limit and Lyα; a warning says so.
 */
function addHydrogen(
  budget: LightBudget,
  redshift: number,
  slopeBeta: number,
  range: CountedRange,
  warnings: EstimateWarning[],
): InfeasibleReason | undefined {
  const edgeNm = opaqueBelowRestNm(redshift) * (1 + redshift);
  if (edgeNm >= range.highNm) return noFlux(edgeNm);
  if (edgeNm > range.lowNm) {
    const reference = range.wavelengthNm;
    const left = powerLawColourMag(slopeBeta, reference, edgeNm, range.highNm);
    const whole = powerLawColourMag(slopeBeta, reference, range.lowNm, range.highNm);
    const widthShare = Math.log(range.highNm / edgeNm) / range.logWidth;
    budget.add('hydrogen-absorption', left - whole - 2.5 * Math.log10(widthShare), [
      stepInput('redshift', redshift),
      stepInput('edgeNm', edgeNm, 'nm'),
    ]);
    warnings.push({
      code: 'bandPartlyAbsorbed',
      message: `Light below ${edgeNm.toFixed(1)} nm is treated as absorbed by hydrogen; the real edge is not sharp.`,
    });
  }
  warnOfForest(redshift, range, warnings);
  return undefined;
}

function checkHydrogenOfMeasuredBand(
  redshift: number,
  range: CountedRange,
  warnings: EstimateWarning[],
): InfeasibleReason | undefined {
  const edgeNm = opaqueBelowRestNm(redshift) * (1 + redshift);
  if (edgeNm >= range.highNm) return noFlux(edgeNm);
  if (edgeNm > range.lowNm) {
    warnings.push({
      code: 'bandPartlyAbsorbed',
      message: `Hydrogen absorbs below ${edgeNm.toFixed(1)} nm; the magnitude is taken to be measured in this band.`,
    });
  }
  return undefined;
}

function warnOfForest(redshift: number, range: CountedRange, warnings: EstimateWarning[]): void {
  const lymanAlphaNm = LYMAN_ALPHA_NM * (1 + redshift);
  if (redshift >= OPAQUE_FOREST_REDSHIFT.value || lymanAlphaNm <= range.lowNm) return;
  warnings.push({
    code: 'lymanAlphaInBand',
    message: `Below Lyα at ${lymanAlphaNm.toFixed(1)} nm the intergalactic medium absorbs more than is allowed for here.`,
  });
}

function checkHydrogenOfLine(
  restWavelengthNm: number,
  redshift: number,
  warnings: EstimateWarning[],
): InfeasibleReason | undefined {
  const edgeRestNm = opaqueBelowRestNm(redshift);
  // Lyα itself is at the edge, not below it; a line list may give it in one decimal less.
  const margin = 1e-4 * edgeRestNm;
  if (restWavelengthNm < edgeRestNm - margin) return noFlux(edgeRestNm * (1 + redshift));
  if (redshift > 0 && restWavelengthNm <= LYMAN_ALPHA_NM + margin) {
    warnings.push({
      code: 'lymanAlphaInBand',
      message:
        'The flux of Lyα and bluer lines must be what is left after the intergalactic medium; nothing is taken off.',
    });
  }
  return undefined;
}

function warnOfExtrapolation(
  restWavelengthNm: number,
  redshift: number,
  range: CountedRange,
  warnings: EstimateWarning[],
): void {
  const lowest = Math.min(restWavelengthNm, range.lowNm / (1 + redshift));
  const highest = Math.max(restWavelengthNm, range.highNm / (1 + redshift));
  if (lowest >= BALMER_JUMP_NM || highest <= BALMER_JUMP_NM) return;
  warnings.push({
    code: 'powerLawExtrapolated',
    message: 'One power law is drawn across the Balmer jump (365 nm, rest): the magnitude in the band is a guess.',
  });
}
