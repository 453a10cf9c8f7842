import type { FieldError } from '@faintward/contracts/errors';
import type { BandId, Extent, Light } from '@faintward/contracts/light';
import type { InstrumentMode, TargetLight } from '@faintward/exposure';
import { abFromVegaMagnitude, BANDS, pivotWavelengthOfBoxNm } from '@faintward/photometry';

/** Wavelength that a magnitude quoted in a band belongs to. */
export function bandWavelengthNm(bandId: BandId): number {
  const band = BANDS[bandId];
  return pivotWavelengthOfBoxNm(band.wavelengthLowNm, band.wavelengthHighNm);
}

/** The AB magnitude of a light given as an apparent magnitude; undefined for a Vega magnitude in a band without an offset. */
export function apparentMagnitudeAbOf(light: Extract<Light, { kind: 'apparentMagnitude' }>): number | undefined {
  return light.system === 'AB' ? light.magnitude : abFromVegaMagnitude(light.magnitude, light.bandId);
}

/** What is wrong with light, extent and redshift together, though each alone is fine. Paths begin with `prefix`. */
export function lightFaults(
  { light, extent, redshift }: { light: Light | null; extent: Extent; redshift: number },
  prefix = '',
): FieldError[] {
  const faults: FieldError[] = [];
  const needsDistance = light?.kind === 'absoluteMagnitude' || light?.kind === 'lineLuminosity';
  if (light?.kind === 'apparentMagnitude' && apparentMagnitudeAbOf(light) === undefined) {
    faults.push({
      path: `${prefix}light.system`,
      message: `The ${light.bandId} band is only used with AB magnitudes; give the AB magnitude.`,
    });
  }
  if (extent.kind === 'uniform' && needsDistance) {
    faults.push({
      path: `${prefix}light.kind`,
      message: 'A surface of even brightness needs a brightness per square arcsecond as it is observed.',
    });
  }
  if (redshift === 0 && (needsDistance || (extent.kind === 'sersic' && extent.unit === 'kpc'))) {
    faults.push({
      path: `${prefix}redshift`,
      message:
        'At redshift 0 there is no distance, which a luminosity or a size in kpc needs. Give a redshift above 0.',
    });
  }
  return faults;
}

/**
 * A light in the terms of the exposure engine. A magnitude quoted in the mode's own band is taken as the average over it;
 * any other is moved along the power law from its band's wavelength.
 */
export function toEngineLight(light: Light, mode: InstrumentMode): TargetLight {
  switch (light.kind) {
    case 'apparentMagnitude': {
      const magnitudeAb = apparentMagnitudeAbOf(light);
      if (magnitudeAb === undefined) throw new Error(`A Vega magnitude in ${light.bandId} was not refused.`);
      const isOwnBand = mode.kind === 'imaging' && mode.bandId === light.bandId;
      return {
        kind: 'apparentMagnitude',
        magnitudeAb,
        slopeBeta: light.spectralSlopeBeta,
        ...(isOwnBand ? {} : { wavelengthNm: bandWavelengthNm(light.bandId) }),
      };
    }
    case 'absoluteMagnitude':
      return {
        kind: 'absoluteMagnitude',
        absoluteMagnitudeAb: light.magnitudeAb,
        restWavelengthNm: light.restWavelengthNm,
        slopeBeta: light.spectralSlopeBeta,
      };
    case 'lineFlux':
      return {
        kind: 'lineFlux',
        lineFluxErgSCm2: light.fluxErgSCm2,
        restWavelengthNm: light.restWavelengthNm,
        intrinsicWidthKmS: light.velocityWidthKmS,
      };
    case 'lineLuminosity':
      return {
        kind: 'lineLuminosity',
        lineLuminosityErgS: light.luminosityErgS,
        restWavelengthNm: light.restWavelengthNm,
        intrinsicWidthKmS: light.velocityWidthKmS,
      };
  }
}
