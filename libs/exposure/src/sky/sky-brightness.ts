/** What makes the sky bright at a wavelength, part by part, as seen from the ground at an airmass. */
import { OutOfDomainError, type BandId, type Bands, type Provenance } from '@faintward/photometry';
import type { SunlightTable, TwilightTable } from '@faintward/photometry/sky-tables';
import { lightOfMag, magOfLight, requireBetween } from './check.js';
import {
  altitudeOfAirmassDeg,
  darkSkyPartsS10,
  glowPath,
  QUIET_SOLAR_FLUX_MJY,
  vMagOfS10,
  type DarkSkyParts,
} from './dark-sky.js';
import { extinctionAt, type ExtinctionCurve } from './extinction.js';
import { moonlightAb, type VisualBand } from './moonlight-bands.js';
import { createSunlight, SUNLIGHT_HIGH_NM, SUNLIGHT_LOW_NM, type Sunlight } from './sunlight.js';
import { createTwilight, type Twilight } from './twilight.js';

/** Beyond, OH makes the airglow, and the relation with the Sun's activity, found in V, is not used. Common practice. */
export const SOLAR_ACTIVITY_HIGH_NM = 700;

/** Within this of V in ln λ the model of moonlight is the published one. */
const VISUAL_LOG_HALF_WIDTH = 0.1;

export interface SkyBrightnessInput {
  /** A band, which stands for its pivot wavelength, or a wavelength in nm, 300 to 2500. */
  readonly at: BandId | number;
  /** The moonless zenith at that wavelength, AB mag/arcsec², as measured from the ground. */
  readonly zenithDarkAbMag: number;
  /** Solar radio flux and ecliptic latitude for which that holds. Default: quiet Sun (0.8 MJy), pole. */
  readonly measured?: { readonly solarFluxMjy?: number; readonly eclipticLatitudeDeg?: number };
  readonly airmass: number;
  readonly extinction: ExtinctionCurve;
  /** Absent: no Moon. */
  readonly moon?: {
    readonly phaseAngleDeg: number;
    readonly zenithDistanceDeg: number;
    readonly separationDeg: number;
  };
  /** −90 to −5. Absent: night. */
  readonly sunAltitudeDeg?: number;
  /** 10.7 cm radio flux of the Sun, MJy, 0.8 to 2. Absent: as measured. */
  readonly solarFluxMjy?: number;
  /** Absent: as measured. */
  readonly eclipticLatitudeDeg?: number;
}

export type SkyPartId = 'airglow' | 'zodiacal' | 'starlight' | 'moon' | 'twilight';

/** One line of the ledger of the sky. Light of the parts adds up to the total. */
export interface SkyPart {
  readonly id: SkyPartId;
  readonly title: string;
  /** This part alone, AB mag/arcsec²; `null` where it gives no light. */
  readonly abMagPerArcsec2: number | null;
  /** Part of all the light, 0 to 1. */
  readonly share: number;
  readonly formula: string;
  readonly source: string;
  readonly provenance: Provenance;
  /** Whether this value lies outside what its source has measured; it is then common practice. */
  readonly isExtended: boolean;
}

export interface SkyBrightness {
  readonly wavelengthNm: number;
  readonly abMagPerArcsec2: number;
  /** The same without Moon and twilight. */
  readonly darkAbMagPerArcsec2: number;
  /** What the Moon adds to the sky as it is without it, twilight included: mag ≥ 0. */
  readonly moonBrighteningMag: number;
  readonly parts: readonly SkyPart[];
}

export interface SkyModel {
  readonly sunlight: Sunlight;
  readonly twilight: Twilight;
  /**
   * The sky at an airmass, with its parts.
   *
   * Without Moon and twilight, at the zenith and with the Sun's activity and latitude as measured, it is exactly
   * `zenithDarkAbMag`. Zodiacal light and starlight come from the model of the V sky with the colour of the Sun; what
   * remains of the measured sky is airglow (with OH and heat in the near infrared). Only airglow grows with the path
   * through its layer. Good to some 0.2 mag without Moon; with Moon as `moonlight-bands.ts` says.
   *
   * @throws {OutOfDomainError}
   */
  brightness(input: SkyBrightnessInput): SkyBrightness;
}

export interface SkyFiles {
  readonly sunlight: { readonly data: SunlightTable };
  readonly twilight: { readonly data: TwilightTable };
}

/** The sky as the reference files describe it. */
export function createSkyModel(files: SkyFiles, bands: Bands): SkyModel {
  const { pivotWavelengthNm, vegaToAbMag } = bands.V;
  if (vegaToAbMag === null) throw new OutOfDomainError('bands.V.vegaToAbMag', vegaToAbMag, 'a number');
  const visual = { wavelengthNm: pivotWavelengthNm, vegaToAbMag };
  const sunlight = createSunlight(files.sunlight, visual.wavelengthNm);
  const twilight = createTwilight(files.twilight, bands, sunlight);
  return {
    sunlight,
    twilight,
    brightness(input) {
      const wavelengthNm = typeof input.at === 'number' ? input.at : bands[input.at].pivotWavelengthNm;
      requireBetween('at', wavelengthNm, SUNLIGHT_LOW_NM, SUNLIGHT_HIGH_NM, 'nm');
      const dark = darkLights(input, wavelengthNm, sunlight, visual);
      const moon = moonLight(input, wavelengthNm, sunlight, visual);
      const dusk = input.sunAltitudeDeg === undefined ? 0 : twilight.lightAb(wavelengthNm, input.sunAltitudeDeg);
      const lights: Record<SkyPartId, number> = { ...dark, moon, twilight: dusk };
      const darkTotal = dark.airglow + dark.zodiacal + dark.starlight;
      const total = darkTotal + moon + dusk;
      const extended: Partial<Record<SkyPartId, boolean>> = {
        moon: Math.abs(Math.log(wavelengthNm / visual.wavelengthNm)) > VISUAL_LOG_HALF_WIDTH,
        twilight: twilight.isExtended(wavelengthNm),
      };
      return {
        wavelengthNm,
        abMagPerArcsec2: magOfLight(total)!,
        darkAbMagPerArcsec2: magOfLight(darkTotal)!,
        moonBrighteningMag: (2.5 * Math.log1p(moon / (darkTotal + dusk))) / Math.LN10,
        parts: (Object.keys(PART_TEXTS) as SkyPartId[]).map((id) => ({
          id,
          ...PART_TEXTS[id],
          abMagPerArcsec2: magOfLight(lights[id]),
          share: lights[id] / total,
          ...(extended[id] ? { isExtended: true, provenance: 'commonPractice' } : { isExtended: false }),
        })),
      };
    },
  };
}

/** Light of the three parts of the moonless sky at the airmass, in units of AB magnitude 0 per arcsec². */
function darkLights(
  input: SkyBrightnessInput,
  wavelengthNm: number,
  sunlight: Sunlight,
  visual: VisualBand,
): DarkSkyParts {
  const { zenithDarkAbMag, measured, airmass, extinction } = input;
  requireBetween('zenithDarkAbMag', zenithDarkAbMag, 0, 40, 'mag/arcsec²');
  const measuredFlux = measured?.solarFluxMjy ?? QUIET_SOLAR_FLUX_MJY;
  const measuredLatitude = measured?.eclipticLatitudeDeg ?? 90;
  const then = darkSkyPartsS10(measuredFlux, measuredLatitude);
  const now = darkSkyPartsS10(input.solarFluxMjy ?? measuredFlux, input.eclipticLatitudeDeg ?? measuredLatitude);

  const total = lightOfMag(zenithDarkAbMag);
  const perS10 = lightOfMag(vMagOfS10(1) + visual.vegaToAbMag + sunlight.solarColourAb(wavelengthNm));
  // A sky darker than stars and dust alone would be leaves nothing for airglow: all is then scaled to what was measured.
  const behind = (then.zodiacal + then.starlight) * perS10;
  const scale = Math.min(1, total / behind);
  const airglowZenith = Math.max(0, total - behind);
  const activity = wavelengthNm < SOLAR_ACTIVITY_HIGH_NM ? now.airglow / then.airglow : 1;

  const dimmed = lightOfMag(extinctionAt(extinction, wavelengthNm).magPerAirmass * (airmass - 1));
  return {
    airglow: airglowZenith * activity * glowPath(airmass) * dimmed,
    zodiacal: now.zodiacal * perS10 * scale * dimmed,
    starlight: now.starlight * perS10 * scale * dimmed,
  };
}

function moonLight(
  { moon, airmass, extinction }: SkyBrightnessInput,
  wavelengthNm: number,
  sunlight: Sunlight,
  visual: VisualBand,
): number {
  if (moon === undefined) return 0;
  const geometry = {
    phaseAngleDeg: moon.phaseAngleDeg,
    moonZenithDistanceDeg: moon.zenithDistanceDeg,
    targetZenithDistanceDeg: 90 - altitudeOfAirmassDeg(airmass),
    separationDeg: moon.separationDeg,
  };
  const band = {
    geometry,
    wavelengthNm,
    extinctionMag: extinctionAt(extinction, wavelengthNm).magPerAirmass,
    extinctionVisualMag: extinctionAt(extinction, visual.wavelengthNm).magPerAirmass,
  };
  return moonlightAb(band, sunlight, visual);
}

const PART_TEXTS: Record<SkyPartId, Pick<SkyPart, 'title' | 'formula' | 'source' | 'provenance'>> = {
  airglow: {
    title: 'airglow; in the infrared OH and heat',
    formula: '(B_dark − zodiacal − starlight) A(S)/A(S_measured) X_KS 10^(−0.4 k (X − 1))',
    source: 'measured dark sky; Benn & Ellison 1998, New Astr. Rev. 42, 503; Patat 2003, A&A 400, 1183',
    provenance: 'publishedFromMemory',
  },
  zodiacal: {
    title: 'zodiacal light',
    formula: '(140 − 90 sin |β|) S10, 60 from |β| = 60° on; colour of the Sun; 10^(−0.4 k (X − 1))',
    source: 'Benn & Ellison 1998, New Astr. Rev. 42, 503',
    provenance: 'publishedFromMemory',
  },
  starlight: {
    title: 'faint stars',
    formula: '15 S10; colour of the Sun; 10^(−0.4 k (X − 1))',
    source: 'Benn & Ellison 1998, New Astr. Rev. 42, 503',
    provenance: 'published',
  },
  moon: {
    title: 'moonlight',
    formula: "f(ρ) I* 10^(−0.4 k X_m) [1 − 10^(−0.4 k X)]; other bands: Rayleigh λ⁻⁴, Mie λ⁻¹·³, the Moon's colour",
    source: 'Krisciunas & Schaefer 1991, PASP 103, 1033; outside V an extension of this project',
    provenance: 'published',
  },
  twilight: {
    title: 'twilight',
    formula: 'level at −10° + rate (−10° − Sun altitude)',
    source: 'Patat et al. 2006, A&A 455, 385',
    provenance: 'publishedFromMemory',
  },
};
