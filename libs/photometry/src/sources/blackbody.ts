import { PLANCK_CONSTANT, SPEED_OF_LIGHT, type Constant } from '../constants.js';
import { requirePositive } from '../domain.js';
import { REST_GRID_HIGH_NM, REST_GRID_LOW_NM, restGrid, sampleOn } from '../rest-grid.js';
import { caution, type RestSpectrum } from './rest-spectrum.js';

/** A blackbody of a temperature. */
export interface BlackbodySource {
  readonly kind: 'blackbody';
  readonly temperatureK: number;
}

export const BOLTZMANN_CONSTANT: Constant = {
  name: 'Boltzmann constant',
  symbol: 'k',
  value: 1.380_649e-23,
  unit: 'J K^-1',
  reference: 'exact by the definition of the kelvin (SI 2019)',
};

/** hc/k in nm K. */
const SECOND_RADIATION_CONSTANT_NM_K =
  ((PLANCK_CONSTANT.value * SPEED_OF_LIGHT.value) / BOLTZMANN_CONSTANT.value) * 1e9;
/** Root of x = 5 (1 − e^−x), where x^5 / (e^x − 1) is largest: Wien's displacement law. */
const WIEN_X = 4.965114231744276;

/** B_λ(T) over its maximum; without absorption of any kind. Zero where it is below the smallest number. */
export function blackbodySpectrum({ temperatureK }: BlackbodySource, jumpsNm: readonly number[]): RestSpectrum {
  requirePositive('temperatureK', temperatureK);
  const most = WIEN_X ** 5 / Math.expm1(WIEN_X);
  const continuum = sampleOn(restGrid(jumpsNm), (wavelengthNm) => {
    const x = SECOND_RADIATION_CONSTANT_NM_K / (wavelengthNm * temperatureK);
    // expm1 keeps the digits of small x and runs to Infinity, hence 0, for large.
    return x ** 5 / Math.expm1(x) / most;
  });
  return {
    label: `blackbody, ${temperatureK} K`,
    source: 'Planck 1901, Ann. Phys. 309, 553',
    provenance: 'published',
    continuum,
    lines: [],
    validLowNm: REST_GRID_LOW_NM,
    validHighNm: REST_GRID_HIGH_NM,
    cautions: [caution('blackbodyOnly', 'A blackbody has neither lines nor edges, not even at the Lyman limit.')],
  };
}
