import { OutOfDomainError, requirePositive } from './domain.js';
import { DUST_LAW_COEFFICIENTS } from './dust-coefficients.js';
import { calzetti, cardelliClaytonMathis, fitzpatrick, type LawInInverseMicron } from './dust-laws.js';

/** A published law of dust attenuation, by author and year. */
export type DustLaw = 'ccm1989' | 'fitzpatrick1999' | 'calzetti2000';

/** `dust-laws.json`: which laws there are. Their coefficients stand with their formulas in the program. */
export interface DustLawsTable {
  readonly laws: readonly DustLaw[];
}

/** What a law is, for whom and where. */
export interface DustLawDescription {
  readonly id: DustLaw;
  readonly label: string;
  readonly source: string;
  /** R_V = A(V) / E(B−V) that the law is usually taken with. */
  readonly defaultTotalToSelective: number;
  /** Where the publication, or those who use it, take the law to be valid. */
  readonly shortestNm: number;
  readonly longestNm: number;
}

/** The laws there are. */
export const DUST_LAWS: Readonly<Record<DustLaw, DustLawDescription>> = {
  ccm1989: {
    id: 'ccm1989',
    label: 'Milky Way, Cardelli et al. 1989',
    source: 'Cardelli, Clayton & Mathis 1989, ApJ 345, 245',
    defaultTotalToSelective: 3.1,
    ...rangeOfInverse(DUST_LAW_COEFFICIENTS.ccm1989.validInverseMicron),
  },
  fitzpatrick1999: {
    id: 'fitzpatrick1999',
    label: 'Milky Way, Fitzpatrick 1999',
    source: 'Fitzpatrick 1999, PASP 111, 63',
    defaultTotalToSelective: 3.1,
    ...rangeOfInverse(DUST_LAW_COEFFICIENTS.fitzpatrick1999.validInverseMicron),
  },
  calzetti2000: {
    id: 'calzetti2000',
    label: 'Star-forming galaxies, Calzetti et al. 2000',
    source: 'Calzetti et al. 2000, ApJ 533, 682',
    defaultTotalToSelective: 4.05,
    shortestNm: DUST_LAW_COEFFICIENTS.calzetti2000.validNm[0],
    longestNm: DUST_LAW_COEFFICIENTS.calzetti2000.validNm[1],
  },
};

function rangeOfInverse([low, high]: readonly [number, number]): { shortestNm: number; longestNm: number } {
  return { shortestNm: 1000 / high, longestNm: 1000 / low };
}

/** R_V for which the laws were made, generously; far outside them their formulas turn negative. */
export const TOTAL_TO_SELECTIVE_RANGE = { lowest: 2, highest: 6 } as const;

/** Slope of the near-infrared law of Cardelli et al. 1989, with which all laws are continued to long wavelengths. */
const LONG_WAVE_SLOPE = -DUST_LAW_COEFFICIENTS.ccm1989.infrared.power;

/** What Schlafly & Finkbeiner 2011 (ApJ 737, 103) measured: the SFD map exceeds true reddening by 14 %. */
export const TRUE_PER_SFD_COLOUR_EXCESS = 0.86;

/** Scale of a Galactic E(B−V): as read from the map of Schlegel, Finkbeiner & Davis 1998, or a true colour excess. */
export type ColourExcessScale = 'sfd' | 'true';

/** R_V that a law is usually taken with. */
export function defaultTotalToSelective(law: DustLaw): number {
  return DUST_LAWS[law].defaultTotalToSelective;
}

/** Whether a law is valid at a wavelength; elsewhere it is continued as {@link attenuationPerVisual} says. */
export function isDustLawValidAt(law: DustLaw, wavelengthNm: number): boolean {
  const { shortestNm, longestNm } = DUST_LAWS[law];
  return wavelengthNm >= shortestNm && wavelengthNm <= longestNm;
}

/**
 * A(λ)/A(V), the shape of a dust law. Fitzpatrick's is 0.978 at 550 nm, not 1: that is the law.
 *
 * Wavelengths are observed ones for dust of the Milky Way and rest ones for dust in the source. Accuracy against
 * the published formulas: rounding. Outside the valid range the value at the shortest wavelength is held, so that no
 * polynomial runs away, and beyond the longest it falls as λ^−1.61. Never negative.
 *
 * @param totalToSelective  R_V, 2 to 6; absent: the law's own
 * @throws {OutOfDomainError} if the wavelength is not positive or R_V is outside its range
 */
export function attenuationPerVisual(
  law: DustLaw,
  wavelengthNm: number,
  totalToSelective = defaultTotalToSelective(law),
): number {
  requirePositive('wavelengthNm', wavelengthNm);
  return shapeOf(law, totalToSelective)(wavelengthNm);
}

/** {@link attenuationPerVisual} at many wavelengths, with the law prepared once. */
export function attenuationOnNodes(law: DustLaw, totalToSelective: number, nodesNm: Float64Array): Float64Array {
  return nodesNm.map(shapeOf(law, totalToSelective));
}

/**
 * A(λ) in magnitudes: A(λ)/A(V) · R_V · E(B−V).
 *
 * @param colourExcessMag  E(B−V), 0 or more
 */
export function attenuationMag(
  law: DustLaw,
  wavelengthNm: number,
  colourExcessMag: number,
  totalToSelective = defaultTotalToSelective(law),
): number {
  requireColourExcess(colourExcessMag);
  return attenuationPerVisual(law, wavelengthNm, totalToSelective) * totalToSelective * colourExcessMag;
}

/**
 * True E(B−V) of one given on a scale: 0.86 of a value of the SFD map.
 *
 * The correction is made once, here. Coefficients A(band)/E(B−V) tabulated in the same paper are made for *uncorrected*
 * map values and contain the 0.86 already; to use them on the result of this function corrects twice, by 14 %.
 *
 * @throws {OutOfDomainError} if the colour excess is negative or not finite
 */
export function trueColourExcess(colourExcessMag: number, scale: ColourExcessScale): number {
  requireColourExcess(colourExcessMag);
  return scale === 'sfd' ? TRUE_PER_SFD_COLOUR_EXCESS * colourExcessMag : colourExcessMag;
}

/**
 * Attenuation by dust of the Milky Way in magnitudes at an observed wavelength, with the law and R_V that Schlafly &
 * Finkbeiner 2011 found to fit best.
 */
export function galacticAttenuationMag(
  observedNm: number,
  colourExcessMag: number,
  scale: ColourExcessScale,
  law: DustLaw = 'fitzpatrick1999',
  totalToSelective = defaultTotalToSelective(law),
): number {
  return attenuationMag(law, observedNm, trueColourExcess(colourExcessMag, scale), totalToSelective);
}

const LAWS: Readonly<Record<DustLaw, (totalToSelective: number) => LawInInverseMicron>> = {
  ccm1989: cardelliClaytonMathis,
  fitzpatrick1999: fitzpatrick,
  calzetti2000: calzetti,
};

/** A law as a function of wavelength everywhere. */
function shapeOf(law: DustLaw, totalToSelective: number): (wavelengthNm: number) => number {
  const { lowest, highest } = TOTAL_TO_SELECTIVE_RANGE;
  if (!(totalToSelective >= lowest && totalToSelective <= highest)) {
    throw new OutOfDomainError('totalToSelective', totalToSelective, `between ${lowest} and ${highest}`);
  }
  const inside = LAWS[law](totalToSelective);
  const { shortestNm, longestNm } = DUST_LAWS[law];
  return (wavelengthNm) => {
    const within = Math.min(Math.max(wavelengthNm, shortestNm), longestNm);
    const beyond = wavelengthNm > longestNm ? (wavelengthNm / longestNm) ** LONG_WAVE_SLOPE : 1;
    return Math.max(0, inside(1000 / within)) * beyond;
  };
}

/** @throws {OutOfDomainError} if the colour excess is negative or not finite */
export function requireColourExcess(colourExcessMag: number): void {
  if (!(colourExcessMag >= 0 && colourExcessMag < Infinity)) {
    throw new OutOfDomainError('colourExcessMag', colourExcessMag, 'a finite number, 0 or more');
  }
}
