import type { Light } from '@faintward/contracts/light';

/**
 * A brightness as the grid shows and takes it, with all the digits of its value: "24.10 AB (J)". What has no place in a cell
 * (spectrum, dust, lensing, widths) is left out.
 */
export function formatBrightness(light: Light | null): string {
  if (light === null) return '';
  switch (light.kind) {
    case 'apparentMagnitude':
      return `${atLeastTwoDecimals(light.magnitude)} ${light.system} (${light.bandId})`;
    case 'absoluteMagnitude': {
      const value = `M ${atLeastTwoDecimals(light.magnitude)}`;
      if (light.restBandId !== null) return `${value} ${light.system} (${light.restBandId})`;
      return `${value}${light.system === 'AB' ? '' : ` ${light.system}`} (${light.restWavelengthNm} nm)`;
    }
    case 'lineFlux':
      return `${light.fluxErgSCm2} erg/s/cm^2 (${light.restWavelengthNm} nm)`;
    case 'lineLuminosity':
      return `${light.luminosityErgS.toExponential()} erg/s (${light.restWavelengthNm} nm)`;
    case 'starFormationRate':
      return `${light.solarMassesPerYear} Msun/yr${TRACERS[light.tracer]}`;
    case 'typical':
      return light.of === 'starFormingGalaxy' ? 'typical galaxy' : 'typical supernova Ia';
  }
}

const TRACERS = { ultraviolet: '', hydrogenAlpha: ' (Hα)', lymanAlpha: ' (Lyα)' } as const;

function atLeastTwoDecimals(value: number): string {
  const text = String(value);
  return /e|\.\d\d/.test(text) ? text : value.toFixed(2);
}
