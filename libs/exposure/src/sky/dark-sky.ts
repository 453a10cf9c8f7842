/** The moonless sky: published brightness by band, and what it is made of. */
import { airmassKrisciunasSchaefer, altitudeAtAirmassDeg } from '@faintward/astronomy';
import { OutOfDomainError, type BandId, type Bands, type Constant, type Provenance } from '@faintward/photometry';
import type { DarkSkySet, DarkSkyTable } from '@faintward/photometry/sky-tables';
import { HIGHEST_AIRMASS } from './extinction.js';
import { requireBetween } from './check.js';

/** Radio flux of the quiet and of the most active Sun that the airglow relation covers, MJy (100 solar flux units). */
export const QUIET_SOLAR_FLUX_MJY = 0.8;
export const HIGHEST_SOLAR_FLUX_MJY = 2;

const BENN_ELLISON = 'Benn & Ellison 1998, New Astronomy Reviews 42, 503';

export const S10_VISUAL_MAG: Constant = {
  name: 'one star of V = 10 per square degree, as surface brightness',
  symbol: 'S10',
  value: 27.78,
  unit: 'Vega mag/arcsec² in V',
  reference: '10 + 2.5 log10(3600²), exact to rounding',
};
export const QUIET_AIRGLOW: Constant = {
  name: 'airglow in V with a quiet Sun',
  symbol: '',
  value: 145,
  unit: 'S10',
  reference: BENN_ELLISON,
};
export const AIRGLOW_RISE: Constant = {
  name: 'more airglow in V with the most active Sun',
  symbol: '',
  value: 130,
  unit: 'S10 per 1.2 MJy',
  reference: `${BENN_ELLISON} (from memory)`,
};
export const ZODIACAL_AT_ECLIPTIC: Constant = {
  name: 'zodiacal light in V on the ecliptic, far from the Sun',
  symbol: '',
  value: 140,
  unit: 'S10',
  reference: BENN_ELLISON,
};
export const ZODIACAL_FALL: Constant = {
  name: 'fall of the zodiacal light with sin |β|',
  symbol: '',
  value: 90,
  unit: 'S10',
  reference: `${BENN_ELLISON} (from memory)`,
};
export const ZODIACAL_AT_POLE: Constant = {
  name: 'zodiacal light in V from ecliptic latitude 60° on',
  symbol: '',
  value: 60,
  unit: 'S10',
  reference: BENN_ELLISON,
};
export const STARLIGHT: Constant = {
  name: 'faint stars and scattered starlight in V, away from the Milky Way',
  symbol: '',
  value: 15,
  unit: 'S10',
  reference: BENN_ELLISON,
};

/** The dark sky in V at the zenith, in S10 units. */
export interface DarkSkyParts {
  readonly airglow: number;
  readonly zodiacal: number;
  readonly starlight: number;
}

/**
 * What the moonless sky in V consists of: 145 + 130 (S − 0.8)/1.2 of airglow, 140 − 90 sin |β| of zodiacal light (60 from
 * |β| = 60° on, a step of 2), 15 of starlight, in S10. Quiet Sun and pole: 220, which is V = 21.92.
 *
 * Good to some 0.2 mag; single nights differ by as much. Zodiacal light near the Sun and the Milky Way are brighter.
 *
 * @param solarFluxMjy         10.7 cm radio flux, 0.8 to 2
 * @param eclipticLatitudeDeg  −90 to 90
 * @see Benn & Ellison 1998, New Astronomy Reviews 42, 503
 */
export function darkSkyPartsS10(solarFluxMjy: number, eclipticLatitudeDeg: number): DarkSkyParts {
  requireBetween('solarFluxMjy', solarFluxMjy, QUIET_SOLAR_FLUX_MJY, HIGHEST_SOLAR_FLUX_MJY, 'MJy');
  requireBetween('eclipticLatitudeDeg', eclipticLatitudeDeg, -90, 90, '°');
  const latitudeDeg = Math.abs(eclipticLatitudeDeg);
  const activity = (solarFluxMjy - QUIET_SOLAR_FLUX_MJY) / (HIGHEST_SOLAR_FLUX_MJY - QUIET_SOLAR_FLUX_MJY);
  return {
    airglow: QUIET_AIRGLOW.value + AIRGLOW_RISE.value * activity,
    zodiacal:
      latitudeDeg < 60
        ? ZODIACAL_AT_ECLIPTIC.value - ZODIACAL_FALL.value * Math.sin((latitudeDeg * Math.PI) / 180)
        : ZODIACAL_AT_POLE.value,
    starlight: STARLIGHT.value,
  };
}

/** V of a surface brightness in S10, Vega mag/arcsec². */
export function vMagOfS10(s10: number): number {
  return S10_VISUAL_MAG.value - 2.5 * Math.log10(s10);
}

/**
 * How the moonless sky changes from the zenith to an airmass, as a factor: [(1 − f) + f X_KS] 10^(−0.4 k (X − 1)).
 *
 * Airglow comes from a thin layer and brightens with the path through it; what is behind the air is only dimmed. Good to
 * 0.1 mag down to 30° altitude in clean air; no lights of towns.
 *
 * @param airglowShare   f at the zenith, 0 to 1; some 0.6 in V
 * @param extinctionMag  k, mag per airmass
 * @see Patat 2003, A&A 400, 1183 (from memory); X_KS of Krisciunas & Schaefer 1991, PASP 103, 1033
 */
export function darkSkyAirmassFactor(airglowShare: number, extinctionMag: number, airmass: number): number {
  requireBetween('airglowShare', airglowShare, 0, 1);
  requireBetween('extinctionMag', extinctionMag, 0, 10, 'mag per airmass');
  return (1 - airglowShare + airglowShare * glowPath(airmass)) * 10 ** (-0.4 * extinctionMag * (airmass - 1));
}

/** Path through the airglow layer at an airmass, 1 at the zenith. */
export function glowPath(airmass: number): number {
  return airmassKrisciunasSchaefer(altitudeOfAirmassDeg(airmass));
}

/** Apparent altitude of an airmass; beyond the largest of the formula (37.9) the horizon. */
export function altitudeOfAirmassDeg(airmass: number): number {
  requireBetween('airmass', airmass, 1, HIGHEST_AIRMASS);
  return airmass > 37.9 ? 0 : altitudeAtAirmassDeg(airmass);
}

/** A published dark sky in one band, as AB. */
export interface DarkZenith {
  readonly setId: string;
  readonly label: string;
  readonly zenithAbMag: number;
  /** Radio flux while it was measured, or `null`. */
  readonly solarFluxMjy: number | null;
  readonly source: string;
  readonly provenance: Provenance;
}

/**
 * Brightness of the moonless zenith in a band, AB mag/arcsec², by every set that has the band; Vega values are turned to
 * AB with the band's offset.
 *
 * @throws {OutOfDomainError} if a Vega value stands in a band without an offset
 */
export function darkZeniths({ data }: { readonly data: DarkSkyTable }, bands: Bands, bandId: BandId): DarkZenith[] {
  return data.sets.flatMap((set) => {
    const row = set.rows.find((each) => each.bandId === bandId);
    if (row === undefined) return [];
    return [darkZenithOf(set, row, bands[bandId].vegaToAbMag)];
  });
}

function darkZenithOf(set: DarkSkySet, row: DarkSkySet['rows'][number], vegaToAbMag: number | null): DarkZenith {
  if (row.system === 'Vega' && vegaToAbMag === null) {
    throw new OutOfDomainError(`darkSky ${set.id} ${row.bandId}`, row.system, 'AB in a band without a Vega offset');
  }
  return {
    setId: set.id,
    label: set.label,
    zenithAbMag: row.magPerArcsec2 + (row.system === 'Vega' ? vegaToAbMag! : 0),
    solarFluxMjy: set.solarFluxMjy,
    source: set.source,
    provenance: set.provenance,
  };
}
