import { boxCurve, responseOf, type Response } from '@faintward/photometry';
import type { InfeasibleReason, InstrumentMode, Target } from './types.js';

/** What is counted together: the band when imaging, one resolution element when taking a spectrum. */
export interface CountedRange {
  /** Middle of the range in ln λ; of a line: the line. */
  wavelengthNm: number;
  /** How the range weighs its photons; the throughput's level is a step of its own. */
  response: Response;
}

/**
 * Wavelength range that the goal's sum covers.
 *
 * @returns a reason when the wanted line or wavelength lies outside the mode's range
 */
export function countedRange(
  target: Target,
  mode: InstrumentMode,
  wantedWavelengthNm: number | undefined,
): CountedRange | InfeasibleReason {
  const { wavelengthLowNm, wavelengthHighNm } = mode;
  const middleNm = Math.sqrt(wavelengthLowNm * wavelengthHighNm);
  const { light } = target;
  let wavelengthNm = middleNm;
  if (light.kind === 'line') {
    wavelengthNm = light.restWavelengthNm * (1 + target.redshift);
    if (wavelengthNm < wavelengthLowNm || wavelengthNm > wavelengthHighNm) {
      return {
        code: 'lineOutsideBand',
        message: `The line falls at ${wavelengthNm.toFixed(1)} nm, outside ${wavelengthLowNm} to ${wavelengthHighNm} nm.`,
      };
    }
  } else if (mode.kind === 'slitSpectroscopy' && wantedWavelengthNm !== undefined) {
    wavelengthNm = wantedWavelengthNm;
    if (wavelengthNm < wavelengthLowNm || wavelengthNm > wavelengthHighNm) {
      return {
        code: 'wavelengthOutsideBand',
        message: `${wavelengthNm} nm is outside the mode's ${wavelengthLowNm} to ${wavelengthHighNm} nm.`,
      };
    }
  }
  if (mode.kind === 'imaging') {
    return { wavelengthNm, response: responseOf(boxCurve(wavelengthLowNm, wavelengthHighNm)) };
  }
  const halfElement = Math.exp(0.5 / mode.resolvingPower);
  return { wavelengthNm, response: responseOf(boxCurve(wavelengthNm / halfElement, wavelengthNm * halfElement)) };
}
