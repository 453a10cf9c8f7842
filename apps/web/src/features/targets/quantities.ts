import type { DistanceRow } from '@faintward/contracts/distances';
import type { TargetComputed } from '@faintward/contracts/targets';
import type { NumberFormat } from '../../lib/format';

const hogg = (section: number) => `Hogg 1999, arXiv:astro-ph/9905116, section ${section}`;

interface Defined {
  label: string;
  unit: string;
  format: NumberFormat;
  meaning: string;
  formula: string;
  source: string;
}

/** Distances and times of a target, each with where it comes from. */
export const targetQuantities: readonly (Defined & { field: keyof TargetComputed & keyof DistanceRow })[] = [
  {
    field: 'luminosityDistanceMpc',
    label: 'Luminosity distance',
    unit: 'Mpc',
    format: { significant: 6 },
    meaning: 'The distance that makes bolometric flux fall as the inverse square.',
    formula: 'D_L = (1 + z) D_M',
    source: hogg(7),
  },
  {
    field: 'distanceModulusMag',
    label: 'Distance modulus',
    unit: 'mag',
    format: { decimals: 3 },
    meaning: 'Apparent minus absolute bolometric magnitude.',
    formula: 'μ = 5 log₁₀(D_L / 10 pc)',
    source: hogg(8),
  },
  {
    field: 'angularDiameterDistanceMpc',
    label: 'Angular diameter distance',
    unit: 'Mpc',
    format: { significant: 6 },
    meaning: 'Proper size divided by the angle it spans.',
    formula: 'D_A = D_M / (1 + z)',
    source: hogg(6),
  },
  {
    field: 'kpcPerArcsec',
    label: 'Scale',
    unit: 'kpc/″',
    format: { decimals: 3 },
    meaning: 'Proper kiloparsec that one arcsecond spans at the source.',
    formula: 's = D_A · π / 648 000',
    source: hogg(6),
  },
  {
    field: 'ageGyr',
    label: 'Age of the Universe then',
    unit: 'Gyr',
    format: { decimals: 3 },
    meaning: 'Age when the light set out.',
    formula: 't = (1 / H₀) ∫ dz′ / [(1 + z′) E(z′)], from z to infinity',
    source: hogg(10),
  },
  {
    field: 'lookbackTimeGyr',
    label: 'Lookback time',
    unit: 'Gyr',
    format: { decimals: 3 },
    meaning: 'How long the light has travelled.',
    formula: 't_L = (1 / H₀) ∫₀ᶻ dz′ / [(1 + z′) E(z′)]',
    source: hogg(10),
  },
];
