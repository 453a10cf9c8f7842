import type { LightReport } from '@faintward/contracts/light-report';
import { formatNumber } from '../../lib/format';
import type { Explanation } from '../Quantity';
import { distanceQuantity, explainDistance, type DistanceQuantity } from '../distanceQuantities';

/** What the key figures of a report are, with the inputs of this report. */
export function keyExplanations(
  report: LightReport,
): Record<
  'apparent' | 'unlensed' | 'absolute' | 'modulus' | 'luminosityDistance' | 'scale' | 'age' | 'lookback',
  Explanation
> {
  const redshift = formatNumber(report.redshift, { decimals: 4 });
  const inputs = [
    { label: 'redshift z', value: redshift },
    { label: 'cosmology', value: report.cosmologyTitle },
  ];
  const distance = (field: DistanceQuantity['field']) =>
    explainDistance(distanceQuantity(field), redshift, report.cosmologyTitle);
  const band = report.ledger?.label ?? '';
  return {
    apparent: {
      title: `Apparent magnitude in ${band}`,
      meaning: 'The arriving spectrum averaged over the band, weighted by photons, above the atmosphere.',
      formula: 'm = −2.5 log₁₀(∫ f_ν S dλ/λ / ∫ 3631 Jy · S dλ/λ)',
      inputs,
      source: 'definition of the AB system, Oke & Gunn 1983, ApJ 266, 713',
    },
    unlensed: {
      title: 'Without the lens',
      meaning: 'The same light if nothing magnified it. Surface brightness is not changed by a lens, total light is.',
      formula: 'm + 2.5 log₁₀ μ',
      inputs,
      source: 'definition of the magnification μ',
    },
    absolute: {
      title: 'Absolute magnitude',
      meaning:
        'As bright as the source would be at 10 pc in its rest frame, without a lens and without dust on the way.',
      formula: 'M = m − DM − K',
      inputs,
      source: 'Hogg, Baldry, Blanton & Eisenstein 2002, astro-ph/0210394',
    },
    modulus: distance('distanceModulusMag'),
    luminosityDistance: distance('luminosityDistanceMpc'),
    scale: distance('kpcPerArcsec'),
    age: distance('ageGyr'),
    lookback: distance('lookbackTimeGyr'),
  };
}

export const bandExplanations = {
  ab: {
    title: 'AB magnitude',
    meaning: 'Of the arriving spectrum in the band, above the atmosphere.',
    formula: 'm = −2.5 log₁₀(∫ f_ν S dλ/λ / ∫ 3631 Jy · S dλ/λ)',
    source: 'Oke & Gunn 1983, ApJ 266, 713',
  },
  vega: {
    title: 'Vega magnitude',
    meaning: 'The AB magnitude less the offset of the band. Where a band has no offset here, there is none.',
    formula: 'm(Vega) = m(AB) − offset',
    source: 'offsets: Blanton & Roweis 2007, AJ 133, 734',
  },
  transmission: {
    title: 'Let through',
    meaning: 'Part of the band’s light that hydrogen between the galaxies lets through, on average over sightlines.',
    source: 'the model chosen with the light',
  },
} satisfies Record<string, Explanation>;

/** The four ways surface brightness falls with redshift, and why each. */
export const dimmings = [
  {
    field: 'bolometricDimmingMag',
    label: 'All light, or one emission line, in energy',
    formula: '10 log₁₀(1 + z)',
    why: 'Four powers of 1+z: each photon arrives with less energy, photons arrive less often, and the same patch fills an angle larger by (1+z)² than its distance would suggest.',
  },
  {
    field: 'perFrequencyDimmingMag',
    label: 'Per unit frequency, as AB magnitudes are',
    formula: '7.5 log₁₀(1 + z)',
    why: 'One power is given back: the spectrum is squeezed in frequency, so that each hertz collects what was spread over 1+z of them.',
  },
  {
    field: 'perWavelengthDimmingMag',
    label: 'Per unit wavelength',
    formula: '12.5 log₁₀(1 + z)',
    why: 'One power more is lost: the spectrum is stretched in wavelength, so that each nanometre collects less.',
  },
  {
    field: 'photonRateDimmingMag',
    label: 'Counted photons of all light, or of one line',
    formula: '7.5 log₁₀(1 + z)',
    why: 'A counter does not mind that each photon has lost energy: three powers remain, one of time and two of angle.',
  },
] as const;

export const dimmingSource =
  'Tolman 1930, PNAS 16, 511: four powers of 1+z for energy; the rest follows from the width of the band';
