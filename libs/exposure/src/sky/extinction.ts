import { OutOfDomainError, type Provenance } from '@faintward/photometry';
import type { ExtinctionTable } from '@faintward/photometry/sky-tables';
import { requireBetween } from './check.js';

/** Below, ozone leaves the ground dark. */
export const EXTINCTION_LOW_NM = 300;
/** Beyond, nothing is tabulated. */
export const EXTINCTION_HIGH_NM = 4200;
/** The longest path through the air that is computed with. */
export const HIGHEST_AIRMASS = 38;

/** Extinction of the clear atmosphere at a site, in magnitudes per airmass. */
export interface ExtinctionCurve {
  readonly id: string;
  readonly label: string;
  readonly altitudeM: number;
  readonly source: string;
  /** Ascending. */
  readonly wavelengthsNm: Float64Array;
  readonly magPerAirmass: Float64Array;
  /** Last wavelength of the published curve; from there on the near-infrared values by common practice take over. */
  readonly publishedHighNm: number;
  readonly nearInfraredSource: string;
}

/** Where a value of a curve comes from: `extended` is outside the points of the curve. */
export interface ExtinctionValue {
  readonly magPerAirmass: number;
  readonly basis: Provenance | 'extended';
}

/** Extinction curves from their file, by id. */
export function createExtinctionCurves({
  data,
}: {
  readonly data: ExtinctionTable;
}): ReadonlyMap<string, ExtinctionCurve> {
  const { nearInfrared } = data;
  return new Map(
    data.curves.map(({ wavelengthsNm, magPerAirmass, ...row }) => [
      row.id,
      {
        ...row,
        wavelengthsNm: Float64Array.from([...wavelengthsNm, ...nearInfrared.wavelengthsNm]),
        magPerAirmass: Float64Array.from([...magPerAirmass, ...nearInfrared.magPerAirmass]),
        publishedHighNm: wavelengthsNm.at(-1)!,
        nearInfraredSource: nearInfrared.source,
      },
    ]),
  );
}

/**
 * Extinction at a wavelength, and what it rests on.
 *
 * Between points a power law, which follows scattering (∝ λ^−4) where straight lines would be up to 0.01 mag too high;
 * exact at the points. Short of the first point ∝ λ^−4 (real air is darker there, by ozone), beyond the last one
 * constant; both are said to be `extended`. Published curves are good to some 0.01 to 0.03 mag on an average clear night
 * and know nothing of the narrow bands of water and oxygen; near-infrared values are means over the windows.
 *
 * @param wavelengthNm  300 to 4200
 * @throws {OutOfDomainError} outside
 * @see Patat et al. 2011, A&A 527, A91; Buton et al. 2013, A&A 549, A8
 */
export function extinctionAt(curve: ExtinctionCurve, wavelengthNm: number): ExtinctionValue {
  requireBetween('wavelengthNm', wavelengthNm, EXTINCTION_LOW_NM, EXTINCTION_HIGH_NM, 'nm');
  const { wavelengthsNm: x, magPerAirmass: k } = curve;
  const last = x.length - 1;
  if (wavelengthNm < x[0]!) return { magPerAirmass: k[0]! * (x[0]! / wavelengthNm) ** 4, basis: 'extended' };
  if (wavelengthNm > x[last]!) return { magPerAirmass: k[last]!, basis: 'extended' };
  const above = Math.min(
    last,
    x.findIndex((each, i) => i > 0 && each >= wavelengthNm),
  );
  const t = Math.log(wavelengthNm / x[above - 1]!) / Math.log(x[above]! / x[above - 1]!);
  return {
    magPerAirmass: Math.exp(Math.log(k[above - 1]!) * (1 - t) + Math.log(k[above]!) * t),
    basis: wavelengthNm <= curve.publishedHighNm ? 'published' : 'commonPractice',
  };
}

/** Magnitudes that a source loses in the clear atmosphere: k(λ) X. For the validity of k see {@link extinctionAt}. */
export function extinctionMag(curve: ExtinctionCurve, wavelengthNm: number, airmass: number): number {
  requireBetween('airmass', airmass, 1, HIGHEST_AIRMASS);
  return extinctionAt(curve, wavelengthNm).magPerAirmass * airmass;
}

/**
 * The curve of an id.
 *
 * @throws {OutOfDomainError} naming the curves there are
 */
export function extinctionCurveOf(curves: ReadonlyMap<string, ExtinctionCurve>, id: string): ExtinctionCurve {
  const curve = curves.get(id);
  if (curve === undefined)
    throw new OutOfDomainError('extinctionCurveId', id, `one of ${[...curves.keys()].join(', ')}`);
  return curve;
}
