import { isBelow, restGrid, sampleOn, type Side } from '../rest-grid.js';
import { caution, type RestSpectrum } from './rest-spectrum.js';

/** Old stars; see `passiveSpectrum`. */
export interface PassiveSource {
  readonly kind: 'passive';
}

const BREAK_NM = 400;
/** f_ν just above over just below 400 nm; 1.8 to 2 are common for old stars. */
const BREAK_RATIO = 1.9;
const ULTRAVIOLET_NM = 300;
/** Below 300 nm, of the level beyond the break; 0.03 to 0.1 occur. */
const ULTRAVIOLET_LEVEL = 0.05;
/** β between 300 nm and the break, where metal lines crowd. */
const SLOPE_BELOW_BREAK = 4;
const PLATEAU_END_NM = 800;
const SLOPE_BEYOND_PLATEAU = -1;
const LOWEST_NM = 120;
const HIGHEST_NM = 2500;

/**
 * Old stars, approximately, all of it common practice: f_λ constant from 400 to 800 nm and ∝ λ^−1 beyond; at 400 nm a step of 1.9;
 * ∝ λ^4 from 400 down to 300 nm; constant at 0.05 of the plateau below. No lines. For planning below redshift 3.
 */
export function passiveSpectrum(jumpsNm: readonly number[]): RestSpectrum {
  return {
    label: 'passive galaxy, approximate',
    source: 'step at 400 nm, plateau to 800 nm, falling beyond',
    provenance: 'commonPractice',
    continuum: sampleOn(restGrid([ULTRAVIOLET_NM, BREAK_NM, ...jumpsNm], [PLATEAU_END_NM]), passiveValue),
    lines: [],
    validLowNm: LOWEST_NM,
    validHighNm: HIGHEST_NM,
    cautions: [
      caution(
        'passiveApproximate',
        'An approximate spectrum of old stars, for planning: good to about 0.3 mag in a broad band.',
      ),
      caution(
        'passiveUltraviolet',
        'Below 300 nm at rest old galaxies differ by factors; the level drawn is a guess within them.',
        LOWEST_NM,
        ULTRAVIOLET_NM,
      ),
    ],
  };
}

function passiveValue(wavelengthNm: number, side: Side): number {
  if (isBelow(wavelengthNm, ULTRAVIOLET_NM, side)) return ULTRAVIOLET_LEVEL;
  if (isBelow(wavelengthNm, BREAK_NM, side)) return (wavelengthNm / BREAK_NM) ** SLOPE_BELOW_BREAK / BREAK_RATIO;
  if (wavelengthNm <= PLATEAU_END_NM) return 1;
  return (wavelengthNm / PLATEAU_END_NM) ** SLOPE_BEYOND_PLATEAU;
}
