import type { LightReport } from '@faintward/contracts/light-report';
import {
  airFromVacuumNm,
  type ArrivingContinuum,
  type ArrivingLight,
  atmosphericRangeAt,
  SHORTEST_AIR_WAVELENGTH_NM,
} from '@faintward/photometry';
import { lightData } from './light-data.js';

/** Rest wavelengths nearer than this, relative, are the same line: lists differ in the last decimals. */
const SAME_LINE = 1e-4;

/** Where the common lines of a redshift fall, and how strong they are where the light says so. */
export function observedLines(redshift: number, arriving: ArrivingLight | undefined): LightReport['lines'] {
  const { lines, bands, atmosphere } = lightData();
  return lines.map(({ id, label, vacuumWavelengthNm }) => {
    const observedNm = vacuumWavelengthNm * (1 + redshift);
    const range = atmosphericRangeAt(atmosphere, observedNm);
    return {
      lineId: id,
      label,
      restWavelengthNm: vacuumWavelengthNm,
      observedWavelengthNm: observedNm,
      observedAirWavelengthNm: observedNm >= SHORTEST_AIR_WAVELENGTH_NM ? airFromVacuumNm(observedNm) : null,
      bandIds: Object.values(bands)
        .filter(
          ({ wavelengthLowNm, wavelengthHighNm }) => observedNm >= wavelengthLowNm && observedNm <= wavelengthHighNm,
        )
        .map((band) => band.id),
      place: range?.kind ?? 'outside',
      placeLabel: range?.label ?? 'outside what reaches the ground in the optical and near infrared',
      ...strengthOf(vacuumWavelengthNm, arriving),
    };
  });
}

interface Strength {
  fluxErgSCm2: number | null;
  observedEquivalentWidthNm: number | null;
}

function strengthOf(restNm: number, arriving: ArrivingLight | undefined): Strength {
  const none = { fluxErgSCm2: null, observedEquivalentWidthNm: null };
  if (arriving === undefined) return none;
  if (arriving.kind === 'continuum') return strengthInSpectrum(restNm, arriving) ?? none;
  if (!isSame(arriving.light.restWavelengthNm, restNm)) return none;
  const { continuum } = arriving.light;
  return {
    fluxErgSCm2: arriving.fluxErgSCm2() ?? null,
    observedEquivalentWidthNm:
      continuum.kind === 'equivalentWidth' ? continuum.restEquivalentWidthNm * (1 + arriving.redshift) : null,
  };
}

function strengthInSpectrum(restNm: number, arriving: ArrivingContinuum): Strength | undefined {
  const line = arriving.light.spectrum.lines.find(({ restWavelengthNm }) => isSame(restWavelengthNm, restNm));
  if (line === undefined) return undefined;
  const strength = arriving.lineStrength(line);
  return strength === undefined
    ? undefined
    : { fluxErgSCm2: strength.fluxErgSCm2, observedEquivalentWidthNm: strength.observedEquivalentWidthNm };
}

function isSame(a: number, b: number): boolean {
  return Math.abs(a / b - 1) < SAME_LINE;
}
