/** What the reference files of the sky hold. The library of exposures calculates with them; here they are only checked. */
import type { BandId } from './bands.js';
import type { Provenance } from './provenance.js';

/** `extinction-curves.json`. */
export interface ExtinctionTable {
  readonly curves: readonly {
    readonly id: string;
    readonly label: string;
    readonly altitudeM: number;
    readonly source: string;
    readonly wavelengthsNm: readonly number[];
    readonly magPerAirmass: readonly number[];
  }[];
  /** Appended to every curve. */
  readonly nearInfrared: {
    readonly source: string;
    readonly provenance: Provenance;
    readonly wavelengthsNm: readonly number[];
    readonly magPerAirmass: readonly number[];
  };
}

/** `dark-sky.json`. */
export interface DarkSkyTable {
  readonly sets: readonly DarkSkySet[];
}

export interface DarkSkySet {
  readonly id: string;
  readonly label: string;
  readonly altitudeM: number | null;
  /** 10.7 cm radio flux of the Sun while it was measured, MJy; `null` where it is not known. */
  readonly solarFluxMjy: number | null;
  readonly provenance: Provenance;
  readonly source: string;
  readonly rows: readonly {
    readonly bandId: BandId;
    readonly system: 'Vega' | 'AB';
    /** Zenith, no Moon, as seen from the ground. */
    readonly magPerArcsec2: number;
  }[];
}

/** `sunlight.json`. */
export interface SunlightTable {
  readonly wavelengthsNm: readonly number[];
  readonly absoluteMagnitudesAb: readonly number[];
  /** p of a reflectance ∝ λ^p of the Moon. */
  readonly moonReflectancePower: number;
}

/** `twilight.json`. */
export interface TwilightTable {
  readonly levelSunAltitudeDeg: number;
  readonly rows: readonly {
    readonly bandId: BandId;
    readonly magPerDegree: number;
    /** Vega, zenith, at `levelSunAltitudeDeg`. */
    readonly magPerArcsec2: number;
  }[];
}

/** `oh-lines.json`. */
export interface OhLinesTable {
  /** In vacuum, ascending. */
  readonly wavelengthsNm: readonly number[];
  /** One arbitrary scale; `null` for a line that is listed without strength. */
  readonly relativeIntensities: readonly (number | null)[];
}
