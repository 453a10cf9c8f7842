export type BandId = 'U' | 'B' | 'V' | 'R' | 'I' | 'u' | 'g' | 'r' | 'i' | 'z' | 'Y' | 'J' | 'H' | 'Ks';

/** Where a number in the band table comes from. */
export type Provenance = 'published' | 'publishedFromMemory' | 'commonPractice';

export interface Band {
  readonly id: BandId;
  readonly label: string;
  /** Edges of an equivalent box: round numbers for planning, not a filter curve. */
  readonly wavelengthLowNm: number;
  readonly wavelengthHighNm: number;
  readonly edgesProvenance: Provenance;
  readonly edgesSource: string;
  /** m_AB − m_Vega; `null` for bands that are quoted in AB anyway. */
  readonly vegaToAbMag: number | null;
  readonly vegaToAbProvenance: Provenance | null;
  readonly vegaToAbSource: string | null;
}

const BLANTON_ROWEIS = 'Blanton & Roweis 2007, AJ 133, 734';
const TYPICAL_EDGES = 'typical half-power edges of filters of this name; instruments bring their own';
const ATMOSPHERIC_WINDOW = 'usual limits of the near-infrared atmospheric window';

/** Bands for magnitudes that people type. Instruments bring their own wavelength ranges. */
export const BANDS: Readonly<Record<BandId, Band>> = {
  U: vegaBand('U', 'U', 330, 400, 0.79, 'publishedFromMemory'),
  B: vegaBand('B', 'B', 390, 490, -0.09, 'published'),
  V: vegaBand('V', 'V', 505, 595, 0.02, 'published'),
  R: vegaBand('R', 'R', 570, 720, 0.21, 'publishedFromMemory'),
  I: vegaBand('I', 'I', 730, 880, 0.45, 'publishedFromMemory'),
  u: abBand('u', 'u', 325, 385),
  g: abBand('g', 'g', 400, 550),
  r: abBand('r', 'r', 555, 690),
  i: abBand('i', 'i', 695, 820),
  z: abBand('z', 'z', 825, 925),
  Y: { ...abBand('Y', 'Y', 970, 1070), edgesSource: ATMOSPHERIC_WINDOW },
  J: vegaBand('J', 'J', 1170, 1330, 0.91, 'published', ATMOSPHERIC_WINDOW),
  H: vegaBand('H', 'H', 1490, 1780, 1.39, 'published', ATMOSPHERIC_WINDOW),
  Ks: vegaBand('Ks', 'Ks', 2000, 2300, 1.85, 'published', ATMOSPHERIC_WINDOW),
};

function abBand(id: BandId, label: string, wavelengthLowNm: number, wavelengthHighNm: number): Band {
  return {
    id,
    label,
    wavelengthLowNm,
    wavelengthHighNm,
    edgesProvenance: 'commonPractice',
    edgesSource: TYPICAL_EDGES,
    vegaToAbMag: null,
    vegaToAbProvenance: null,
    vegaToAbSource: null,
  };
}

function vegaBand(
  id: BandId,
  label: string,
  wavelengthLowNm: number,
  wavelengthHighNm: number,
  vegaToAbMag: number,
  vegaToAbProvenance: Provenance,
  edgesSource = TYPICAL_EDGES,
): Band {
  return {
    ...abBand(id, label, wavelengthLowNm, wavelengthHighNm),
    edgesSource,
    vegaToAbMag,
    vegaToAbProvenance,
    vegaToAbSource: BLANTON_ROWEIS,
  };
}

/** The band of an id, or undefined. Case matters: `r` and `R` are different bands. */
export function findBand(id: string): Band | undefined {
  return Object.hasOwn(BANDS, id) ? BANDS[id as BandId] : undefined;
}

/**
 * AB magnitude of a Vega magnitude, or undefined for a band that has no Vega offset here.
 *
 * The offsets are for a Vega-like spectrum through standard filters; another filter of the same name can differ by
 * some 0.05 mag.
 */
export function abFromVegaMagnitude(magnitudeVega: number, bandId: BandId): number | undefined {
  const offset = BANDS[bandId].vegaToAbMag;
  return offset === null ? undefined : magnitudeVega + offset;
}

/** Vega magnitude of an AB magnitude, or undefined for a band that has no Vega offset here. */
export function vegaFromAbMagnitude(magnitudeAb: number, bandId: BandId): number | undefined {
  const offset = BANDS[bandId].vegaToAbMag;
  return offset === null ? undefined : magnitudeAb - offset;
}
