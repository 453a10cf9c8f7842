import { OutOfDomainError } from './domain.js';
import type { BandId, Provenance } from './bands.js';
import { sampledCurve, type SampledCurve } from './sampled-curve.js';
import { responseOf } from './synthetic.js';

/** A row of `bands.json`. */
export interface BandRow {
  readonly id: BandId;
  readonly label: string;
  /** m_AB − m_Vega; `null` for bands that are quoted in AB anyway. */
  readonly vegaToAbMag: number | null;
  readonly vegaToAbProvenance: Provenance | null;
  readonly vegaToAbSource: string | null;
  readonly curveProvenance: Provenance;
  readonly curveSource: string;
  readonly wavelengthsNm: readonly number[];
  /** Per photon, 1 at the peak. */
  readonly response: readonly number[];
}

export interface BandsTable {
  readonly bands: readonly BandRow[];
}

/** A band for magnitudes that people quote. Instruments bring their own responses. */
export interface Band {
  readonly id: BandId;
  readonly label: string;
  /** Photon-counting response, 1 at its peak. */
  readonly curve: SampledCurve;
  readonly pivotWavelengthNm: number;
  /** Outermost wavelengths at which the response is half of its peak. */
  readonly wavelengthLowNm: number;
  readonly wavelengthHighNm: number;
  readonly curveSource: string;
  readonly curveProvenance: Provenance;
  readonly vegaToAbMag: number | null;
  readonly vegaToAbProvenance: Provenance | null;
  readonly vegaToAbSource: string | null;
}

export type Bands = Readonly<Record<BandId, Band>>;

/** Every band there is; the table of a file has each of them once. */
export const BAND_IDS = [
  'U',
  'B',
  'V',
  'R',
  'I',
  'u',
  'g',
  'r',
  'i',
  'z',
  'Y',
  'J',
  'H',
  'Ks',
] as const satisfies BandId[];

/**
 * Bands from their file.
 *
 * @throws {OutOfDomainError} naming the first point of a curve that cannot be, or a band that is missing or stands twice
 */
export function createBands({ data }: { readonly data: BandsTable }): Bands {
  const made = new Map<BandId, Band>();
  for (const row of data.bands) {
    if (made.has(row.id)) throw new OutOfDomainError('bands', row.id, 'in the table once');
    made.set(row.id, bandOf(row));
  }
  const missing = BAND_IDS.filter((id) => !made.has(id));
  if (missing.length > 0)
    throw new OutOfDomainError('bands', [...made.keys()], `complete: ${missing.join(', ')} missing`);
  return Object.fromEntries(made) as Bands;
}

function bandOf({ wavelengthsNm, response, ...row }: BandRow): Band {
  const curve = sampledCurve(wavelengthsNm, response);
  const { pivotWavelengthNm, passLowNm, passHighNm } = responseOf(curve);
  return { ...row, curve, pivotWavelengthNm, wavelengthLowNm: passLowNm, wavelengthHighNm: passHighNm };
}

/**
 * AB magnitude of a Vega magnitude in a band, or undefined for a band that has no Vega offset.
 *
 * The offsets are for a Vega-like spectrum through standard filters; another filter of the same name can differ by
 * some 0.05 mag.
 */
export function abFromVegaIn(band: Band, magnitudeVega: number): number | undefined {
  return band.vegaToAbMag === null ? undefined : magnitudeVega + band.vegaToAbMag;
}

/** Vega magnitude of an AB magnitude in a band, or undefined for a band that has no Vega offset. */
export function vegaFromAbIn(band: Band, magnitudeAb: number): number | undefined {
  return band.vegaToAbMag === null ? undefined : magnitudeAb - band.vegaToAbMag;
}

/** The band of an id, or undefined. Case matters: `r` and `R` are different bands. */
export function findBandIn(bands: Bands, id: string): Band | undefined {
  return Object.hasOwn(bands, id) ? bands[id as BandId] : undefined;
}
