import type { DistanceRow } from '@faintward/contracts/distances';
import type { NumberFormat } from '../lib/format';
import type { Explanation } from './Quantity';

/** One quantity that follows from redshift and cosmology: how it is named, shown and explained. */
export interface DistanceQuantity {
  field: Exclude<keyof DistanceRow, 'redshift'>;
  label: string;
  symbol: string;
  unit: string;
  group: 'Distances' | 'Scale and volume' | 'Time' | 'Expansion' | 'Dimming of surface brightness';
  format: NumberFormat;
  meaning: string;
  formula: string;
  source: string;
}

const hogg = (section: number) => `Hogg 1999, arXiv:astro-ph/9905116, section ${section}`;
const tolman = 'Tolman 1930, PNAS 16, 511: four powers of 1+z for energy; the rest follows from the width of the band';

export const distanceQuantities: readonly DistanceQuantity[] = [
  {
    field: 'luminosityDistanceMpc',
    label: 'Luminosity distance',
    symbol: 'D_L',
    unit: 'Mpc',
    group: 'Distances',
    format: { significant: 6 },
    meaning: 'The distance that makes bolometric flux fall as the inverse square.',
    formula: 'D_L = (1 + z) D_M',
    source: hogg(7),
  },
  {
    field: 'distanceModulusMag',
    label: 'Distance modulus',
    symbol: 'μ',
    unit: 'mag',
    group: 'Distances',
    format: { decimals: 3 },
    meaning: 'Apparent minus absolute bolometric magnitude; it has no value at z = 0.',
    formula: 'μ = 5 log₁₀(D_L / 10 pc)',
    source: hogg(8),
  },
  {
    field: 'comovingDistanceMpc',
    label: 'Comoving distance, line of sight',
    symbol: 'D_C',
    unit: 'Mpc',
    group: 'Distances',
    format: { significant: 6 },
    meaning: 'Distance along the line of sight with the expansion divided out.',
    formula: 'D_C = (c / H₀) ∫₀ᶻ dz′ / E(z′)',
    source: hogg(4),
  },
  {
    field: 'transverseComovingDistanceMpc',
    label: 'Comoving distance, transverse',
    symbol: 'D_M',
    unit: 'Mpc',
    group: 'Distances',
    format: { significant: 6 },
    meaning: 'Comoving separation across the sky per radian; equals D_C in a flat model.',
    formula: 'D_M = D_C (flat), or its sinh or sin form with curvature',
    source: hogg(5),
  },
  {
    field: 'angularDiameterDistanceMpc',
    label: 'Angular diameter distance',
    symbol: 'D_A',
    unit: 'Mpc',
    group: 'Distances',
    format: { significant: 6 },
    meaning: 'Proper size divided by the angle it spans.',
    formula: 'D_A = D_M / (1 + z)',
    source: hogg(6),
  },
  {
    field: 'kpcPerArcsec',
    label: 'Scale',
    symbol: 's',
    unit: 'kpc/″',
    group: 'Scale and volume',
    format: { decimals: 3 },
    meaning: 'Proper kiloparsec that one arcsecond spans at the source.',
    formula: 's = D_A · π / 648 000',
    source: hogg(6),
  },
  {
    field: 'comovingVolumeMpc3',
    label: 'Comoving volume, whole sky',
    symbol: 'V_C',
    unit: 'Mpc³',
    group: 'Scale and volume',
    format: { significant: 4 },
    meaning: 'Volume of the whole sky out to this redshift, with the expansion divided out.',
    formula: 'V_C = (4π / 3) D_M³ in a flat model',
    source: hogg(9),
  },
  {
    field: 'lookbackTimeGyr',
    label: 'Lookback time',
    symbol: 't_L',
    unit: 'Gyr',
    group: 'Time',
    format: { decimals: 3 },
    meaning: 'How long the light has travelled.',
    formula: 't_L = (1 / H₀) ∫₀ᶻ dz′ / [(1 + z′) E(z′)]',
    source: hogg(10),
  },
  {
    field: 'ageGyr',
    label: 'Age of the Universe then',
    symbol: 't',
    unit: 'Gyr',
    group: 'Time',
    format: { decimals: 3 },
    meaning: 'Age when the light set out.',
    formula: 't = (1 / H₀) ∫ dz′ / [(1 + z′) E(z′)], from z to infinity',
    source: hogg(10),
  },
  {
    field: 'hubbleKmSMpc',
    label: 'Expansion rate',
    symbol: 'H(z)',
    unit: 'km/s/Mpc',
    group: 'Expansion',
    format: { significant: 5 },
    meaning: 'Expansion rate at this redshift.',
    formula: 'H(z) = H₀ E(z)',
    source: hogg(2),
  },
  {
    field: 'criticalDensityGCm3',
    label: 'Critical density',
    symbol: 'ρ_c',
    unit: 'g/cm³',
    group: 'Expansion',
    format: { significant: 4 },
    meaning: 'Density of a flat universe that expands at this rate.',
    formula: 'ρ_c = 3 H² / (8π G)',
    source: hogg(2),
  },
  {
    field: 'bolometricDimmingMag',
    label: 'In energy: bolometric, or a line',
    symbol: 'Δ_bol',
    unit: 'mag/″²',
    group: 'Dimming of surface brightness',
    format: { decimals: 3 },
    meaning: 'For flux in all wavelengths, or of a whole emission line.',
    formula: '10 log₁₀(1 + z)',
    source: tolman,
  },
  {
    field: 'perFrequencyDimmingMag',
    label: 'Per unit frequency: AB magnitudes',
    symbol: 'Δ_ν',
    unit: 'mag/″²',
    group: 'Dimming of surface brightness',
    format: { decimals: 3 },
    meaning: 'For f_ν, and so for AB magnitudes: one power is given back by the narrower band.',
    formula: '7.5 log₁₀(1 + z)',
    source: tolman,
  },
  {
    field: 'perWavelengthDimmingMag',
    label: 'Per unit wavelength',
    symbol: 'Δ_λ',
    unit: 'mag/″²',
    group: 'Dimming of surface brightness',
    format: { decimals: 3 },
    meaning: 'For f_λ: one power more is taken by the wider band.',
    formula: '12.5 log₁₀(1 + z)',
    source: tolman,
  },
  {
    field: 'photonRateDimmingMag',
    label: 'In photons, bolometric or a line',
    symbol: 'Δ_γ',
    unit: 'mag/″²',
    group: 'Dimming of surface brightness',
    format: { decimals: 3 },
    meaning: 'For counts of photons: their lost energy does not matter to a counter.',
    formula: '7.5 log₁₀(1 + z)',
    source: tolman,
  },
];

export function distanceQuantity(field: DistanceQuantity['field']): DistanceQuantity {
  return distanceQuantities.find((quantity) => quantity.field === field)!;
}

/** What a quantity is, at this redshift in this cosmology. */
export function explainDistance(
  { label, meaning, formula, source }: DistanceQuantity,
  redshift: string,
  cosmology: string,
): Explanation {
  return {
    title: label,
    meaning,
    formula,
    inputs: [
      { label: 'redshift z', value: redshift },
      { label: 'cosmology', value: cosmology },
    ],
    source,
  };
}
