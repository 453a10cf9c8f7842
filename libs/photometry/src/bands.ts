import { OutOfDomainError } from './domain.js';
import type { Provenance } from './provenance.js';
import { sampledCurve, type SampledCurve } from './sampled-curve.js';
import { responseOf } from './synthetic.js';

/** Every band there is; the table of a file has each of them once. Case matters: `r` and `R` are different bands. */
export const BAND_IDS = ['U', 'B', 'V', 'R', 'I', 'u', 'g', 'r', 'i', 'z', 'Y', 'J', 'H', 'Ks'] as const;
export type BandId = (typeof BAND_IDS)[number];

/** A row of `bands.json`. */
export interface BandRow {
  readonly id: BandId;
  readonly label: string;
  /**
   * m_AB − m_Vega; `null` for bands that are quoted in AB anyway. For a Vega-like spectrum through a standard filter; another of the
   * same name can differ by some 0.05 mag.
   */
  readonly vegaToAbMag: number | null;
  readonly vegaToAbProvenance: Provenance | null;
  readonly vegaToAbSource: string | null;
  readonly curveProvenance: Provenance;
  readonly curveSource: string;
  readonly wavelengthsNm: readonly number[];
  /** Per photon, 1 at the peak. */
  readonly response: readonly number[];
}

/** `bands.json`. */
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

/** All bands by id. */
export type Bands = Readonly<Record<BandId, Band>>;

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
