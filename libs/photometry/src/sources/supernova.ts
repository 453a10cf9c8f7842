import { OutOfDomainError } from '../domain.js';
import { sampledCurve, type SampledCurve } from '../sampled-curve.js';
import { photonIntegral, responseOf } from '../synthetic.js';
import { caution, type RestSpectrum } from './rest-spectrum.js';
import { withGridNodes } from './sampled.js';
import type { SourceTemplates, SpectrumSeries } from './templates.js';

/** A type Ia supernova on a day of its light curve. */
export interface SupernovaIaSource {
  readonly kind: 'supernovaIa';
  /** Rest-frame days from the maximum in B, −15 to 60. */
  readonly phaseDays: number;
}

type Templates = Pick<SourceTemplates, 'supernovaIaHsiao'>;

/**
 * A normal type Ia supernova: the template, straight in time between its phases (5 days apart) and in wavelength between its points
 * (5 nm apart). All phases are on one scale.
 *
 * @throws {OutOfDomainError} if the phase is outside the template
 */
export function supernovaIaSpectrum(
  { phaseDays }: SupernovaIaSource,
  { supernovaIaHsiao }: Templates,
  jumpsNm: readonly number[],
): RestSpectrum {
  const own = curveAtPhase(supernovaIaHsiao, phaseDays);
  const { source, provenance } = supernovaIaHsiao;
  return {
    label: `type Ia supernova, ${phaseText(phaseDays)}`,
    source,
    provenance,
    continuum: withGridNodes(own, jumpsNm),
    lines: [],
    validLowNm: own.wavelengthsNm[0]!,
    validHighNm: own.wavelengthsNm.at(-1)!,
    cautions: [
      caution(
        'supernovaTemplate',
        'One template for all type Ia supernovae; before correction for the width of the light curve they scatter by about 0.4 mag.',
      ),
      caution(
        'supernovaUltraviolet',
        'Below 300 nm at rest few type Ia supernovae were observed: the template is uncertain by a magnitude and more.',
        own.wavelengthsNm[0]!,
        300,
      ),
    ],
  };
}

/**
 * Magnitudes fainter than at the maximum in B: −2.5 log10 of the ratio of photon counts at the phase and at phase 0. Straight in
 * flux between the template's phases; good to about 0.05 mag within a month of the maximum.
 *
 * @param bResponse  of the band, photon counting; a factor cancels
 */
export function supernovaPhaseMag(phaseDays: number, bResponse: SampledCurve, { supernovaIaHsiao }: Templates): number {
  const response = responseOf(bResponse);
  const photons = (phase: number): number => photonIntegral(response, curveAtPhase(supernovaIaHsiao, phase));
  return 2.5 * Math.log10(photons(0) / photons(phaseDays));
}

function curveAtPhase({ phasesDays, curves }: SpectrumSeries, phaseDays: number): SampledCurve {
  const first = phasesDays[0]!;
  const last = phasesDays.at(-1)!;
  if (!(phaseDays >= first && phaseDays <= last)) {
    throw new OutOfDomainError('phaseDays', phaseDays, `between ${first} and ${last}`);
  }
  const after = Math.max(
    1,
    phasesDays.findIndex((phase) => phase >= phaseDays),
  );
  const t = (phaseDays - phasesDays[after - 1]!) / (phasesDays[after]! - phasesDays[after - 1]!);
  const early = curves[after - 1]!;
  const late = curves[after]!;
  return sampledCurve(
    early.wavelengthsNm,
    early.values.map((value, i) => (1 - t) * value + t * late.values[i]!),
  );
}

function phaseText(phaseDays: number): string {
  if (phaseDays === 0) return 'at maximum';
  return `${Math.abs(phaseDays)} d ${phaseDays < 0 ? 'before' : 'after'} maximum`;
}
