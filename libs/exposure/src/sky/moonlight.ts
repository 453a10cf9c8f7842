/**
 * Moonlight scattered by the atmosphere, in V, exactly as published: Krisciunas & Schaefer 1991, PASP 103, 1033.
 *
 * The publication claims 8 to 23 % (0.1 to 0.25 mag). Not in it: the surge of the last 7° before full Moon (some 35 %
 * more light), a Moon below the horizon, and other bands (see `moonlight-bands.ts`). Its Mie term has two branches that
 * do not meet: going outwards across 10° from the Moon it jumps up by 28 %. The step is kept as published; nobody
 * should observe faint things there.
 */
import { airmassKrisciunasSchaefer } from '@faintward/astronomy';
import { requireBetween } from './check.js';

/** Where Moon and target are, and how full the Moon is. Whether the three angles fit together is not looked at. */
export interface MoonGeometry {
  /** 0 is full Moon, 180 new Moon. */
  readonly phaseAngleDeg: number;
  /** Above 90 the Moon is down and there is no moonlight. */
  readonly moonZenithDistanceDeg: number;
  readonly targetZenithDistanceDeg: number;
  /** Moon to target, on the sky. */
  readonly separationDeg: number;
}

export interface MoonlitSkyInput extends MoonGeometry {
  /** V at the zenith without Moon, Vega mag/arcsec². */
  readonly darkZenithMag: number;
  /** In V, mag per airmass. */
  readonly extinctionMag: number;
}

export interface MoonlitSky {
  /** V, Vega mag/arcsec². */
  readonly magPerArcsec2: number;
  /** By how much the Moon brightens the sky at the target, mag ≥ 0: −ΔV of the publication. */
  readonly brighteningMag: number;
  readonly moonNanolamberts: number;
  readonly darkNanolamberts: number;
}

/** Surface brightness in nanolamberts of a V magnitude per arcsec² (eq. 1). */
export function nanolambertsOfVMag(magPerArcsec2: number): number {
  return 34.08 * Math.exp(20.7233 - 0.92104 * magPerArcsec2);
}

/** V magnitude per arcsec² of a surface brightness in nanolamberts, > 0 (eq. 1). */
export function vMagOfNanolamberts(nanolamberts: number): number {
  return (20.7233 - Math.log(nanolamberts / 34.08)) / 0.92104;
}

/** Light of the Moon outside the atmosphere, I* in the units of the publication (eq. 20). The power of four is of degrees. */
export function moonIlluminance(phaseAngleDeg: number): number {
  requireBetween('phaseAngleDeg', phaseAngleDeg, -180, 180, '°');
  return 10 ** (-0.4 * (3.84 + 0.026 * Math.abs(phaseAngleDeg) + 4e-9 * phaseAngleDeg ** 4));
}

/** Inside this distance from the Moon's centre, its disc, the aureole is taken as constant. */
const DISC_RADIUS_DEG = 0.25;
const AUREOLE_RADIUS_DEG = 10;

/** Scattering function at an angle from the Moon, Rayleigh and Mie parts (eqs. 17 to 19, 21). */
export function moonScattering(separationDeg: number): { rayleigh: number; mie: number } {
  requireBetween('separationDeg', separationDeg, 0, 180, '°');
  const cosine = Math.cos((separationDeg * Math.PI) / 180);
  return {
    rayleigh: 10 ** 5.36 * (1.06 + cosine * cosine),
    mie:
      separationDeg >= AUREOLE_RADIUS_DEG
        ? 10 ** (6.15 - separationDeg / 40)
        : 6.2e7 / Math.max(separationDeg, DISC_RADIUS_DEG) ** 2,
  };
}

/** Length of the path that scatters, 1 at the zenith (eq. 3). */
function scatteringAirmass(zenithDistanceDeg: number): number {
  return airmassKrisciunasSchaefer(90 - zenithDistanceDeg);
}

/**
 * Moonlight at the target, in nanolamberts (eq. 15), for a given strength of scattering; 0 with the Moon down.
 *
 * @param scattering     f(ρ): `rayleigh + mie` of {@link moonScattering} in V
 * @param extinctionMag  mag per airmass in the same band
 */
export function moonlightNanolamberts(geometry: MoonGeometry, scattering: number, extinctionMag: number): number {
  const { phaseAngleDeg, moonZenithDistanceDeg, targetZenithDistanceDeg } = geometry;
  requireBetween('moonZenithDistanceDeg', moonZenithDistanceDeg, 0, 180, '°');
  requireBetween('targetZenithDistanceDeg', targetZenithDistanceDeg, 0, 90, '°');
  requireBetween('extinctionMag', extinctionMag, 0, 10, 'mag per airmass');
  const illuminance = moonIlluminance(phaseAngleDeg);
  if (moonZenithDistanceDeg > 90) return 0;
  const towardsMoon = 10 ** (-0.4 * extinctionMag * scatteringAirmass(moonZenithDistanceDeg));
  const alongTarget = 10 ** (-0.4 * extinctionMag * scatteringAirmass(targetZenithDistanceDeg));
  return scattering * illuminance * towardsMoon * (1 - alongTarget);
}

/** The moonless sky at a zenith distance, in nanolamberts (eq. 2): all of it airglow, none behind it. */
export function darkNanolamberts(darkZenithMag: number, extinctionMag: number, zenithDistanceDeg: number): number {
  requireBetween('zenithDistanceDeg', zenithDistanceDeg, 0, 90, '°');
  const airmass = scatteringAirmass(zenithDistanceDeg);
  return nanolambertsOfVMag(darkZenithMag) * airmass * 10 ** (-0.4 * extinctionMag * (airmass - 1));
}

/** The sky at the target with the Moon where it is, in V. Accuracy and gaps: see the head of this file. */
export function moonlitSkyMag(input: MoonlitSkyInput): MoonlitSky {
  const { darkZenithMag, extinctionMag, targetZenithDistanceDeg, separationDeg } = input;
  requireBetween('darkZenithMag', darkZenithMag, 0, 40, 'mag/arcsec²');
  const { rayleigh, mie } = moonScattering(separationDeg);
  const moon = moonlightNanolamberts(input, rayleigh + mie, extinctionMag);
  const dark = darkNanolamberts(darkZenithMag, extinctionMag, targetZenithDistanceDeg);
  return {
    magPerArcsec2: vMagOfNanolamberts(moon + dark),
    brighteningMag: (2.5 * Math.log1p(moon / dark)) / Math.LN10,
    moonNanolamberts: moon,
    darkNanolamberts: dark,
  };
}

/** Part of the Moon's disc that is lit at a phase angle: (1 + cos α)/2. Its light falls much faster: 9 % of full at quarter. */
export function illuminatedFractionOfPhase(phaseAngleDeg: number): number {
  requireBetween('phaseAngleDeg', phaseAngleDeg, -180, 180, '°');
  return (1 + Math.cos((phaseAngleDeg * Math.PI) / 180)) / 2;
}

/** Phase angle, 0 to 180°, of a lit part of the disc. Within 1e-6°, except next to full and new Moon, where it is flat. */
export function phaseOfIlluminatedFraction(illuminatedFraction: number): number {
  requireBetween('illuminatedFraction', illuminatedFraction, 0, 1);
  return (Math.acos(2 * illuminatedFraction - 1) * 180) / Math.PI;
}
