import { OutOfDomainError } from '../domain.js';
import { LYMAN_LIMIT_NM } from '../lines.js';
import { REST_GRID_HIGH_NM, REST_GRID_LOW_NM, isBelow, restGrid, sampleOn } from '../rest-grid.js';
import { caution, type RestSpectrum } from './rest-spectrum.js';

/** A power law with a step at the Lyman limit. */
export interface PowerLawSource {
  readonly kind: 'powerLaw';
  /** β of f_λ ∝ λ^β. */
  readonly slopeBeta: number;
  /** Part of the light below the Lyman limit that leaves the galaxy, 0 to 1. */
  readonly escapeFraction: number;
}

const REFERENCE_NM = 150;

/** f_λ = (λ / 150 nm)^β, times the escape fraction below the Lyman limit at 91.175 nm. */
export function powerLawSpectrum(
  { slopeBeta, escapeFraction }: PowerLawSource,
  jumpsNm: readonly number[],
): RestSpectrum {
  if (!Number.isFinite(slopeBeta)) throw new OutOfDomainError('slopeBeta', slopeBeta, 'a finite number');
  if (!(escapeFraction >= 0 && escapeFraction <= 1)) {
    throw new OutOfDomainError('escapeFraction', escapeFraction, 'between 0 and 1');
  }
  const continuum = sampleOn(
    restGrid([LYMAN_LIMIT_NM, ...jumpsNm]),
    (wavelengthNm, side) =>
      (wavelengthNm / REFERENCE_NM) ** slopeBeta * (isBelow(wavelengthNm, LYMAN_LIMIT_NM, side) ? escapeFraction : 1),
  );
  return {
    label: `power law, f_λ ∝ λ^${formatSlope(slopeBeta)}`,
    source: 'power law with the slope given',
    provenance: 'commonPractice',
    continuum,
    lines: [],
    validLowNm: REST_GRID_LOW_NM,
    validHighNm: REST_GRID_HIGH_NM,
    cautions: [
      caution(
        'powerLawWithoutBreaks',
        'A power law has neither the Balmer and 4000 Å breaks nor lines; beyond 365 nm at rest a galaxy can differ by a magnitude.',
        364.6,
      ),
    ],
  };
}

export function formatSlope(slopeBeta: number): string {
  return String(Number(slopeBeta.toFixed(3))).replace('-', '−');
}
