import type { BandId } from '@faintward/contracts/light';
import type { LightReading, LightReadingRequest } from '@faintward/contracts/light-report';
import { abMagnitudeFromFluxDensityJy, abMagnitudeFromFluxPerAngstrom } from '@faintward/photometry';
import { readLight } from '@faintward/photometry/quantity';
import { bandWavelengthNm, vegaToAbMagOf } from '../../engine/light.js';
import { invalidField } from '../../platform/domain-error.js';

/**
 * What a person typed for a brightness, in the unit of the field that it fills.
 *
 * @throws {DomainError} `validation-failed` at `text`, with the reason
 */
export function readTypedLight({ text, bandId, system }: LightReadingRequest): LightReading {
  const reading = readLight(text);
  if (!reading.ok) throw invalidField('text', reading.message);
  const { light } = reading;
  switch (light.kind) {
    case 'abMagnitude':
      // "22.5 mag" is in the system of the field it is typed into, unless it says AB itself.
      if (system === 'Vega' && !/ab/i.test(text)) return vega(light.magnitudeAb, bandId);
      return apparent(light.magnitudeAb, `${light.magnitudeAb} mag AB in ${bandId}`);
    case 'vegaMagnitude':
      return vega(light.magnitudeVega, bandId);
    case 'fluxDensityJy': {
      const magnitudeAb = rounded(abMagnitudeFromFluxDensityJy(light.fluxDensityJy));
      return apparent(magnitudeAb, `${magnitudeAb.toFixed(3)} mag AB in ${bandId}, from ${text.trim()}`);
    }
    case 'fluxPerAngstrom': {
      const wavelengthNm = bandWavelengthNm(bandId);
      const magnitudeAb = rounded(abMagnitudeFromFluxPerAngstrom(light.fluxErgSCm2Angstrom, wavelengthNm));
      return apparent(
        magnitudeAb,
        `${magnitudeAb.toFixed(3)} mag AB in ${bandId}, from ${text.trim()} at ${wavelengthNm.toFixed(0)} nm`,
      );
    }
    case 'absoluteMagnitude':
      return {
        kind: 'absoluteMagnitude',
        value: light.magnitude,
        unit: 'mag',
        system: light.system,
        meaning: `absolute magnitude ${light.magnitude} ${light.system}`,
      };
    case 'lineFluxErgSCm2':
      return of('lineFlux', light.lineFluxErgSCm2, 'erg/s/cm²', 'flux of a line');
    case 'lineLuminosityErgS':
      return of('lineLuminosity', light.lineLuminosityErgS, 'erg/s', 'luminosity of a line');
    case 'starFormationRate':
      return of('starFormationRate', light.solarMassesPerYear, 'M☉/yr', 'star-formation rate');
  }

  function apparent(value: number, meaning: string): LightReading {
    return { kind: 'apparentMagnitude', value, unit: 'mag', system: 'AB', meaning };
  }

  function vega(value: number, band: BandId): LightReading {
    const offset = vegaToAbMagOf(band);
    if (offset === undefined) {
      throw invalidField('text', `The ${band} band is only used with AB magnitudes; give the AB magnitude.`);
    }
    const meaning = `${value} mag Vega in ${band}, which is ${(value + offset).toFixed(3)} AB`;
    return { kind: 'apparentMagnitude', value, unit: 'mag', system: 'Vega', meaning };
  }
}

function of(kind: LightReading['kind'], value: number, unit: string, meaning: string): LightReading {
  return { kind, value: rounded(value), unit, system: null, meaning };
}

/** Without the rounding that converting units leaves in the last digits: nobody types sixteen of them. */
function rounded(value: number): number {
  return Number(value.toPrecision(12));
}
